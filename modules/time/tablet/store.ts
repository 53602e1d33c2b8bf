import { openDB, type DBSchema, type IDBPDatabase } from "idb";
import type { ClockBoard } from "../board";
import type { TabletPress } from "./kept-board";

/** A press on its way. It is written here first and leaves only when the server has it. No PIN, no badge: at most sealed. */
export interface KeptItem {
  /** The tablet's running number: the order of sending. */
  readonly counter: number;
  readonly requestId: string;
  readonly press: TabletPress;
  readonly input: Readonly<Record<string, unknown>>;
  readonly deviceAt: string;
  /** For the list: `Start`, `Exhaust porting 260224-07`. */
  readonly word: string;
  readonly text: string;
  /** What the server said against it; it stays until a person has seen it. */
  readonly refused?: string;
}
export type NewItem = Omit<KeptItem, "counter" | "input"> & { readonly input: (counter: number) => Readonly<Record<string, unknown>> };

interface Schema extends DBSchema {
  kept: { key: number; value: KeptItem };
  facts: { key: string; value: unknown };
}

let open: Promise<IDBPDatabase<Schema>> | undefined;
const database = (): Promise<IDBPDatabase<Schema>> =>
  (open ??= openDB<Schema>("valvekeeper-clock", 1, {
    upgrade(db) {
      db.createObjectStore("kept", { keyPath: "counter" });
      db.createObjectStore("facts");
    },
    terminated() { open = undefined; },
  }));

const STRICT = { durability: "strict" } as const;

/** Writes a press under the next number, flushed to the disk before it answers. @throws when the tablet has no room */
export async function keep(item: NewItem): Promise<KeptItem> {
  const tx = (await database()).transaction(["kept", "facts"], "readwrite", STRICT);
  const counter = (((await tx.objectStore("facts").get("counter")) as number | undefined) ?? 0) + 1;
  const whole: KeptItem = { ...item, counter, input: item.input(counter) };
  await tx.objectStore("facts").put(counter, "counter");
  await tx.objectStore("kept").add(whole);
  await tx.done;
  return whole;
}

export const keptItems = async (): Promise<KeptItem[]> => (await database()).getAll("kept");
export const dropItem = async (counter: number): Promise<void> => (await database()).delete("kept", counter);
export async function markRefused(item: KeptItem, refused: string): Promise<void> {
  await (await database()).put("kept", { ...item, refused });
}

export const readBoard = async (): Promise<ClockBoard | undefined> => (await (await database()).get("facts", "board")) as ClockBoard | undefined;
export async function writeBoard(board: ClockBoard): Promise<void> {
  await (await database()).put("facts", board, "board");
}
/** Server less tablet, ms. */
export const readOffset = async (): Promise<number> => ((await (await database()).get("facts", "offset")) as number | undefined) ?? 0;
export async function writeOffset(offsetMs: number): Promise<void> {
  await (await database()).put("facts", offsetMs, "offset");
}
/** Asks the browser not to throw this away when room gets scarce. */
export const askToStay = async (): Promise<boolean> => (await navigator.storage?.persist?.()) ?? false;

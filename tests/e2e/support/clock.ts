import { clearClock, setClock } from "@/scripts/clock.mjs";
import { product } from "./product";

const ZONE = "America/Denver";
const wall = new Intl.DateTimeFormat("sv-SE", { timeZone: ZONE, dateStyle: "short", timeStyle: "medium" });
const wallAsUtc = (at: Date): number => Date.parse(`${wall.format(at).replace(" ", "T")}Z`);

/** The instant of a wall-clock minute in the shop, by the browser engine's own time zone table and not the product's. */
export function instantIn(local: string): Date {
  const wanted = Date.parse(`${local}:00Z`);
  const guess = new Date(wanted + (wanted - wallAsUtc(new Date(wanted))));
  return new Date(guess.getTime() + (wanted - wallAsUtc(guess)));
}

/** Makes it this wall-clock minute in the shop (`2026-02-18T15:05`), for every process of the product. Time runs on from there. */
export const itIs = (local: string): void => setClock(product.clockFile, instantIn(local));

/** Back to the real time. */
export const realTime = (): void => clearClock(product.clockFile);

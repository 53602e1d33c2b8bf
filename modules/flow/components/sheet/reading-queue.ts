import type { HeldUnit, ValueUnit } from "../../domain/raw-test";

/** One typed value on its way to the shop's records. */
export interface CellEdit {
  readonly requestId: string;
  readonly value: string;
  /** Left out: the unit of the bench's scale. */
  readonly valueUnit?: ValueUnit;
  readonly range: string | null;
  /** Empty: the nominal pressure. */
  readonly pressure: string;
  /** Left out: inches of water. */
  readonly pressureUnit?: HeldUnit;
  /** Air at the port and at the orifice with units; left out: not measured. */
  readonly portTemperature?: string;
  readonly orificeTemperature?: string;
  readonly acceptedReason: string | null;
  readonly excludedReason: string | null;
  readonly takenAt: string;
}
/** Why a value waits for a person. */
export interface Stuck {
  readonly kind: "asked" | "refused" | "conflict";
  readonly message: string;
  readonly askReason: boolean;
  /** What stands in the records instead. */
  readonly theirs: { readonly revision: number; readonly valueText: string } | null;
}
/** What is kept on this tablet for one cell, until the records have it. */
export interface KeptCell {
  readonly key: string;
  readonly shop: string;
  readonly person: string;
  readonly testId: string;
  readonly liftUm: number;
  readonly lift: string;
  readonly liftUnit: "in" | "mm";
  readonly repeatNo: number;
  /** Revision in the records that the first edit goes over. */
  readonly revision: number;
  /** Oldest first. One that was sent already keeps its place: its answer may only have been lost. */
  readonly edits: readonly (CellEdit & { readonly sent: boolean })[];
  /** False while it is still being typed: kept, but not sent. */
  readonly isReady: boolean;
  readonly stuck: Stuck | null;
  /** Order of writing over all cells. */
  readonly order: number;
}
export interface QueueStore {
  all(): Promise<KeptCell[]>;
  put(cell: KeptCell): Promise<void>;
  remove(key: string): Promise<void>;
}
export type Sent =
  | { readonly status: "saved"; readonly revision: number; readonly valueText: string }
  | { readonly status: "refused"; readonly code: string; readonly message: string; readonly askReason: boolean; readonly theirs: Stuck["theirs"] }
  | { readonly status: "no-link" }
  | { readonly status: "signed-out" };
export type Sender = (cell: KeptCell, edit: CellEdit) => Promise<Sent>;

export interface QueueState {
  readonly cells: ReadonlyMap<string, KeptCell>;
  /** Values that are typed and not yet in the records, those that wait for a person left out. */
  readonly waiting: number;
  readonly link: "up" | "down" | "signed-out";
}
export interface SavedCell { readonly cell: KeptCell; readonly edit: CellEdit; readonly revision: number }

export const keptKey = (shop: string, testId: string, liftUm: number, repeatNo: number): string => `${shop}:${testId}:${liftUm}/${repeatNo}`;

const waits = (cell: KeptCell): boolean => cell.stuck === null && (cell.edits[0]?.sent === true || (cell.isReady && cell.edits.length > 0));

/**
 * Holds every typed value until the records have it. A value is put into the store before it is sent; a lost network or a
 * closed tablet loses nothing. Edits of one cell go out one after the other, each over the revision the one before it made.
 */
export class ReadingQueue {
  private cells = new Map<string, KeptCell>();
  private link: QueueState["link"] = "up";
  private running: Promise<void> | null = null;
  private again = false;
  private order = 0;
  private state: QueueState = { cells: new Map(), waiting: 0, link: "up" };
  private readonly listeners = new Set<() => void>();

  constructor(
    private readonly store: QueueStore,
    private readonly send: Sender,
    private readonly onSaved: (saved: SavedCell) => void,
    /** Only this person's values are sent; another's wait for them. */
    private readonly person: string,
  ) {}

  readonly subscribe = (listener: () => void): (() => void) => {
    this.listeners.add(listener);
    return () => this.listeners.delete(listener);
  };
  readonly snapshot = (): QueueState => this.state;

  private changed(): void {
    const mine = [...this.cells.values()].filter((c) => c.person === this.person);
    this.state = { cells: new Map(this.cells), waiting: mine.filter(waits).length, link: this.link };
    for (const l of this.listeners) l();
  }

  /** Takes up what an earlier sitting left behind. */
  async load(): Promise<void> {
    for (const cell of await this.store.all()) {
      this.order = Math.max(this.order, cell.order);
      // Nobody is typing it any more.
      if (!this.cells.has(cell.key)) this.cells.set(cell.key, { ...cell, isReady: true });
    }
    this.changed();
  }

  private async keep(cell: KeptCell): Promise<void> {
    this.cells.set(cell.key, cell);
    this.changed();
    await this.store.put(cell);
  }
  private async drop(key: string): Promise<void> {
    this.cells.delete(key);
    this.changed();
    await this.store.remove(key);
  }

  /** Keeps a typed value on this tablet. It replaces one of the same cell that was never sent. Sent after `release`. */
  async write(at: Pick<KeptCell, "key" | "shop" | "testId" | "liftUm" | "lift" | "liftUnit" | "repeatNo" | "revision">, edit: CellEdit): Promise<void> {
    const before = this.cells.get(at.key);
    const sent = before?.edits.filter((e) => e.sent) ?? [];
    this.order += 1;
    await this.keep({ ...at, revision: sent.length > 0 && before ? before.revision : Math.max(at.revision, before?.revision ?? 0), person: this.person, edits: [...sent, { ...edit, sent: false }], isReady: false, stuck: null, order: before?.order ?? this.order });
  }

  /** The cell was left: its value may go. */
  async release(key: string): Promise<void> {
    const cell = this.cells.get(key);
    if (cell && !cell.isReady) await this.keep({ ...cell, isReady: true });
  }

  /** Holds a value back where it was typed: until a reason is given, or (no reason will do) until it is typed anew. */
  async hold(key: string, message: string, askReason: boolean): Promise<void> {
    const cell = this.cells.get(key);
    if (cell) await this.keep({ ...cell, stuck: { kind: askReason ? "asked" : "refused", message, askReason, theirs: null } });
  }

  /** What held it back holds no longer: it goes as a new try. One that somebody else wrote over stays held. */
  async unhold(key: string, requestId: string): Promise<void> {
    const cell = this.cells.get(key);
    const last = cell?.edits.at(-1);
    if (cell?.stuck && last && !cell.stuck.theirs) await this.keep({ ...cell, stuck: null, isReady: true, edits: [...cell.edits.slice(0, -1), { ...last, requestId, sent: false }] });
  }

  /** Forgets the value that was never sent; one that is on its way, or what stands in the records, counts again. */
  async discard(key: string): Promise<void> {
    const cell = this.cells.get(key);
    const sent = cell?.edits.filter((e) => e.sent) ?? [];
    await (cell && sent.length > 0 ? this.keep({ ...cell, edits: sent, stuck: null }) : this.drop(key));
  }

  /** Writes the kept value over what somebody else put there meanwhile. */
  async insist(key: string, requestId: string): Promise<void> {
    const cell = this.cells.get(key);
    const last = cell?.edits.at(-1);
    if (!cell || !last || !cell.stuck?.theirs) return;
    await this.keep({ ...cell, revision: cell.stuck.theirs.revision, stuck: null, isReady: true, edits: [{ ...last, requestId, sent: false }] });
  }

  /** Sends what waits, oldest first, until all is saved or the link is down. Calls while it runs make it look once more. */
  flush(): Promise<void> {
    if (this.running) {
      this.again = true;
      return this.running;
    }
    this.running = this.run().finally(() => { this.running = null; });
    return this.running;
  }

  private async run(): Promise<void> {
    do {
      this.again = false;
      for (;;) {
        const next = [...this.cells.values()].filter((c) => waits(c) && c.person === this.person).sort((a, b) => a.order - b.order)[0];
        if (!next) break;
        if (!(await this.sendFirst(next))) return;
      }
    } while (this.again);
  }

  /** False when there is no link. */
  private async sendFirst(cell: KeptCell): Promise<boolean> {
    const [edit] = cell.edits;
    if (!edit) return true;
    await this.keep({ ...cell, edits: cell.edits.map((e) => (e === edit ? { ...e, sent: true } : e)) });
    const answer = await this.send(cell, edit);
    const now = this.cells.get(cell.key);
    if (answer.status === "no-link" || answer.status === "signed-out") {
      this.link = answer.status === "no-link" ? "down" : "signed-out";
      this.changed();
      return false;
    }
    this.link = "up";
    if (!now) {
      this.changed();
      return true;
    }
    const rest = now.edits.filter((e) => e.requestId !== edit.requestId);
    if (answer.status === "saved") {
      this.onSaved({ cell: now, edit, revision: answer.revision });
      await (rest.length === 0 ? this.drop(cell.key) : this.keep({ ...now, revision: answer.revision, edits: rest }));
      return true;
    }
    if (rest.length > 0) {
      await this.keep({ ...now, edits: rest });
      return true;
    }
    if (answer.theirs && answer.theirs.valueText === edit.value) {
      this.onSaved({ cell: now, edit, revision: answer.theirs.revision });
      await this.drop(cell.key);
      return true;
    }
    // Answered with no: it is not on its way any more.
    await this.keep({ ...now, edits: now.edits.map((e) => ({ ...e, sent: false })), stuck: { kind: answer.theirs ? "conflict" : answer.askReason ? "asked" : "refused", message: answer.message, askReason: answer.askReason, theirs: answer.theirs } });
    return true;
  }
}

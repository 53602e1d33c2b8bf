import type { LinePlace, Stage } from "../domain/measure-line";

/** One typed measurement on its way to the shop's records. */
export interface LineEdit {
  readonly requestId: string;
  readonly value: string;
  /** Unit of a number typed without one: as the sheet showed it then. */
  readonly unit: string;
  readonly instrument: string;
  /** The question about it was answered: it is kept as it stands. */
  readonly confirmed: boolean;
}
/** What stands in the records instead. */
export interface TheirLine { readonly revision: number; readonly valueText: string; readonly unit: string }
/** Why a line waits for a person. */
export interface StuckLine { readonly kind: "asked" | "refused" | "conflict"; readonly message: string; readonly theirs: TheirLine | null }
/** Where a typed line belongs. */
export interface LineAt { readonly shop: string; readonly headId: string; readonly stage: Stage; readonly place: LinePlace; readonly kind: string; readonly revision: number }
/** What is kept on this device for one line of one person, until the records have it. */
export interface KeptLine extends LineAt {
  readonly key: string;
  readonly person: string;
  /** Oldest first. One that was sent keeps its place: its answer may only have been lost. */
  readonly edits: readonly (LineEdit & { readonly sent: boolean })[];
  /** False while it is still being typed: kept, but not sent. */
  readonly isReady: boolean;
  readonly stuck: StuckLine | null;
  /** Order of writing over all lines. */
  readonly order: number;
}
export interface LineStore {
  all(): Promise<KeptLine[]>;
  put(line: KeptLine): Promise<void>;
  remove(key: string): Promise<void>;
}
export type LineSent =
  | { readonly status: "saved"; readonly revision: number; readonly valueText: string; readonly unit: string }
  | { readonly status: "refused"; readonly message: string; readonly asks: boolean; readonly theirs: TheirLine | null }
  | { readonly status: "no-link" }
  | { readonly status: "signed-out" };
export type LineSender = (line: KeptLine, edit: LineEdit) => Promise<LineSent>;
export interface SavedLine extends TheirLine { readonly line: KeptLine }

export interface LineQueueState {
  /** This person's lines, by key. */
  readonly lines: ReadonlyMap<string, KeptLine>;
  /** Lines typed and not yet in the records, those that wait for a person left out. */
  readonly waiting: number;
  /** Lines of somebody else on this device: they wait for that person. */
  readonly others: number;
  readonly link: "up" | "down" | "signed-out";
}

/** One person's line: two people may type into the same line on one device, and neither overwrites the other. */
export const keptLineKey = (person: string, at: Omit<LineAt, "revision">): string => `${at.shop}:${person}:${at.headId}:${at.stage}/${at.place.cylinder}/${at.place.side}/${at.place.position}/${at.kind}`;

const waits = (line: KeptLine): boolean => line.stuck === null && (line.edits[0]?.sent === true || (line.isReady && line.edits.length > 0));

/**
 * Holds every typed line of the measurement sheet until the records have it. It is put into the store before it is sent, so a
 * lost link, a closed page or a no loses nothing. Edits of one line go out one after the other, each over the revision before.
 */
export class MeasureQueue {
  private lines = new Map<string, KeptLine>();
  private others = 0;
  private link: LineQueueState["link"] = "up";
  private running: Promise<void> | null = null;
  private again = false;
  private order = 0;
  private state: LineQueueState = { lines: new Map(), waiting: 0, others: 0, link: "up" };
  private readonly listeners = new Set<() => void>();

  constructor(
    private readonly store: LineStore,
    private readonly send: LineSender,
    private readonly onSaved: (saved: SavedLine) => void,
    private readonly person: string,
  ) {}

  readonly subscribe = (listener: () => void): (() => void) => {
    this.listeners.add(listener);
    return () => this.listeners.delete(listener);
  };
  readonly snapshot = (): LineQueueState => this.state;

  private changed(): void {
    this.state = { lines: new Map(this.lines), waiting: [...this.lines.values()].filter(waits).length, others: this.others, link: this.link };
    for (const l of this.listeners) l();
  }

  /** Takes up what an earlier sitting left behind: this person's to send, another's only counted. */
  async load(): Promise<void> {
    const all = await this.store.all();
    this.others = all.filter((l) => l.person !== this.person).length;
    for (const line of all) {
      this.order = Math.max(this.order, line.order);
      // Nobody is typing it any more.
      if (line.person === this.person && !this.lines.has(line.key)) this.lines.set(line.key, { ...line, isReady: true });
    }
    this.changed();
  }

  private async keep(line: KeptLine): Promise<void> {
    this.lines.set(line.key, line);
    this.changed();
    await this.store.put(line);
  }
  private async drop(key: string): Promise<void> {
    this.lines.delete(key);
    this.changed();
    await this.store.remove(key);
  }

  /** Keeps a typed value on this device. It replaces one of the same line that was never sent. Sent after `release`. */
  async write(at: LineAt, edit: LineEdit): Promise<void> {
    const key = keptLineKey(this.person, at);
    const before = this.lines.get(key);
    const sent = before?.edits.filter((e) => e.sent) ?? [];
    this.order += 1;
    await this.keep({
      ...at, key, person: this.person, revision: sent.length > 0 && before ? before.revision : Math.max(at.revision, before?.revision ?? 0),
      edits: [...sent, { ...edit, sent: false }], isReady: false, stuck: null, order: before?.order ?? this.order,
    });
  }

  /** The line was left: its value may go. */
  async release(key: string): Promise<void> {
    const line = this.lines.get(key);
    if (line && !line.isReady) await this.keep({ ...line, isReady: true });
  }

  /** Holds a line back where it was typed: until it is confirmed, or (that will not do) until it is typed anew. */
  async hold(key: string, message: string, asks: boolean): Promise<void> {
    const line = this.lines.get(key);
    if (line) await this.keep({ ...line, stuck: { kind: asks ? "asked" : "refused", message, theirs: null } });
  }

  /** Forgets the value that was never sent; one that is on its way, or what stands in the records, counts again. */
  async discard(key: string): Promise<void> {
    const line = this.lines.get(key);
    const sent = line?.edits.filter((e) => e.sent) ?? [];
    await (line && sent.length > 0 ? this.keep({ ...line, edits: sent, stuck: null }) : this.drop(key));
  }

  /** The person's answer to what holds a line back: as it stands, or over what somebody else wrote there meanwhile. */
  async insist(key: string, requestId: string): Promise<void> {
    const line = this.lines.get(key);
    const last = line?.edits.at(-1);
    if (!line || !last || !line.stuck || line.stuck.kind === "refused") return;
    const confirmed = last.confirmed || line.stuck.kind === "asked";
    await this.keep({ ...line, revision: line.stuck.theirs?.revision ?? line.revision, stuck: null, isReady: true, edits: [...line.edits.slice(0, -1), { ...last, requestId, confirmed, sent: false }] });
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
        const [next] = [...this.lines.values()].filter(waits).sort((a, b) => a.order - b.order);
        if (!next) break;
        if (!(await this.sendFirst(next))) return;
      }
    } while (this.again);
  }

  /** False when there is no link. */
  private async sendFirst(line: KeptLine): Promise<boolean> {
    const [edit] = line.edits;
    if (!edit) return true;
    await this.keep({ ...line, edits: line.edits.map((e) => (e === edit ? { ...e, sent: true } : e)) });
    const answer = await this.send(line, edit);
    const now = this.lines.get(line.key);
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
      this.onSaved({ line: now, revision: answer.revision, valueText: answer.valueText, unit: answer.unit });
      await (rest.length === 0 ? this.drop(line.key) : this.keep({ ...now, revision: answer.revision, edits: rest }));
      return true;
    }
    if (rest.length > 0) {
      // Typed over meanwhile: only the newer one counts.
      await this.keep({ ...now, edits: rest });
      return true;
    }
    // Answered with no: it is not on its way any more, and waits for a person, here and after the page was closed.
    const kind = answer.theirs ? "conflict" as const : answer.asks ? "asked" as const : "refused" as const;
    await this.keep({ ...now, edits: now.edits.map((e) => ({ ...e, sent: false })), stuck: { kind, message: answer.message, theirs: answer.theirs } });
    return true;
  }
}

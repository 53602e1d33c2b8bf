import { beforeEach, describe, expect, it } from "vitest";
import { keptKey, ReadingQueue, type CellEdit, type KeptCell, type QueueStore, type SavedCell, type Sender, type Sent } from "./reading-queue";

/** A tablet: what is in it outlives the queue. */
function tablet(): QueueStore & { kept: Map<string, KeptCell> } {
  const kept = new Map<string, KeptCell>();
  return { kept, all: async () => [...kept.values()], put: async (c) => void kept.set(c.key, c), remove: async (k) => void kept.delete(k) };
}
/** Records that keep revisions and remember request ids, as the server does. */
function records() {
  const cells = new Map<string, { revision: number; value: string }>();
  const answered = new Map<string, Sent>();
  const log: string[] = [];
  let mode: "up" | "down" | "answer-lost" = "up";
  const send: Sender = async (cell, edit) => {
    if (mode === "down") return { status: "no-link" };
    const before = answered.get(edit.requestId);
    let answer = before;
    if (!answer) {
      const here = cells.get(cell.key) ?? { revision: 0, value: "" };
      if (here.revision !== cell.revision) answer = { status: "refused", code: "CHANGED_MEANWHILE", message: "moved on", askReason: false, theirs: { revision: here.revision, valueText: here.value } };
      else {
        cells.set(cell.key, { revision: here.revision + 1, value: edit.value });
        log.push(`${cell.liftUm}=${edit.value}`);
        answer = { status: "saved", revision: here.revision + 1, valueText: edit.value };
      }
      answered.set(edit.requestId, answer);
    }
    return mode === "answer-lost" ? { status: "no-link" } : answer;
  };
  return { cells, log, send, set: (m: typeof mode) => { mode = m; } };
}

let ids = 0;
const edit = (value: string, more: Partial<CellEdit> = {}): CellEdit => ({ requestId: `r${++ids}`, value, range: null, pressure: "", acceptedReason: null, excludedReason: null, takenAt: "2026-03-12T16:20:00Z", ...more });
const at = (liftUm: number, revision = 0) => ({ key: keptKey("ninebark", "t1", liftUm, 1), shop: "ninebark", testId: "t1", liftUm, lift: String(liftUm / 25_400), liftUnit: "in" as const, repeatNo: 1, revision });

/** Types a value and leaves the cell. */
const put = async (q: ReadingQueue, where: ReturnType<typeof at>, what: CellEdit) => { await q.write(where, what); await q.release(where.key); };

let store: ReturnType<typeof tablet>;
let server: ReturnType<typeof records>;
let saved: SavedCell[];
const queue = (person = "june") => new ReadingQueue(store, server.send, (s) => saved.push(s), person);
beforeEach(() => { store = tablet(); server = records(); saved = []; });

describe("readings on their way", () => {
  it("go once what held them back holds no longer, as a new try; one written over by somebody else stays held", async () => {
    const q = queue();
    await put(q, at(1270), edit("24.6"));
    await q.hold(at(1270).key, "The leak was read at another pressure.", true);
    await q.flush();
    expect(server.log).toEqual([]);
    await q.unhold(at(1270).key, "again");
    await q.flush();
    expect(server.log).toEqual(["1270=24.6"]);
    server.cells.set(at(2540).key, { revision: 1, value: "50" });
    await put(q, at(2540), edit("48.9"));
    await q.flush();
    await q.unhold(at(2540).key, "more");
    await q.flush();
    expect(server.cells.get(at(2540).key)?.value).toBe("50");
  });

  it("are saved in the order they were typed and leave the tablet empty", async () => {
    const q = queue();
    await put(q, at(2540), edit("48.9"));
    await put(q, at(1270), edit("24.6"));
    await q.flush();
    expect(server.log).toEqual(["2540=48.9", "1270=24.6"]);
    expect(store.kept.size).toBe(0);
    expect(q.snapshot()).toMatchObject({ waiting: 0, link: "up" });
    expect(saved.map((s) => s.revision)).toEqual([1, 1]);
  });

  it("survive a lost link and a closed tablet, and are saved once", async () => {
    server.set("down");
    const first = queue();
    await put(first, at(1270), edit("24.6"));
    await put(first, at(2540), edit("48.9"));
    await first.flush();
    expect(first.snapshot()).toMatchObject({ waiting: 2, link: "down" });
    const second = queue();
    await second.load();
    expect(second.snapshot().waiting).toBe(2);
    server.set("up");
    await second.flush();
    expect(server.log).toEqual(["1270=24.6", "2540=48.9"]);
    expect(store.kept.size).toBe(0);
  });

  it("are not written twice when only the answer was lost, even when typed over meanwhile", async () => {
    const q = queue();
    server.set("answer-lost");
    await put(q, at(1270), edit("24.6"));
    await q.flush();
    expect(server.cells.get(at(1270).key)).toEqual({ revision: 1, value: "24.6" });
    await put(q, at(1270), edit("24.8"));
    server.set("up");
    await q.flush();
    expect(server.cells.get(at(1270).key)).toEqual({ revision: 2, value: "24.8" });
    expect(server.log).toEqual(["1270=24.6", "1270=24.8"]);
  });

  it("are not sent while they are still being typed, and then only the last", async () => {
    const q = queue();
    for (const v of ["2", "24", "24.", "24.6"]) {
      await q.write(at(1270), edit(v));
      await q.flush();
    }
    expect(server.log).toEqual([]);
    await q.release(at(1270).key);
    await q.flush();
    expect(server.log).toEqual(["1270=24.6"]);
  });

  it("wait for a person when they are doubted, and for a decision when another screen wrote there", async () => {
    const q = queue();
    await put(q, at(1270), edit("489"));
    await q.hold(at(1270).key, "More than 60 % from its neighbour.", true);
    await q.flush();
    expect(server.log).toEqual([]);
    expect(store.kept.get(at(1270).key)?.edits[0]?.value).toBe("489");
    await put(q, at(1270), edit("489", { acceptedReason: "read twice" }));
    await q.flush();
    expect(server.log).toEqual(["1270=489"]);

    server.cells.set(at(2540).key, { revision: 3, value: "50.0" });
    await put(q, at(2540), edit("48.9"));
    await q.flush();
    expect(q.snapshot().cells.get(at(2540).key)?.stuck).toMatchObject({ kind: "conflict", theirs: { revision: 3, valueText: "50.0" } });
    await q.insist(at(2540).key, "r-insist");
    await q.flush();
    expect(server.cells.get(at(2540).key)).toEqual({ revision: 4, value: "48.9" });
  });

  it("do not lose sight of a value on its way while a doubtful one over it waits", async () => {
    const q = queue();
    server.set("answer-lost");
    await put(q, at(1270), edit("24.6"));
    await q.flush();
    await put(q, at(1270), edit("246"));
    await q.hold(at(1270).key, "More than 60 % from its neighbour.", true);
    server.set("up");
    await put(q, at(1270), edit("24.7"));
    await q.flush();
    expect(server.cells.get(at(1270).key)).toEqual({ revision: 2, value: "24.7" });
    expect(q.snapshot().cells.size).toBe(0);

    server.set("answer-lost");
    await put(q, at(2540, 0), edit("48.9"));
    await q.flush();
    await put(q, at(2540, 0), edit("489"));
    await q.hold(at(2540).key, "More than 60 % from its neighbour.", true);
    await q.discard(at(2540).key);
    server.set("up");
    await q.flush();
    expect(server.log.at(-1)).toBe("2540=48.9");
    expect(q.snapshot().cells.size).toBe(0);
  });

  it("keep another person's values for that person", async () => {
    server.set("down");
    const june = queue("june");
    await put(june, at(1270), edit("24.6"));
    await june.flush();
    server.set("up");
    const bram = queue("bram");
    await bram.load();
    await bram.flush();
    expect(server.log).toEqual([]);
    expect(store.kept.size).toBe(1);
    const back = queue("june");
    await back.load();
    await back.flush();
    expect(server.log).toEqual(["1270=24.6"]);
  });
});

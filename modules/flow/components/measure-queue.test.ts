import { beforeEach, describe, expect, it } from "vitest";
import { keptLineKey, MeasureQueue, type KeptLine, type LineEdit, type LineSender, type LineSent, type LineStore, type SavedLine } from "./measure-queue";

/** A device: what is in it outlives the page. */
function device(): LineStore & { kept: Map<string, KeptLine> } {
  const kept = new Map<string, KeptLine>();
  return { kept, all: async () => [...kept.values()], put: async (l) => void kept.set(l.key, l), remove: async (k) => void kept.delete(k) };
}
/** Records that keep revisions, remember request ids and refuse what is no number, as the server does. */
function records() {
  const lines = new Map<string, { revision: number; value: string }>();
  const answered = new Map<string, LineSent>();
  const log: string[] = [];
  const asked: { requestId: string; input: string }[] = [];
  let mode: "up" | "down" | "answer-lost" | "signed-out" = "up";
  const send: LineSender = async (line, edit) => {
    if (mode === "down") return { status: "no-link" };
    if (mode === "signed-out") return { status: "signed-out" };
    asked.push({ requestId: edit.requestId, input: JSON.stringify([edit.value, edit.unit, edit.confirmed, edit.instrument, line.revision]) });
    let answer = answered.get(edit.requestId);
    if (!answer) {
      const here = lines.get(line.kind) ?? { revision: 0, value: "" };
      if (here.revision !== line.revision) answer = { status: "refused", message: "moved on", asks: false, theirs: { revision: here.revision, valueText: here.value, unit: "mm" } };
      else if (Number.isNaN(Number(edit.value))) answer = { status: "refused", message: "no number", asks: false, theirs: null };
      else if (Number(edit.value) > 100 && !edit.confirmed) answer = { status: "refused", message: "usually below 100", asks: true, theirs: null };
      else {
        lines.set(line.kind, { revision: here.revision + 1, value: edit.value });
        log.push(`${line.kind}=${edit.value}`);
        answer = { status: "saved", revision: here.revision + 1, valueText: edit.value, unit: edit.unit };
      }
      answered.set(edit.requestId, answer);
    }
    return mode === "answer-lost" ? { status: "no-link" } : answer;
  };
  return { lines, log, asked, send, set: (m: typeof mode) => { mode = m; } };
}

let ids = 0;
const edit = (value: string, more: Partial<LineEdit> = {}): LineEdit => ({ requestId: `r${++ids}`, value, unit: "mm", instrument: "dial 2", confirmed: false, ...more });
const at = (kind: string, revision = 0) => ({ shop: "ninebark", headId: "h1", stage: "before" as const, place: { cylinder: 1, side: "intake" as const, position: "left" as const }, kind, revision });
const keyOf = (kind: string, person = "june") => keptLineKey(person, at(kind));

let store: ReturnType<typeof device>;
let server: ReturnType<typeof records>;
let saved: SavedLine[];
const queue = (person = "june") => new MeasureQueue(store, server.send, (s) => saved.push(s), person);
/** Types a value and leaves the line. */
const put = async (q: MeasureQueue, kind: string, what: LineEdit, revision = 0, person = "june") => { await q.write(at(kind, revision), what); await q.release(keyOf(kind, person)); };
beforeEach(() => { store = device(); server = records(); saved = []; });

describe("lines of the measurement sheet on their way", () => {
  it("are on the device before they are sent, and off it once the records have them", async () => {
    const q = queue();
    await put(q, "installed", edit("38.5"));
    expect(store.kept.get(keyOf("installed"))?.edits).toMatchObject([{ value: "38.5", sent: false }]);
    await put(q, "solid", edit("29.2"));
    await q.flush();
    expect(server.log).toEqual(["installed=38.5", "solid=29.2"]);
    expect(store.kept.size).toBe(0);
    expect(q.snapshot()).toMatchObject({ waiting: 0, others: 0, link: "up" });
    expect(saved.map((s) => [s.line.kind, s.revision])).toEqual([["installed", 1], ["solid", 1]]);
  });

  it("survive a lost link and a reload, and go once it is back", async () => {
    server.set("down");
    const q = queue();
    await put(q, "installed", edit("38.5"));
    await q.write(at("solid"), edit("29.2"));
    await q.flush();
    expect(q.snapshot()).toMatchObject({ waiting: 1, link: "down" });
    const reloaded = queue();
    await reloaded.load();
    // The line that was being typed when the page was closed is nobody's to finish: it goes as it stands.
    expect(reloaded.snapshot().waiting).toBe(2);
    server.set("up");
    await reloaded.flush();
    expect(server.log).toEqual(["installed=38.5", "solid=29.2"]);
    expect(store.kept.size).toBe(0);
    expect(reloaded.snapshot()).toMatchObject({ waiting: 0, link: "up" });
  });

  it("carry the same request id and content when only the answer was lost, also after a reload", async () => {
    server.set("answer-lost");
    const q = queue();
    await put(q, "installed", edit("38.5"));
    await q.flush();
    expect(server.log).toEqual(["installed=38.5"]);
    const reloaded = queue();
    await reloaded.load();
    server.set("up");
    await reloaded.flush();
    expect(server.asked).toHaveLength(2);
    expect(server.asked[1]).toEqual(server.asked[0]);
    expect(server.lines.get("installed")).toEqual({ revision: 1, value: "38.5" });
    expect(store.kept.size).toBe(0);
  });

  it("go one after the other when one is typed over before its answer came", async () => {
    server.set("answer-lost");
    const q = queue();
    await put(q, "installed", edit("38.5"));
    await q.flush();
    await put(q, "installed", edit("38.7"));
    server.set("up");
    await q.flush();
    expect(server.log).toEqual(["installed=38.5", "installed=38.7"]);
    expect(server.lines.get("installed")).toEqual({ revision: 2, value: "38.7" });
  });

  it("are not sent while they are typed", async () => {
    const q = queue();
    for (const v of ["3", "38", "38.5"]) {
      await q.write(at("installed"), edit(v));
      await q.flush();
    }
    expect(server.asked).toEqual([]);
    expect(store.kept.get(keyOf("installed"))?.edits.map((e) => e.value)).toEqual(["38.5"]);
  });

  it("wait for the person when refused or asked, and are still there with their reason after a reload", async () => {
    const q = queue();
    await put(q, "installed", edit("thin"));
    await put(q, "free", edit("385"));
    await q.flush();
    await q.flush();
    expect(server.asked).toHaveLength(2);
    const reloaded = queue();
    await reloaded.load();
    await reloaded.flush();
    expect(server.asked).toHaveLength(2);
    const lines = reloaded.snapshot().lines;
    expect(lines.get(keyOf("installed"))).toMatchObject({ edits: [{ value: "thin" }], stuck: { kind: "refused", message: "no number" } });
    expect(lines.get(keyOf("free"))).toMatchObject({ edits: [{ value: "385" }], stuck: { kind: "asked", message: "usually below 100" } });
    expect(reloaded.snapshot().waiting).toBe(0);
    // A refusal is no question: only another value gets past it.
    await reloaded.insist(keyOf("installed"), "r-no");
    await reloaded.insist(keyOf("free"), "r-yes");
    await reloaded.flush();
    expect(server.log).toEqual(["free=385"]);
    await put(reloaded, "installed", edit("38.5"));
    await reloaded.flush();
    expect(server.log).toEqual(["free=385", "installed=38.5"]);
    expect(store.kept.size).toBe(0);
  });

  it("are held where they were typed when they are doubted there, without a link", async () => {
    server.set("down");
    const q = queue();
    await q.write(at("free"), edit("385"));
    await q.hold(keyOf("free"), "Usually below 100.", true);
    await q.flush();
    expect(store.kept.get(keyOf("free"))?.stuck).toEqual({ kind: "asked", message: "Usually below 100.", theirs: null });
    await q.insist(keyOf("free"), "r-yes");
    server.set("up");
    await q.flush();
    expect(server.log).toEqual(["free=385"]);
  });

  it("wait for a decision where somebody else wrote meanwhile: over it, or let go", async () => {
    server.lines.set("installed", { revision: 2, value: "37.9" });
    server.lines.set("solid", { revision: 1, value: "29.0" });
    const q = queue();
    await put(q, "installed", edit("38.5"));
    await put(q, "solid", edit("29.2"));
    await q.flush();
    expect(q.snapshot().lines.get(keyOf("installed"))?.stuck).toEqual({ kind: "conflict", message: "moved on", theirs: { revision: 2, valueText: "37.9", unit: "mm" } });
    await q.insist(keyOf("installed"), "r-over");
    await q.discard(keyOf("solid"));
    await q.flush();
    expect(server.lines.get("installed")).toEqual({ revision: 3, value: "38.5" });
    expect(server.lines.get("solid")).toEqual({ revision: 1, value: "29.0" });
    expect(store.kept.size).toBe(0);
  });

  it("are sent by nobody but who typed them, and one person's line does not overwrite another's", async () => {
    server.set("down");
    const june = queue("june");
    await put(june, "installed", edit("38.5"));
    await june.flush();
    const bram = queue("bram");
    await bram.load();
    expect(bram.snapshot()).toMatchObject({ waiting: 0, others: 1 });
    expect(bram.snapshot().lines.size).toBe(0);
    server.set("up");
    await put(bram, "installed", edit("38.9"), 0, "bram");
    await bram.flush();
    expect(server.log).toEqual(["installed=38.9"]);
    expect([...store.kept.keys()]).toEqual([keyOf("installed", "june")]);
    const back = queue("june");
    await back.load();
    await back.flush();
    // Bram's stands in the records now: June decides.
    expect(back.snapshot().lines.get(keyOf("installed"))?.stuck).toMatchObject({ kind: "conflict", theirs: { valueText: "38.9" } });
  });

  it("stay while the person is signed out", async () => {
    server.set("signed-out");
    const q = queue();
    await put(q, "installed", edit("38.5"));
    await q.flush();
    expect(q.snapshot()).toMatchObject({ waiting: 1, link: "signed-out" });
    server.set("up");
    await q.flush();
    expect(server.log).toEqual(["installed=38.5"]);
  });
});

import { mkdtempSync } from "node:fs";
import { tmpdir } from "node:os";
import path from "node:path";
import { beforeAll, describe, expect, it } from "vitest";
import { readFile } from "@/modules/documents/files";
import { NotFound } from "@/modules/access/context";
import { HERO_FLOWS, HERO_LIFTS_UM } from "@/tests/support/hero-flow";
import { must, requestId, testShop, type TestShop } from "@/tests/support/shop";
import { addOwnHead } from "./commands/families";
import { addBench, addFixture, recordBenchCheck } from "./commands/gear";
import { libraryInput } from "./library-input";
import { libraryTests } from "./queries/library";
import { flowFilesOf } from "./queries/upload";
import { uploadReadings, uploadSheetPhoto } from "./upload-file";

let a: TestShop;
let b: TestShop;
let bench: string;
let fixture: string;
beforeAll(async () => {
  process.env.VK_FILES_DIR = mkdtempSync(path.join(tmpdir(), "vk-files-"));
  a = await testShop("first");
  b = await testShop("second");
  bench = must(await addBench(a.as("lead"), { name: "Bench 1" })).id;
  fixture = must(await addFixture(a.as("lead"), { name: "77", boreMm: "77" })).id;
});
const newHead = async (mark: string, cylinders = 1) => must(await addOwnHead(a.as("tech"), { mark, family: "S250-4V", cylinders })).id;

const mapping = { headerRows: 1, decimal: ".", lift: 1, flow: 2, side: 0, liftUnit: "in" } as const;
const ask = (headId: string, more: object = {}) => JSON.stringify({ headId, purpose: "baseline", benchId: bench, fixtureId: fixture, nominal: "28", flowUnit: "cfm", pressureUnit: "inH2O", mapping, ...more });
const csv = (text: string, name = "readings.csv") => new File([text], name, { type: "text/csv" });
const heroCsv = (sep = ",") => ["side", "lift", "flow"].join(sep) + "\n" + (["intake", "exhaust"] as const).flatMap((side) => HERO_LIFTS_UM.map((um, i) => [side, (um / 25_400).toFixed(3), HERO_FLOWS[side].before[i]].join(sep))).join("\n");
const testsOf = async (mark: string) => (await libraryTests(a.as("tech"), libraryInput.parse({ q: mark }))).rows;

describe("a file of readings", () => {
  it("becomes the tests of both sides, with the check of its day, and lies beside them as it came", async () => {
    const head = await newHead("FILE-1");
    must(await recordBenchCheck(a.as("insp", "2026-01-20T15:00:00Z"), { benchId: bench, plates: [{ serial: "P60", reference: "60", indicated: "60" }] }));
    const key = requestId();
    const read = must(await uploadReadings(a.as("tech"), csv(heroCsv()), ask(head, { flowedAt: "2026-01-20T16:00:00Z" }), key));
    expect(read).toMatchObject({ readings: 16, leftOut: 0, duplicates: 0, already: [], tests: [{ side: "exhaust", readings: 8 }, { side: "intake", readings: 8 }] });
    expect(must(await uploadReadings(a.as("tech"), csv(heroCsv()), ask(head, { flowedAt: "2026-01-20T16:00:00Z" }), key)).fileId).toBe(read.fileId);
    const rows = await testsOf("FILE-1");
    expect(rows.map((r) => [r.side, r.peakCfm, r.startedAt]).sort()).toEqual([["exhaust", 94.8, "2026-01-20T16:00:00.000Z"], ["intake", 127, "2026-01-20T16:00:00.000Z"]]);
    expect(rows[0]?.importedFrom).toMatch(/^readings\.csv \([0-9a-f]{12}\)$/);
    const { files } = await flowFilesOf(a.as("counter"), head);
    expect(files).toMatchObject([{ id: read.fileId, name: "readings.csv", mime: "text/csv" }]);
    expect((await readFile(a.as("tech"), read.fileId)).bytes.toString("utf8")).toBe(heroCsv());
  });

  it("is read whatever its delimiter, decimal sign and encoding", async () => {
    const head = await newHead("FILE-2");
    const text = heroCsv(";").replaceAll(".", ",").replace("side", "Größe");
    const bytes = Uint8Array.from([...text].map((c) => c.charCodeAt(0)));
    must(await uploadReadings(a.as("tech"), new File([bytes], "daten.csv"), ask(head, { mapping: { ...mapping, decimal: "," } }), requestId()));
    expect((await testsOf("FILE-2")).map((r) => r.peakCfm).sort()).toEqual([127, 94.8]);
  });

  it("is refused row by row, and nothing is kept; rows left out on purpose let the rest in", async () => {
    const head = await newHead("FILE-3");
    const text = "side,lift,flow\nintake,.050,24.6\nintake,.100,much\nup,.150,71.2\nintake,.150,71.2";
    const refused = await uploadReadings(a.as("tech"), csv(text), ask(head), requestId());
    expect(refused).toMatchObject({ ok: false, refusal: { code: "ROWS_REFUSED", field: "rows", data: { row: 3, count: 2 } } });
    expect(refused.ok ? "" : refused.refusal.message).toMatch(/Row 3: "much" is no flow.*Row 4: "up" is no side/);
    expect(await testsOf("FILE-3")).toEqual([]);
    expect((await flowFilesOf(a.as("tech"), head)).files).toEqual([]);
    expect(must(await uploadReadings(a.as("tech"), csv(text), ask(head, { leaveOut: [3, 4], reason: "one lift was not read" }), requestId()))).toMatchObject({ readings: 2, leftOut: 2 });
  });

  it("asks about a doubtful reading and keeps it with a reason, all in one go", async () => {
    const head = await newHead("FILE-4");
    const text = "side,lift,flow\nintake,.050,24.6\nintake,.100,48.9\nintake,.150,7.12\nintake,.200,90.8";
    const asked = await uploadReadings(a.as("tech"), csv(text), ask(head), requestId());
    expect(asked).toMatchObject({ ok: false, refusal: { code: "ROW_REFUSED", field: "reason", data: { row: 4, code: "JUMP_LARGE" } } });
    expect(await testsOf("FILE-4")).toEqual([]);
    const kept = must(await uploadReadings(a.as("tech"), csv(text), ask(head, { reason: "read as printed" }), requestId()));
    expect(kept.asked).toContain(4);
    expect(await testsOf("FILE-4")).toHaveLength(1);
  });

  it("is known when it comes again, also under another name or in another order", async () => {
    const head = await newHead("FILE-5");
    must(await uploadReadings(a.as("tech"), csv(heroCsv()), ask(head), requestId()));
    expect(await uploadReadings(a.as("tech"), csv(heroCsv(), "again.csv"), ask(head), requestId())).toMatchObject({ ok: false, refusal: { code: "FILE_KNOWN" } });
    const [first = "", ...rest] = heroCsv().split("\n");
    expect(await uploadReadings(a.as("tech"), csv([first, ...rest.reverse()].join("\n")), ask(head), requestId())).toMatchObject({ ok: false, refusal: { code: "ALREADY_ON_RECORD" } });
    expect(await testsOf("FILE-5")).toHaveLength(2);
  });

  it("is refused when it is empty, no text, too long, of the future or for a port that is not there", async () => {
    const head = await newHead("FILE-6");
    const code = async (file: File, more: object = {}) => { const r = await uploadReadings(a.as("tech"), file, ask(head, more), requestId()); return r.ok ? "ok" : r.refusal.code; };
    expect(await code(csv(""))).toBe("FILE_EMPTY");
    expect(await code(new File([new Uint8Array([0x50, 0x4b, 3, 4, 0, 0])], "book.csv"))).toBe("FILE_NOT_TEXT");
    expect(await code(new File([new Uint8Array(1_000_001).fill(65)], "long.csv"))).toBe("FILE_TOO_LARGE");
    expect(await code(csv(heroCsv()), { flowedAt: "2027-01-01T00:00:00Z" })).toBe("TIME_NOT_IN_ORDER");
    expect(await code(csv("side,lift,flow\n"))).toBe("NOTHING_READ");
    expect(await code(csv(heroCsv()), { headId: "not an id" })).toBe("INVALID_INPUT");
    expect(await testsOf("FILE-6")).toEqual([]);
  });

  it("cannot be put on another shop's head, nor by a role that does not record", async () => {
    const head = await newHead("FILE-7");
    expect(await uploadReadings(b.as("owner"), csv(heroCsv()), ask(head), requestId())).toMatchObject({ ok: false, refusal: { code: "NOT_FOUND" } });
    await expect(uploadReadings(a.as("counter"), csv(heroCsv()), ask(head), requestId())).rejects.toThrow(NotFound);
    expect((await flowFilesOf(b.as("owner"), head)).files).toEqual([]);
  });
});

describe("a photograph of the paper sheet", () => {
  it("is drawn anew and kept with its head; what is no picture is refused", async () => {
    const head = await newHead("PHOTO-1");
    // A red dot, one pixel, as PNG.
    const png = Buffer.from("iVBORw0KGgoAAAANSUhEUgAAAAEAAAABCAYAAAAfFcSJAAAADUlEQVR42mP8z8BQDwAEhQGAhKmMIQAAAABJRU5ErkJggg==", "base64");
    const kept = must(await uploadSheetPhoto(a.as("tech"), head, new File([new Uint8Array(png)], "sheet.png")));
    const { photos } = await flowFilesOf(a.as("tech"), head);
    expect(photos).toMatchObject([{ id: kept.id, mime: "image/jpeg", hasThumb: true }]);
    expect((await uploadSheetPhoto(a.as("tech"), head, new File(["no picture"], "x.png"))).ok).toBe(false);
    expect(await uploadSheetPhoto(b.as("owner"), head, new File([new Uint8Array(png)], "sheet.png"))).toMatchObject({ ok: false, refusal: { code: "NOT_FOUND" } });
  });
});

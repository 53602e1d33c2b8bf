import "server-only";
import { and, eq, sql } from "drizzle-orm";
import { files, flowTests, heads } from "@/db/schema";
import { defineCommand } from "@/modules/access/command";
import type { TxContext } from "@/modules/access/context";
import { addFileRow } from "@/modules/documents/files";
import { ok, refuse, type Result } from "@/modules/kernel/result";
import type { z } from "@/modules/kernel/zod";
import { fileRows, type FileReading } from "../domain/file-rows";
import { fileTable } from "../file-table";
import { rawTests } from "../queries/tests-of-head";
import { startTestInput } from "../input";
import { readFileInput, sheetPhotoInput } from "../upload-input";
import { completeTest } from "./finish-test";
import { writeReading } from "./record-reading";
import { openTest } from "./start-test";

type Upload = z.output<typeof readFileInput>;
/** Kind of the files a head's readings came from, and of photographs of its paper sheets. */
export const FLOW_FILE = "flow-readings";
export const FLOW_PHOTO = "flow-sheet";

const sameFlow = (a: string, b: string) => Number(a.replace(",", ".")) === Number(b.replace(",", "."));

/** A finished test of this port that holds exactly these readings, if there is one. */
async function onRecord(ctx: TxContext, headId: string, side: string, cylinder: number, purpose: string, readings: readonly FileReading[]): Promise<boolean> {
  const tests = (await rawTests(ctx, { headIds: [headId] })).filter((t) => t.side === side && t.cylinder === cylinder && t.purpose === purpose && t.state === "complete");
  return tests.some((t) => {
    const cells = t.cells.filter((c) => c.valueText !== "");
    return cells.length === readings.length && readings.every((r) => cells.some((c) => c.liftUm === r.liftUm && c.repeatNo === r.repeatNo && sameFlow(c.valueText, r.valueText)));
  });
}

async function writePort(ctx: TxContext, at: TxContext, input: Upload, side: "intake" | "exhaust", cylinder: number, readings: readonly FileReading[]): Promise<Result<{ testId: string; asked: number[] }>> {
  const sorted = [...readings].sort((a, b) => a.liftUm - b.liftUm || a.repeatNo - b.repeatNo);
  const start = startTestInput.parse({
    headId: input.headId, cylinder, side, purpose: input.purpose, benchId: input.benchId, fixtureId: input.fixtureId, nominal: input.nominal, entry: side === "exhaust" && input.entry === "radius" ? "none" : input.entry,
    valve: input.valve, seatNote: input.seatNote, liftUnit: input.mapping.liftUnit, lifts: [...new Map(sorted.map((r) => [r.liftUm, r.liftText])).values()], liftsReason: input.reason,
  });
  const opened = await openTest(at, start, { importedFrom: `${input.file.name} (${input.file.sha256.slice(0, 12)})` });
  if (!opened.ok) return opened;
  const { testId } = opened.value;
  const asked: number[] = [];
  for (const r of sorted) {
    const cell = {
      lift: r.liftText, liftUnit: input.mapping.liftUnit, repeatNo: r.repeatNo, value: r.valueText, valueUnit: input.flowUnit, pressure: r.pressureText, pressureUnit: input.pressureUnit, revisionSeen: 0,
      ...(r.rangeLabel === null ? {} : { range: r.rangeLabel }),
    };
    let written = await writeReading(at, testId, cell, "file");
    if (!written.ok && input.reason !== "") {
      written = await writeReading(at, testId, { ...cell, acceptedReason: input.reason }, "file");
      if (written.ok) asked.push(r.row);
    }
    if (!written.ok) return refuse("ROW_REFUSED", `Row ${r.row}: ${written.refusal.message}`, { field: written.refusal.code.startsWith("JUMP") || written.refusal.data?.askReason ? "reason" : "rows", data: { row: r.row, code: written.refusal.code } });
  }
  if (!input.finish) return ok({ testId, asked });
  const [row] = await ctx.tx.select({ version: flowTests.version }).from(flowTests).where(and(eq(flowTests.shopId, ctx.shop.id), eq(flowTests.id, testId)));
  const done = await completeTest(ctx, { testId, version: row?.version ?? 1 });
  return done.ok ? ok({ testId, asked }) : done;
}

/**
 * A file of readings becomes tests, one a port and side: all of it, or nothing. The file lies beside them as it came. Rows that
 * cannot be read stop it, each by its number, unless the person leaves them out; what is on record already is not taken twice.
 */
export const readInFile = defineCommand({
  name: "flow.read-file",
  act: "flow.record",
  input: readFileInput,
  secret: ["text"],
  async run(ctx, input) {
    const { tx, shop } = ctx;
    if (!input.file.storageKey.startsWith(`${shop.id}/`)) return refuse("NOT_FOUND", "These bytes are not here.");
    const [head] = await tx.select({ id: heads.id, cylinders: heads.cylinders }).from(heads).where(and(eq(heads.shopId, shop.id), eq(heads.id, input.headId))).for("update");
    if (!head) return refuse("NOT_FOUND", "This head is not here.", { field: "headId" });
    const known = await tx.select({ id: files.id }).from(files).where(and(eq(files.shopId, shop.id), eq(files.kind, FLOW_FILE), eq(files.subjectId, head.id), eq(files.sha256, input.file.sha256))).limit(1);
    if (known.length > 0) return refuse("FILE_KNOWN", "This very file was read in for this head before. Nothing was added.", { field: "file" });
    const { readings, refusals, duplicates } = fileRows(fileTable(input.text).rows, input.mapping, head.cylinders);
    const left = new Set(input.leaveOut);
    const standing = refusals.filter((r) => !left.has(r.row));
    if (standing[0]) {
      const words = standing.slice(0, 5).map((r) => `Row ${r.row}: ${r.words}`).join(" ");
      return refuse("ROWS_REFUSED", `${words}${standing.length > 5 ? ` And ${standing.length - 5} more.` : ""} Mend the file or the mapping, or leave these rows out.`, { field: "rows", data: { row: standing[0].row, count: standing.length } });
    }
    const kept = readings.filter((r) => !left.has(r.row));
    if (kept.length === 0) return refuse("NOTHING_READ", "No row of this file holds a reading by this mapping.", { field: "rows" });
    const flowedAt = input.flowedAt === "" ? ctx.now : new Date(input.flowedAt);
    if (flowedAt > ctx.now) return refuse("TIME_NOT_IN_ORDER", "This is in the future. Give the day it was flowed.", { field: "flowedAt" });
    // Everything about the test is of the day it was flowed; what is written about it is of now.
    const at = { ...ctx, now: flowedAt };
    const ports = [...new Set(kept.map((r) => `${r.cylinder}/${r.side}`))].sort();
    const tests: { testId: string; side: string; cylinder: number; readings: number }[] = [];
    const already: string[] = [];
    const asked: number[] = [];
    for (const port of ports) {
      const mine = kept.filter((r) => `${r.cylinder}/${r.side}` === port);
      const [first] = mine;
      if (!first) continue;
      if (await onRecord(ctx, head.id, first.side, first.cylinder, input.purpose, mine)) { already.push(port); continue; }
      const written = await writePort(ctx, at, input, first.side, first.cylinder, mine);
      if (!written.ok) return written;
      asked.push(...written.value.asked);
      tests.push({ testId: written.value.testId, side: first.side, cylinder: first.cylinder, readings: mine.length });
    }
    if (tests.length === 0) return refuse("ALREADY_ON_RECORD", "Finished tests of this head hold exactly these readings already. Nothing was added.", { field: "file" });
    const fileId = await addFileRow(ctx, {
      kind: FLOW_FILE, name: input.file.name, mime: input.file.mime, extension: "csv", subject: { kind: "head", id: head.id }, note: `${input.purpose}, ${tests.length} test${tests.length === 1 ? "" : "s"}`,
      storageKey: input.file.storageKey, thumbKey: null, sizeBytes: input.file.sizeBytes, sha256: input.file.sha256,
    });
    return ok({ headId: head.id, fileId, tests, readings: tests.reduce((n, t) => n + t.readings, 0), leftOut: refusals.length, duplicates: duplicates.length, already, asked });
  },
  subject: (input) => ({ kind: "head", id: input.headId }),
});

const MOST_PHOTOS = 60;

/** The row of a photograph of the paper sheet; its bytes are safe in the store already. */
export const addSheetPhoto = defineCommand({
  name: "flow.add-sheet-photo",
  act: "flow.record",
  input: sheetPhotoInput,
  async run(ctx, input) {
    const { tx, shop } = ctx;
    const [head] = await tx.select({ id: heads.id }).from(heads).where(and(eq(heads.shopId, shop.id), eq(heads.id, input.headId)));
    if (!head) return refuse("NOT_FOUND", "This head is not here.");
    if (!input.storageKey.startsWith(`${shop.id}/`) || (input.thumbKey !== null && !input.thumbKey.startsWith(`${shop.id}/`))) return refuse("NOT_FOUND", "These bytes are not here.");
    const [{ n } = { n: 0 }] = await tx.select({ n: sql<number>`count(*)::int` }).from(files).where(and(eq(files.shopId, shop.id), eq(files.kind, FLOW_PHOTO), eq(files.subjectId, head.id)));
    if (n >= MOST_PHOTOS) return refuse("TOO_MANY_PHOTOS", `There are ${MOST_PHOTOS} photographs already; that is the most.`);
    const id = await addFileRow(ctx, {
      kind: FLOW_PHOTO, name: input.name, mime: "image/jpeg", extension: "jpg", subject: { kind: "head", id: head.id }, note: input.note, storageKey: input.storageKey, thumbKey: input.thumbKey, sizeBytes: input.sizeBytes, sha256: input.sha256,
    });
    return ok({ id, count: n + 1 });
  },
  subject: (input) => ({ kind: "head", id: input.headId }),
});

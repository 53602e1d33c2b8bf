import "server-only";
import { randomUUID } from "node:crypto";
import { and, eq, inArray } from "drizzle-orm";
import { bankFiles, bankLines } from "@/db/schema";
import { sha256 } from "@/modules/access/audit";
import { defineCommand } from "@/modules/access/command";
import { mustBeAble, personIdOf, type ShopContext } from "@/modules/access/context";
import { ok, refuse, type Result } from "@/modules/kernel/result";
import { sumMinor } from "@/modules/kernel/money";
import type { z } from "@/modules/kernel/zod";
import { readCsv } from "@/modules/outbound/csv/read-csv";
import { type lookAtBankFileInput, takeInBankFileInput } from "./bank-input";
import { bankLinesOf, checkClosing, guessMapping, type BankMapping, type FileLine, type LineRefusal } from "./domain/bank-file";

export interface BankFileLook {
  mapping: BankMapping;
  delimiter: string;
  /** Cells of the first row, as names of the columns. */
  columns: string[];
  /** First rows as they stand in the file. */
  sample: string[][];
  lines: FileLine[];
  lineCount: number;
  sumMinor: number;
  refused: LineRefusal[];
}

/** What a file would bring, without keeping anything: the mapping tried, and each row that would be refused by its number. */
export function lookAtBankFile(ctx: ShopContext, input: z.output<typeof lookAtBankFileInput>): Result<BankFileLook> {
  mustBeAble(ctx, "bank.match");
  const { rows, delimiter } = readCsv(input.text, input.delimiter);
  if (rows.length === 0) return refuse("FILE_EMPTY", "There is no line in this file.", { field: "text" });
  const mapping = input.mapping ?? guessMapping(rows, ctx.shop.locale);
  const { lines, refused } = bankLinesOf(rows, mapping);
  const columns = Array.from({ length: Math.max(...rows.slice(0, 20).map((r) => r.length)) }, (_, i) => (mapping.hasHeader ? rows[0]?.[i] : "") || `Column ${i + 1}`);
  return ok({ mapping, delimiter, columns, sample: rows.slice(0, 4), lines: lines.slice(0, 8), lineCount: lines.length, sumMinor: sumMinor(lines.map((l) => l.amountMinor)), refused: refused.slice(0, 50) });
}

/** Takes a bank's file in, all or nothing. The same file, and lines of it that came in before, are known by their key. */
export const takeInBankFile = defineCommand({
  name: "bank.take-in",
  act: "bank.match",
  input: takeInBankFileInput,
  secret: ["text"],
  async run(ctx, input) {
    const { tx, shop } = ctx;
    const { rows } = readCsv(input.text, input.delimiter);
    const { lines, refused } = bankLinesOf(rows, input.mapping);
    if (refused.length) {
      return { ok: false, refusal: { code: "ROWS_REFUSED", message: `${refused.length} rows cannot be read. Nothing was taken in.`, fields: refused.slice(0, 50).map((r) => ({ path: `rows.${r.row}`, message: `Row ${r.row}: ${r.message}` })) } };
    }
    if (lines.length === 0) return refuse("FILE_EMPTY", "There is no line with money in this file.");
    if (input.opening !== null && input.closing !== null) {
      const wrong = checkClosing(input.opening, input.closing, lines);
      if (wrong) return refuse("CLOSING_DIFFERS", wrong, { field: "closing" });
    }
    const fileId = randomUUID();
    await tx.insert(bankFiles).values({
      shopId: shop.id, id: fileId, name: input.name, sha256: sha256(input.text), openingMinor: input.opening, closingMinor: input.closing, lineCount: lines.length, at: ctx.now, personId: personIdOf(ctx),
    });
    const keyed = lines.map((l) => ({ ...l, lineKey: sha256(l.key) }));
    const known = new Set((await tx.select({ key: bankLines.lineKey }).from(bankLines).where(and(eq(bankLines.shopId, shop.id), inArray(bankLines.lineKey, keyed.map((l) => l.lineKey))))).map((r) => r.key));
    const fresh = keyed.filter((l) => !known.has(l.lineKey));
    if (fresh.length) {
      await tx.insert(bankLines).values(fresh.map((l) => ({ shopId: shop.id, id: randomUUID(), bankFileId: fileId, lineKey: l.lineKey, date: l.date, text: l.text, amountMinor: l.amountMinor })));
    }
    return ok({ fileId, added: fresh.length, knownBefore: keyed.length - fresh.length });
  },
  subject: (_, value) => ({ kind: "bank-file", id: value.fileId }),
});

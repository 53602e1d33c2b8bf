import "server-only";
import { and, asc, eq } from "drizzle-orm";
import { journalEntries, journalLines, stockMovements } from "@/db/schema";
import { defineCommand } from "@/modules/access/command";
import { openingStock } from "@/modules/books/domain/posting-stock";
import { postEntry } from "@/modules/books/post";
import { minor } from "@/modules/kernel/money";
import { ok, refuse } from "@/modules/kernel/result";
import { amountIn, openingInput, reverseInput, scrapInput } from "../input";
import { issueStock } from "./issue-stock";
import { receiveStock } from "./receive-stock";
import { lockOne, notEnough, qtyWords, today, writeMovement } from "./shelf";
import { shareOut } from "./share-out";

/** What a shop brings with it: quantity and its whole value. Dr parts stock / Cr equity. */
export const openStock = defineCommand({
  name: "stock.opening",
  act: "cost.see",
  input: openingInput,
  async run(ctx, input) {
    const value = amountIn(input.value, ctx.shop.currency);
    if (value === null) return refuse("AMOUNT_DECIMALS", "More decimals than the currency has. Type the value of all of it, such as 45.00.", { field: "value" });
    const came = await receiveStock(ctx, {
      partId: input.partId, qtyMilli: input.qty, landedMinor: value, kind: "opening", reason: input.reason, lot: input.lotCode ? { code: input.lotCode, expiresOn: input.expiresOn || null } : null,
    });
    if (!came.ok) return came;
    if (value !== 0) {
      const posted = await postEntry(ctx, { date: today(ctx), text: "Opening stock", rule: "openingStock", sourceKind: "stock-movement", sourceId: came.value.movementId, lines: openingStock({ valueMinor: minor(value) }) });
      if (!posted.ok) return posted;
    }
    return ok({ movementId: came.value.movementId });
  },
  subject: (input) => ({ kind: "part", id: input.partId }),
});

/** Throws parts out, with a reason. An expired lot leaves the shelf this way. Dr scrap / Cr parts stock. */
export const scrapStock = defineCommand({
  name: "stock.scrap",
  act: "stock.write-off",
  input: scrapInput,
  async run(ctx, input) {
    const gone = await issueStock(ctx, { partId: input.partId, qtyMilli: input.qty, lotId: input.lotId || null, purpose: "scrap", reason: input.reason });
    return gone.ok ? ok({ sku: gone.value.sku, qtyMilli: input.qty }) : gone;
  },
  subject: (input) => ({ kind: "part", id: input.partId }),
});

const ELSEWHERE: Record<string, string> = {
  receipt: "Goods taken in are reversed on their purchase order.", "receipt reversal": "This row is a reversal itself.",
  issue: "Parts issued to an order come back on the order's page.", "return from job": "Issue the parts to the order again.", reversal: "This row is a reversal itself.",
};

/** Takes back an opening, a count difference or a scrap by a row of the other sign. The first row stays. */
export const reverseMovement = defineCommand({
  name: "stock.reverse",
  act: "stock.write-off",
  input: reverseInput,
  async run(ctx, input) {
    const [seen] = await ctx.tx.select().from(stockMovements).where(and(eq(stockMovements.shopId, ctx.shop.id), eq(stockMovements.id, input.movementId)));
    if (!seen) return refuse("NOT_FOUND", "This row is not in the ledger.");
    const part = await lockOne(ctx, seen.partId);
    const no = seen.workOrderPartId === null && seen.kind === "issue" ? undefined : ELSEWHERE[seen.kind];
    if (no) return refuse("NOT_REVERSED_HERE", no);
    const [turned] = await ctx.tx.select({ id: stockMovements.id }).from(stockMovements).where(and(eq(stockMovements.shopId, ctx.shop.id), eq(stockMovements.reversesId, seen.id)));
    if (turned) return refuse("ALREADY_REVERSED", "This movement was reversed already.");
    const qtyMilli = -seen.qtyMilli;
    if (part.onHandMilli + qtyMilli < 0) return notEnough(part, part.onHandMilli, seen.qtyMilli);
    // An emptied shelf is worth 0 and no shelf is worth less; what the average moved meanwhile is variance.
    const emptied = part.onHandMilli + qtyMilli === 0;
    const valueMinor = emptied ? -part.valueMinor : Math.max(-seen.valueMinor, -part.valueMinor);
    const movementId = await writeMovement(ctx, { partId: part.partId, lotId: seen.lotId, qtyMilli, valueMinor, kind: "reversal", reversesId: seen.id, reason: input.reason });
    const [entry] = await ctx.tx.select({ id: journalEntries.id }).from(journalEntries)
      .where(and(eq(journalEntries.shopId, ctx.shop.id), eq(journalEntries.sourceKind, "stock-movement"), eq(journalEntries.sourceId, seen.id)));
    const first = entry ? await ctx.tx.select().from(journalLines).where(and(eq(journalLines.shopId, ctx.shop.id), eq(journalLines.entryId, entry.id))).orderBy(asc(journalLines.lineNo)) : [];
    const moved = valueMinor + seen.valueMinor;
    const lines = [...first.map((l) => ({ account: l.accountCode, amountMinor: -l.amountMinor + (l.accountCode === "1200" ? moved : 0) })), { account: "5050", amountMinor: -moved }].filter((l) => l.amountMinor !== 0);
    if (lines.length > 1) {
      const posted = await postEntry(ctx, { date: today(ctx), text: `Reversed: ${qtyWords(Math.abs(qtyMilli), part.stockUnit)} ${part.sku}`, rule: "stockReversed", sourceKind: "stock-movement", sourceId: movementId, reversalOf: entry?.id ?? null, lines });
      if (!posted.ok) return posted;
    }
    await shareOut(ctx, [part.partId]);
    return ok({ movementId, sku: part.sku });
  },
  subject: (input) => ({ kind: "movement", id: input.movementId }),
});

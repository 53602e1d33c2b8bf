import "server-only";
import { and, desc, eq, gt, sql } from "drizzle-orm";
import { lots, stockMovements } from "@/db/schema";
import { defineCommand } from "@/modules/access/command";
import { ableTo, type TxContext } from "@/modules/access/context";
import { countDifference } from "@/modules/books/domain/posting-stock";
import { postEntry } from "@/modules/books/post";
import { instantsOf } from "@/modules/kernel/instant";
import { minor, timesFraction } from "@/modules/kernel/money";
import { milli, milliText } from "@/modules/kernel/quantity";
import { ok, refuse } from "@/modules/kernel/result";
import { issue } from "../domain/moving-average";
import { isCountedInPieces } from "../domain/part-words";
import { countInput } from "../input";
import { shareOut } from "./share-out";
import { lockShelf, stockOf, today, writeMovement, type ShelfPart } from "./shelf";

/** A difference worth more than this, either way, is the manager's to accept (shop rule, minor units). */
const DIFFERENCE_LIMIT_MINOR = 100_00;

/**
 * A count of shelves. The sheet shows no expected number; what moved after the count is taken into account. Each
 * difference is a row of the ledger at today's average, and posts to count differences.
 */
export const countStock = defineCommand({
  name: "stock.count",
  act: "stock.adjust",
  input: countInput,
  async run(ctx, input) {
    const when = countInstant(ctx, input.countedAt);
    if (!when) return refuse("TIME_NOT_READABLE", "Type when it was counted, such as 2026-03-08 and 08:10, not later than now.", { field: "countedAt" });
    const filled = input.lines.map((line, i) => ({ ...line, i })).filter((l) => l.counted !== null);
    if (filled.length === 0) return refuse("NOTHING_COUNTED", "Type at least one count. Lines left empty are not counted.", { field: "lines.0.counted" });
    const shelf = await lockShelf(ctx, filled.map((l) => l.partId));
    const done: { sku: string; lotCode: string | null; differenceMilli: number }[] = [];
    for (const line of filled) {
      const part = shelf.get(line.partId);
      if (!part) continue;
      const field = `lines.${line.i}.counted`;
      const counted = line.counted ?? 0;
      if (part.isKit) return refuse("KIT_HAS_NO_SHELF", `${part.sku} is a kit: count its parts.`, { field });
      if (isCountedInPieces(part.stockUnit) && counted % 1000 !== 0) return refuse("NOT_WHOLE_PIECES", `${milliText(counted)} is not a whole number. ${part.sku} is counted in pieces.`, { field });
      const lot = await lotOf(ctx, part, line.lotId);
      if (part.lotTracked && !lot) return refuse("LOT_MISSING", `${part.sku} is counted lot by lot. Say which lot this is.`, { field });
      const expected = (lot ? lot.onHandMilli : part.onHandMilli) - (await movedSince(ctx, part.partId, lot?.id ?? null, when));
      const differenceMilli = counted - expected;
      const valueMinor = await valueOf(ctx, part, differenceMilli);
      if (valueMinor === null) return refuse("COUNTED_BEFORE_MOVES", `${part.sku} moved after this count so that it cannot have been ${milliText(counted)}. Count it again.`, { field });
      if (Math.abs(valueMinor) > DIFFERENCE_LIMIT_MINOR && !ableTo(ctx, "stock.write-off")) {
        return refuse("DIFFERENCE_TOO_LARGE", `The difference on ${part.sku} is large. Count it once more; if it stays, the manager enters it.`, { field });
      }
      const movementId = await writeMovement(ctx, { partId: part.partId, lotId: lot?.id ?? null, qtyMilli: differenceMilli, valueMinor, kind: "count difference", reason: [input.cause, input.note].filter(Boolean).join(": ") });
      if (valueMinor !== 0) {
        const posted = await postEntry(ctx, { date: today(ctx), text: `Counted ${part.sku}${lot ? `, lot ${lot.code}` : ""}: ${milliText(differenceMilli)}`, rule: "countDifference", sourceKind: "stock-movement", sourceId: movementId, lines: countDifference({ differenceMinor: minor(valueMinor) }) });
        if (!posted.ok) return posted;
      }
      part.onHandMilli += differenceMilli;
      part.valueMinor += valueMinor;
      done.push({ sku: part.sku, lotCode: lot?.code ?? null, differenceMilli });
    }
    await shareOut(ctx, filled.map((l) => l.partId));
    return ok({ counted: done.length, differences: done.filter((d) => d.differenceMilli !== 0) });
  },
  subject: (input) => ({ kind: "part", id: input.lines[0]?.partId ?? "" }),
});

function countInstant(ctx: TxContext, text: string): Date | null {
  if (text === "") return ctx.now;
  const [first] = instantsOf(text, ctx.shop.zone);
  return first && first.getTime() <= ctx.now.getTime() + 60_000 ? first : null;
}

async function lotOf(ctx: TxContext, part: ShelfPart, lotId: string | null) {
  if (!part.lotTracked || !lotId) return null;
  const [lot] = await ctx.tx.select({ id: lots.id, code: lots.code, onHandMilli: lots.onHandMilli }).from(lots)
    .where(and(eq(lots.shopId, ctx.shop.id), eq(lots.partId, part.partId), eq(lots.id, lotId)));
  return lot ?? null;
}

async function movedSince(ctx: TxContext, partId: string, lotId: string | null, when: Date): Promise<number> {
  const [row] = await ctx.tx.select({ qty: sql<string>`coalesce(sum(${stockMovements.qtyMilli}), 0)` }).from(stockMovements)
    .where(and(eq(stockMovements.shopId, ctx.shop.id), eq(stockMovements.partId, partId), lotId ? eq(stockMovements.lotId, lotId) : undefined, gt(stockMovements.at, when)));
  return Number(row?.qty ?? 0);
}

/** Value of a difference: what leaves at average, what is found at average, or at the last receipt when the shelf was empty. Null when more is missing than there is. */
async function valueOf(ctx: TxContext, part: ShelfPart, differenceMilli: number): Promise<number | null> {
  if (differenceMilli === 0) return 0;
  if (differenceMilli < 0) {
    const out = issue(stockOf(part), milli(-differenceMilli));
    return out.ok ? 0 - out.value.costMinor : null;
  }
  if (part.onHandMilli > 0) return timesFraction(part.valueMinor, differenceMilli, part.onHandMilli);
  const [last] = await ctx.tx.select({ qty: stockMovements.qtyMilli, value: stockMovements.valueMinor }).from(stockMovements)
    .where(and(eq(stockMovements.shopId, ctx.shop.id), eq(stockMovements.partId, part.partId), gt(stockMovements.qtyMilli, 0))).orderBy(desc(stockMovements.seq)).limit(1);
  return last ? timesFraction(last.value, differenceMilli, last.qty) : 0;
}

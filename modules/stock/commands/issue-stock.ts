import "server-only";
import { type TxContext } from "@/modules/access/context";
import { partsIssued, partsReturned, type IssuePurpose } from "@/modules/books/domain/posting-stock";
import { postEntry } from "@/modules/books/post";
import { allocate, minor, timesFraction } from "@/modules/kernel/money";
import { milli, milliText } from "@/modules/kernel/quantity";
import { ok, refuse, type Result } from "@/modules/kernel/result";
import { pickFirstExpired } from "../domain/first-expired";
import { issue } from "../domain/moving-average";
import { isCountedInPieces } from "../domain/part-words";
import { netOutByLot } from "../queries/out-by-lot";
import { lockOne, lotsOnHand, notEnough, qtyWords, stockOf, today, writeMovement, type ShelfPart } from "./shelf";
import { shareOut } from "./share-out";

export interface IssueArgs {
  readonly partId: string;
  readonly qtyMilli: number;
  /** A lot chosen by hand; left out, the first to expire goes first. */
  readonly lotId?: string | null;
  /** Days the lot must still be good for this job. */
  readonly daysLeftMin?: number;
  readonly purpose?: IssuePurpose;
  readonly workOrderId?: string | null;
  readonly workOrderPartId?: string | null;
  readonly reason?: string;
}

export interface TakenLot { readonly movementId: string; readonly lotId: string | null; readonly lotCode: string | null; readonly qtyMilli: number; readonly costMinor: number }
export interface Taken { readonly partId: string; readonly sku: string; readonly costMinor: number; readonly lots: readonly TakenLot[] }

/** Half a valve does not exist, and a kit has no shelf of its own. */
export function checkTakeable(part: ShelfPart, qtyMilli: number): Result<null> {
  if (part.isKit) return refuse("KIT_HAS_NO_SHELF", `${part.sku} is a kit: its parts are issued, not the kit.`, { field: "qty" });
  if (!Number.isSafeInteger(qtyMilli) || qtyMilli <= 0) return refuse("QTY_NOT_POSITIVE", "Type a quantity above 0.", { field: "qty" });
  if (isCountedInPieces(part.stockUnit) && qtyMilli % 1000 !== 0) {
    return refuse("NOT_WHOLE_PIECES", `${milliText(qtyMilli)} is not a whole number. ${part.sku} is counted in pieces.`, { field: "qty" });
  }
  return ok(null);
}

/** Which lots give the quantity; `[{ null }]` for a part without lots. Expired lots are never offered. */
async function chooseLots(ctx: TxContext, part: ShelfPart, args: IssueArgs): Promise<Result<{ id: string | null; code: string | null; qtyMilli: number }[]>> {
  if (!part.lotTracked) {
    return args.qtyMilli > part.onHandMilli ? notEnough(part, part.onHandMilli, args.qtyMilli) : ok([{ id: null, code: null, qtyMilli: args.qtyMilli }]);
  }
  const rows = await lotsOnHand(ctx, part.partId);
  const day = today(ctx);
  if (args.lotId) {
    const lot = rows.find((l) => l.id === args.lotId);
    if (!lot) return refuse("LOT_EMPTY", "There is nothing left of that lot. Choose another.", { field: "lotId" });
    if (args.purpose !== "scrap" && lot.expiresOn && lot.expiresOn < day) return refuse("LOT_EXPIRED", `Lot ${lot.code} expired on ${lot.expiresOn}. Take a lot that is still good.`, { field: "lotId", data: { lot: lot.code } });
    if (lot.onHandMilli < args.qtyMilli) return notEnough(part, lot.onHandMilli, args.qtyMilli, ` That is all of lot ${lot.code}.`);
    return ok([{ id: lot.id, code: lot.code, qtyMilli: args.qtyMilli }]);
  }
  const picked = pickFirstExpired({
    lots: rows.map((l) => ({ lot: l.id, expiry: l.expiresOn, availableMilli: milli(l.onHandMilli) })), needMilli: milli(args.qtyMilli), today: day, daysLeftMin: args.daysLeftMin ?? 0,
  });
  const codeOf = new Map(rows.map((l) => [l.id, l.code]));
  if (picked.shortMilli > 0) {
    const away = picked.blocked.map((b) => `lot ${codeOf.get(b.lot) ?? ""} is ${b.why}`).join(", ");
    return notEnough(part, args.qtyMilli - picked.shortMilli, args.qtyMilli, away ? ` Not offered: ${away}.` : "");
  }
  return ok(picked.picks.map((p) => ({ id: p.lot, code: codeOf.get(p.lot) ?? null, qtyMilli: p.qtyMilli })));
}

/**
 * Takes parts off the shelf at moving average: value / quantity * n, rounded once; the last unit takes what is left.
 * Writes the ledger rows, the journal entry of the purpose, and shares the rest out anew.
 * Refuses with the real number and bin; nothing is written then.
 */
export async function issueStock(ctx: TxContext, args: IssueArgs): Promise<Result<Taken>> {
  const part = await lockOne(ctx, args.partId);
  const fit = checkTakeable(part, args.qtyMilli);
  if (!fit.ok) return fit;
  const chosen = await chooseLots(ctx, part, args);
  if (!chosen.ok) return chosen;
  const left = issue(stockOf(part), milli(args.qtyMilli));
  if (!left.ok) return notEnough(part, part.onHandMilli, args.qtyMilli);
  const costs = allocate(left.value.costMinor, chosen.value.map((c) => c.qtyMilli));
  const purpose = args.purpose ?? "work order";
  const taken: TakenLot[] = [];
  for (const [i, lot] of chosen.value.entries()) {
    const costMinor = costs[i] ?? 0;
    const movementId = await writeMovement(ctx, {
      partId: part.partId, lotId: lot.id, qtyMilli: -lot.qtyMilli, valueMinor: -costMinor, kind: purpose === "scrap" ? "scrap" : "issue",
      workOrderId: args.workOrderId ?? null, workOrderPartId: args.workOrderPartId ?? null, reason: args.reason ?? "",
    });
    if (costMinor !== 0) {
      const posted = await postEntry(ctx, {
        date: today(ctx), text: `${purpose === "scrap" ? "Thrown out" : "Issued"} ${qtyWords(lot.qtyMilli, part.stockUnit)} ${part.sku}${lot.code ? `, lot ${lot.code}` : ""}`,
        rule: "partsIssued", sourceKind: "stock-movement", sourceId: movementId, workOrderId: args.workOrderId ?? null, lines: partsIssued({ costMinor: minor(costMinor), purpose }),
      });
      if (!posted.ok) return posted;
    }
    taken.push({ movementId, lotId: lot.id, lotCode: lot.code, qtyMilli: lot.qtyMilli, costMinor });
  }
  await shareOut(ctx, [part.partId]);
  return ok({ partId: part.partId, sku: part.sku, costMinor: left.value.costMinor, lots: taken });
}

export interface ReturnArgs {
  readonly partId: string;
  readonly workOrderId: string;
  readonly workOrderPartId: string;
  readonly issuedMilli: number;
  readonly issuedValueMinor: number;
  readonly qtyMilli: number;
  readonly purpose?: IssuePurpose;
  readonly reason?: string;
}

/** Unused parts back from a work order, into the lots they came from, at the cost they left at. */
export async function returnFromJob(ctx: TxContext, args: ReturnArgs): Promise<Result<{ costMinor: number }>> {
  const part = await lockOne(ctx, args.partId);
  const fit = checkTakeable(part, args.qtyMilli);
  if (!fit.ok) return fit;
  if (args.qtyMilli > args.issuedMilli) {
    const out = qtyWords(args.issuedMilli, part.stockUnit);
    return refuse("RETURN_EXCEEDS_ISSUE", `${out} of ${part.sku} went out to this order, so no more than ${out} can come back.`, { field: "qty", data: { issuedMilli: args.issuedMilli } });
  }
  const costMinor = args.qtyMilli === args.issuedMilli ? args.issuedValueMinor : timesFraction(args.issuedValueMinor, args.qtyMilli, args.issuedMilli);
  const out = await netOutByLot(ctx, args.workOrderPartId);
  let rest = args.qtyMilli;
  const into: { lotId: string | null; qtyMilli: number }[] = [];
  for (const lot of out) {
    const n = Math.min(rest, lot.qtyMilli);
    if (n > 0) into.push({ lotId: lot.lotId, qtyMilli: n });
    rest -= n;
  }
  if (rest > 0) return refuse("RETURN_EXCEEDS_ISSUE", `The ledger does not show that much of ${part.sku} gone to this order.`, { field: "qty" });
  const shares = allocate(costMinor, into.map((x) => x.qtyMilli));
  for (const [i, lot] of into.entries()) {
    const value = shares[i] ?? 0;
    const movementId = await writeMovement(ctx, {
      partId: part.partId, lotId: lot.lotId, qtyMilli: lot.qtyMilli, valueMinor: value, kind: "return from job", workOrderId: args.workOrderId, workOrderPartId: args.workOrderPartId, reason: args.reason ?? "",
    });
    if (value === 0) continue;
    const posted = await postEntry(ctx, {
      date: today(ctx), text: `Back from the job ${qtyWords(lot.qtyMilli, part.stockUnit)} ${part.sku}`, rule: "partsReturned", sourceKind: "stock-movement", sourceId: movementId,
      workOrderId: args.workOrderId, lines: partsReturned({ costMinor: minor(value), purpose: args.purpose ?? "work order" }),
    });
    if (!posted.ok) return posted;
  }
  await shareOut(ctx, [part.partId]);
  return ok({ costMinor });
}

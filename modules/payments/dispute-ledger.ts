import "server-only";
import { and, eq } from "drizzle-orm";
import { journalEntries, journalLines, payments } from "@/db/schema";
import type { TxContext } from "@/modules/access/context";
import { openOf } from "@/modules/books/domain/open-sum";
import { moneyReceived, moneyReturned, restoredParts } from "@/modules/books/domain/posting-receipt";
import { openDateFrom, postEntry } from "@/modules/books/post";
import { money } from "@/modules/kernel/format";
import { localDate } from "@/modules/kernel/instant";
import { ok, refuse, type Result } from "@/modules/kernel/result";
import type { ProviderFact } from "@/modules/outbound/payments/port";
import { phaseOfDispute, tookMoney } from "./domain/dispute";
import { UNKNOWN_PAYMENT } from "./events";
import { disputeSource, invoiceBehind, lockPayment, moveBack, takenFrom, type Payment } from "./payment-parts";

type Dispute = Extract<ProviderFact, { kind: "dispute" }>;
type Booked = Result<{ booked: boolean }>;

/** Lines of the entry a dispute has under this rule, by account; null when there is none. */
async function entryOfDispute(ctx: TxContext, rule: string, sourceId: string): Promise<Map<string, number> | null> {
  const rows = await ctx.tx.select({ account: journalLines.accountCode, amountMinor: journalLines.amountMinor }).from(journalEntries)
    .innerJoin(journalLines, and(eq(journalLines.shopId, journalEntries.shopId), eq(journalLines.entryId, journalEntries.id)))
    .where(and(eq(journalEntries.shopId, ctx.shop.id), eq(journalEntries.rule, rule), eq(journalEntries.sourceKind, "dispute"), eq(journalEntries.sourceId, sourceId)));
  return rows.length ? new Map(rows.map((r) => [r.account, r.amountMinor])) : null;
}

const entryFor = async (ctx: TxContext, p: Payment, d: Dispute) => ({
  date: await openDateFrom(ctx, localDate(ctx.now, ctx.shop.zone)), sourceKind: "dispute", sourceId: disputeSource(p.id, d.id), workOrderId: p.workOrderId, customerId: p.customerId,
});

/** The customer's bank took the money back: it leaves clearing, and what it had paid is open again. */
async function bookTaken(ctx: TxContext, p: Payment, d: Dispute): Promise<Booked> {
  if (await entryOfDispute(ctx, "disputeOpened", disputeSource(p.id, d.id))) return ok({ booked: false });
  const left = p.amountMinor - p.refundedMinor;
  if (d.amountMinor > left) {
    return refuse("DISPUTE_EXCEEDS_PAYMENT", `The customer's bank took ${money(d.amountMinor, ctx.shop)} of receipt ${p.receiptNumber} back, but only ${money(left, ctx.shop)} of it is still here. Nothing was booked. Compare it with the provider's records.`);
  }
  const { parts, invoiceId } = await takenFrom(ctx, p, d.amountMinor);
  if (parts.missingMinor > 0) {
    return refuse("NOTHING_TO_REOPEN", `The customer's bank took ${money(d.amountMinor, ctx.shop)} of receipt ${p.receiptNumber} back, but the credit it gave was used on other invoices. Nothing was booked. Settle those with the customer, then try again.`);
  }
  const posted = await postEntry(ctx, { ...(await entryFor(ctx, p, d)), rule: "disputeOpened", text: `Charge of ${p.receiptNumber} disputed`, lines: moneyReturned({ ...parts, way: "card" }) });
  if (!posted.ok) return posted;
  await moveBack(ctx, p, parts, invoiceId, -1);
  return ok({ booked: true });
}

/** The shop was right: the money is back. It pays what is open now; what was paid otherwise meanwhile is the customer's credit. */
async function bookWon(ctx: TxContext, p: Payment, d: Dispute): Promise<Booked> {
  const opened = await entryOfDispute(ctx, "disputeOpened", disputeSource(p.id, d.id));
  if (!opened || (await entryOfDispute(ctx, "disputeWon", disputeSource(p.id, d.id)))) return ok({ booked: false });
  const amountMinor = 0 - (opened.get("1020") ?? 0);
  const invoice = await invoiceBehind(ctx, p);
  const parts = restoredParts({ amountMinor, openMinor: invoice ? openOf(invoice) : 0, depositMinor: invoice ? 0 : opened.get("2100") ?? 0 });
  const posted = await postEntry(ctx, { ...(await entryFor(ctx, p, d)), rule: "disputeWon", text: `Dispute of ${p.receiptNumber} won`, lines: moneyReceived({ ...parts, way: "card" }) });
  if (!posted.ok) return posted;
  await moveBack(ctx, p, parts, invoice?.id ?? null, 1);
  return ok({ booked: true });
}

/**
 * `charge.dispute.*`: a disputed charge. A question of the bank moves no money; a dispute takes it, once; won brings it
 * back, once; lost leaves it as it was taken, with the invoice open. Late, twice and in any order it comes to the same.
 * The provider's fee is booked with the payout that holds it.
 */
export async function disputeSeen(ctx: TxContext, d: Dispute): Promise<Booked> {
  const by = d.paymentIntent ? eq(payments.providerPaymentId, d.paymentIntent) : null;
  const p = by ? await lockPayment(ctx, by) : undefined;
  if (!by || !p) return refuse("UNKNOWN_PAYMENT", UNKNOWN_PAYMENT);
  if (d.currency !== ctx.shop.currency) return refuse("CURRENCY_DIFFERS", `A dispute in ${d.currency} cannot be booked in ${ctx.shop.currency}.`);
  const phase = phaseOfDispute(d.status);
  if (!phase) return refuse("UNKNOWN_STATE", `The provider says the dispute of receipt ${p.receiptNumber} is "${d.status}", which is not known here. Nothing was booked. Look at it in the provider's own records.`);
  if (!tookMoney(phase)) return ok({ booked: false });
  const taken = await bookTaken(ctx, p, d);
  if (!taken.ok || phase !== "won") return taken;
  return bookWon(ctx, (await lockPayment(ctx, by)) ?? p, d);
}

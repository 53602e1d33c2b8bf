import "server-only";
import { and, eq, inArray, like, sql } from "drizzle-orm";
import { bankLines, invoices, journalEntries, journalLines, payments, payoutItems, payouts } from "@/db/schema";
import { changedMeanwhile, defineCommand } from "@/modules/access/command";
import { ableTo, personIdOf, settingsOf, type TxContext } from "@/modules/access/context";
import { accountOf } from "@/modules/books/domain/accounts";
import { credit, debit, entryOf, mirror, type EntryLine } from "@/modules/books/domain/entry";
import { writtenOff } from "@/modules/books/domain/posting-sales";
import { openDateFrom, postEntry } from "@/modules/books/post";
import { openOf } from "@/modules/books/domain/open-sum";
import { money } from "@/modules/kernel/format";
import { startOfDay } from "@/modules/kernel/instant";
import { minor, sumMinor } from "@/modules/kernel/money";
import { ok, refuse, type Result } from "@/modules/kernel/result";
import type { z } from "@/modules/kernel/zod";
import { lockMatchInput, unlockMatchInput } from "./bank-input";
import { bookPayment } from "./book-payment";
import { allocatePayment } from "./domain/allocation";
import { bookPayout } from "./payouts";

type Line = typeof bankLines.$inferSelect;
type LockInput = z.output<typeof lockMatchInput>;
const lineAt = (ctx: TxContext, id: string) => and(eq(bankLines.shopId, ctx.shop.id), eq(bankLines.id, id));
/** Payments that a bank line made are known by it, so that a repeat makes none and unlocking finds them. */
const keyOf = (line: Line, n: number) => `bank:${line.id}:${line.version}:${n}`;

/** Money in for invoices: one payment each, in the order named; what is over becomes the customer's credit on the last. */
async function lockInvoices(ctx: TxContext, line: Line, input: LockInput): Promise<Result<string>> {
  if (line.amountMinor <= 0) return refuse("MONEY_OUT", "Money that went out does not pay an invoice.");
  const rows = await ctx.tx.select().from(invoices).where(and(eq(invoices.shopId, ctx.shop.id), inArray(invoices.id, input.ids), eq(invoices.kind, "invoice"), eq(invoices.state, "issued"))).for("update");
  if (rows.length !== new Set(input.ids).size || rows.length === 0) return refuse("NOT_FOUND", "One of these invoices is not open here.");
  const open = rows.map((i) => ({ documentId: i.id, due: i.dueOn ?? "", openMinor: openOf(i) }));
  const shared = allocatePayment(minor(line.amountMinor), open, input.ids);
  if (!shared.ok) return shared;
  const { applied, creditMinor } = shared.value;
  for (const [n, part] of applied.entries()) {
    const amount = part.amountMinor + (n === applied.length - 1 ? creditMinor : 0);
    const booked = await bookPayment(ctx, { for: { invoiceId: part.documentId }, method: "transfer", amountMinor: amount, receivedAt: startOfDay(line.date, ctx.shop.zone), providerPaymentId: keyOf(line, n), note: line.text.slice(0, 120) });
    if (!booked.ok) return booked;
    if (input.rest === "write-off" && rows.length === 1 && booked.value.openMinor > 0) {
      const { writeOffLimitMinor } = await settingsOf(ctx);
      if (booked.value.openMinor > writeOffLimitMinor && !ableTo(ctx, "settings.write")) return refuse("ABOVE_LIMIT", `Above ${money(writeOffLimitMinor, ctx.shop)} only the owner may write off. Leave it open instead.`, { field: "rest" });
      const [i] = rows;
      const posted = await postEntry(ctx, {
        date: await openDateFrom(ctx, line.date), text: `Short payment written off on ${i?.number ?? ""}`, rule: "writtenOff", sourceKind: "bank-line", sourceId: `${line.id}:${line.version}`,
        workOrderId: i?.workOrderId ?? null, customerId: i?.customerId ?? null, lines: writtenOff({ amountMinor: minor(booked.value.openMinor) }),
      });
      if (!posted.ok) return posted;
      await ctx.tx.update(invoices).set({ paidMinor: sql`${invoices.paidMinor} + ${booked.value.openMinor}` }).where(and(eq(invoices.shopId, ctx.shop.id), eq(invoices.id, part.documentId)));
    }
  }
  return ok(applied[0]?.documentId ?? "");
}

/** A check or transfer booked at the counter before: nothing is posted again. */
async function lockPaymentLine(ctx: TxContext, line: Line, id: string): Promise<Result<string>> {
  const [p] = await ctx.tx.select().from(payments).where(and(eq(payments.shopId, ctx.shop.id), eq(payments.id, id))).for("update");
  if (!p || !["cheque", "transfer"].includes(p.method) || p.purpose === "undone") return refuse("NOT_FOUND", "This payment is not here, or did not go through the bank.");
  const [taken] = await ctx.tx.select({ id: bankLines.id }).from(bankLines).where(and(eq(bankLines.shopId, ctx.shop.id), eq(bankLines.matchedId, id)));
  if (taken) return refuse("TAKEN", "This payment is locked to another bank line already.");
  return p.amountMinor === line.amountMinor ? ok(id) : refuse("AMOUNT_DIFFERS", `The payment is ${money(p.amountMinor, ctx.shop)}, the bank line ${money(line.amountMinor, ctx.shop)}. Only the exact sum can be locked.`);
}

/** A payout: to the cent, and with nothing in it unexplained. */
async function lockPayout(ctx: TxContext, line: Line, id: string): Promise<Result<string>> {
  const [p] = await ctx.tx.select().from(payouts).where(and(eq(payouts.shopId, ctx.shop.id), eq(payouts.id, id))).for("update");
  if (!p) return refuse("NOT_FOUND", "This payout is not here.");
  if (p.bankLineId) return refuse("TAKEN", "This payout is locked to another bank line already.");
  const items = await ctx.tx.select({ net: payoutItems.netMinor }).from(payoutItems).where(and(eq(payoutItems.shopId, ctx.shop.id), eq(payoutItems.payoutId, id)));
  const parts = sumMinor(items.map((i) => i.net));
  if (parts !== line.amountMinor || p.amountMinor !== line.amountMinor) {
    return refuse("PAYOUT_DIFFERS", `The parts come to ${money(parts, ctx.shop)}, the bank shows ${money(line.amountMinor, ctx.shop)}: ${money(parts - line.amountMinor, ctx.shop)} is not explained.`, { data: { differenceMinor: parts - line.amountMinor } });
  }
  const booked = await bookPayout(ctx, id);
  if (!booked.ok) return booked;
  if (!booked.value.booked) return refuse("PAYOUT_OPEN", "A charge in this payout is not in the books yet. Say what it paid first.");
  await ctx.tx.update(payouts).set({ bankLineId: line.id }).where(and(eq(payouts.shopId, ctx.shop.id), eq(payouts.id, id)));
  return ok(id);
}

/** Money with no document of ours behind it (a bill, bank charges): a person names the account. */
async function lockAccount(ctx: TxContext, line: Line, code: string | null | undefined): Promise<Result<string>> {
  const account = accountOf(code ?? "");
  if (!account || ["1010", "1020", "1100", "2100", "2110"].includes(account.code)) return refuse("ACCOUNT_UNKNOWN", "Choose an account from the list. Invoices, payouts and deposits have their own ways.", { field: "account" });
  const posted = await postEntry(ctx, {
    date: await openDateFrom(ctx, line.date), text: line.text.slice(0, 200) || "Bank line", rule: "bankLine", sourceKind: "bank-line", sourceId: `${line.id}:${line.version}`,
    lines: entryOf(debit("1010", line.amountMinor), credit(account.code, line.amountMinor)),
  });
  return posted.ok ? ok(posted.value.id) : posted;
}

/** Locks a bank line to what it paid. Only a person does this, one line at a time, and nothing inexact locks as a payout. */
export const lockMatch = defineCommand({
  name: "bank.lock",
  act: "bank.match",
  input: lockMatchInput,
  async run(ctx, input) {
    const [line] = await ctx.tx.select().from(bankLines).where(lineAt(ctx, input.lineId)).for("update");
    if (!line) return refuse("NOT_FOUND", "This bank line is not here.");
    if (line.version !== input.version || line.matchedKind) return changedMeanwhile("This bank line");
    const [first = ""] = input.ids;
    const matched = input.kind === "invoice" ? await lockInvoices(ctx, line, input)
      : input.kind === "payment" ? await lockPaymentLine(ctx, line, first)
      : input.kind === "payout" ? await lockPayout(ctx, line, first)
      : await lockAccount(ctx, line, input.account);
    if (!matched.ok) return matched;
    await ctx.tx.update(bankLines).set({ matchedKind: input.kind, matchedId: matched.value || null, matchedAt: ctx.now, matchedBy: personIdOf(ctx) }).where(lineAt(ctx, line.id));
    return ok({ lineId: line.id, kind: input.kind });
  },
  subject: (input) => ({ kind: "bank-line", id: input.lineId }),
});

/** Turns round every entry that locking this line made. */
async function undoEntries(ctx: TxContext, line: Line, sources: readonly { kind: string; id: string }[]): Promise<Result<null>> {
  for (const s of sources) {
    const entries = await ctx.tx.select().from(journalEntries).where(and(eq(journalEntries.shopId, ctx.shop.id), eq(journalEntries.sourceKind, s.kind), eq(journalEntries.sourceId, s.id)));
    for (const e of entries) {
      const lines = await ctx.tx.select().from(journalLines).where(and(eq(journalLines.shopId, ctx.shop.id), eq(journalLines.entryId, e.id)));
      const posted = await postEntry(ctx, {
        date: await openDateFrom(ctx, line.date), text: `Match taken back: ${e.text}`.slice(0, 240), rule: "matchUndone", sourceKind: "journal-entry", sourceId: e.id, workOrderId: e.workOrderId, customerId: e.customerId, reversalOf: e.id,
        lines: mirror(lines.map((l) => ({ account: l.accountCode, amountMinor: minor(l.amountMinor) }) as EntryLine)),
      });
      if (!posted.ok) return posted;
    }
  }
  return ok(null);
}

/** Takes a match back: what it booked is turned round by entries of its own, what it only linked is unlinked. */
export const unlockMatch = defineCommand({
  name: "bank.unlock",
  act: "bank.match",
  input: unlockMatchInput,
  async run(ctx, input) {
    const { tx, shop } = ctx;
    const [line] = await tx.select().from(bankLines).where(lineAt(ctx, input.lineId)).for("update");
    if (!line) return refuse("NOT_FOUND", "This bank line is not here.");
    if (line.version !== input.version || !line.matchedKind) return changedMeanwhile("This bank line");
    if (line.matchedKind === "payout") await tx.update(payouts).set({ bankLineId: null }).where(and(eq(payouts.shopId, shop.id), eq(payouts.bankLineId, line.id)));
    const sources = [{ kind: "bank-line", id: `${line.id}:${line.version}` }];
    if (line.matchedKind === "invoice") {
      const made = await tx.select().from(payments).where(and(eq(payments.shopId, shop.id), like(payments.providerPaymentId, `bank:${line.id}:${line.version}:%`))).for("update");
      if (made.some((p) => p.refundedMinor > 0)) return refuse("REFUNDED", "A part of this payment was given back already. It cannot be taken apart any more.");
      const writeOff = await tx.select({ id: journalEntries.id, amount: journalLines.amountMinor }).from(journalEntries)
        .innerJoin(journalLines, and(eq(journalLines.shopId, journalEntries.shopId), eq(journalLines.entryId, journalEntries.id), eq(journalLines.accountCode, "6200")))
        .where(and(eq(journalEntries.shopId, shop.id), eq(journalEntries.rule, "writtenOff"), eq(journalEntries.sourceId, `${line.id}:${line.version}`)));
      for (const p of made) {
        sources.push({ kind: "payment", id: p.id });
        const creditPart = await tx.select({ a: journalLines.amountMinor }).from(journalLines).innerJoin(journalEntries, and(eq(journalEntries.shopId, journalLines.shopId), eq(journalEntries.id, journalLines.entryId)))
          .where(and(eq(journalLines.shopId, shop.id), eq(journalEntries.sourceKind, "payment"), eq(journalEntries.sourceId, p.id), eq(journalLines.accountCode, "1100")));
        const back = -sumMinor(creditPart.map((c) => c.a)) + (p === made[0] ? sumMinor(writeOff.map((w) => w.amount)) : 0);
        if (p.invoiceId) await tx.update(invoices).set({ paidMinor: sql`${invoices.paidMinor} - ${back}` }).where(and(eq(invoices.shopId, shop.id), eq(invoices.id, p.invoiceId)));
        await tx.update(payments).set({ purpose: "undone", appliedMinor: p.amountMinor }).where(and(eq(payments.shopId, shop.id), eq(payments.id, p.id)));
      }
    }
    const undone = await undoEntries(ctx, line, sources);
    if (!undone.ok) return undone;
    await tx.update(bankLines).set({ matchedKind: null, matchedId: null, matchedAt: null, matchedBy: null, version: sql`${bankLines.version} + 1` }).where(lineAt(ctx, line.id));
    return ok({ lineId: line.id, version: line.version + 1 });
  },
  subject: (input) => ({ kind: "bank-line", id: input.lineId }),
});


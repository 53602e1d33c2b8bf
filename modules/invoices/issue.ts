import "server-only";
import { and, asc, eq, sql } from "drizzle-orm";
import { invoices, payments } from "@/db/schema";
import { changedMeanwhile, defineCommand } from "@/modules/access/command";
import { ableTo, settingsOf, type TxContext } from "@/modules/access/context";
import { leaveJob } from "@/modules/access/jobs";
import { takeYearNumber } from "@/modules/access/numbers";
import { balanceFor } from "@/modules/books/balances";
import { readDocumentNumber } from "@/modules/books/domain/document-number";
import { credit, debit, entryOf, type EntryLine } from "@/modules/books/domain/entry";
import { depositApplied, invoiceIssued } from "@/modules/books/domain/posting-sales";
import { costOfParts } from "@/modules/books/domain/posting-stock";
import { postEntry } from "@/modules/books/post";
import { money } from "@/modules/kernel/format";
import { minor } from "@/modules/kernel/money";
import { ok, refuse, type Result } from "@/modules/kernel/result";
import { documentReference } from "./domain/creditor-reference";
import { checkWithinApproved } from "./domain/totals";
import type { InvoiceSnapshot } from "./domain/invoice-snapshot";
import { draftAt, lockDraft } from "./draft";
import { issueInvoiceInput } from "./input";
import { billedBefore, draftSheet, orderToBill, type DraftSheet } from "./sheet";

/** Everything that must hold before a number is taken. */
function checkSheet(ctx: TxContext, sheet: DraftSheet, shownTotalMinor: number): Result<DraftSheet> {
  const { snapshot } = sheet;
  if (!snapshot.lines.some((l) => l.kind !== "note")) return refuse("NOTHING_TO_BILL", "There is nothing on this invoice. Take the draft away instead.");
  if (snapshot.totals.totalMinor < 0) return refuse("TOTAL_BELOW_ZERO", "An invoice cannot be below 0. Money back is a credit note or a refund.");
  if (snapshot.totals.totalMinor !== shownTotalMinor) {
    return changedMeanwhile(`The total is ${money(snapshot.totals.totalMinor, ctx.shop)} now; the draft`);
  }
  const within = checkWithinApproved(minor(sheet.billedNetMinor), minor(sheet.approvedNetMinor));
  if (!within.ok) {
    const over = money(sheet.billedNetMinor - sheet.approvedNetMinor, ctx.shop);
    return refuse("OVER_APPROVED", `This bills ${over} more than the customer approved. Lower a line, or send the difference for approval first. Freight at cost and tax may go over.`);
  }
  const waiting = snapshot.pieces.filter((p) => !p.released).map((p) => p.tag);
  if (waiting.length && !ableTo(ctx, "handover.unpaid")) {
    return refuse("NOT_RELEASED", `${waiting.join(", ")} ${waiting.length === 1 ? "is" : "are"} not released yet. Bill released pieces only, or ask the manager to issue this one.`);
  }
  return ok(sheet);
}

/**
 * Issues a draft: everything is computed and checked first, then the number is taken, as late as can be, in this same
 * transaction; what is printed is frozen with the rule set; the sale, the deposit and the cost of the parts are posted.
 * The paper and the mail are the worker's.
 */
export const issueInvoice = defineCommand({
  name: "invoices.issue",
  act: "invoice.write",
  input: issueInvoiceInput,
  async run(ctx, input) {
    const { tx } = ctx;
    const draft = await lockDraft(ctx, input);
    if (!draft.ok) return draft;
    const drawn = await draftSheet(ctx, draft.value);
    if (!drawn.ok) return drawn;
    const checked = checkSheet(ctx, drawn.value, input.totalMinor);
    if (!checked.ok) return checked;
    const { snapshot: sheet } = checked.value;
    const orderId = draft.value.workOrderId ?? "";
    const costMinor = await balanceFor(ctx, "1250", { workOrderId: orderId });
    const { referencePrefix } = await settingsOf(ctx);

    const number = await takeYearNumber(ctx, "INV", sheet.date.slice(0, 4), 5);
    const reference = documentReference({ prefix: referencePrefix, year: Number(sheet.date.slice(0, 4)), number: readDocumentNumber(number)?.number ?? 0 });
    if (!reference.ok) return reference;
    const snapshot: InvoiceSnapshot = { ...sheet, number, reference: reference.value };
    await tx.update(invoices).set({
      state: "issued", number, reference: reference.value, snapshot, issuedOn: sheet.date, supplyOn: sheet.supplyOn, dueOn: sheet.dueOn, issuedAt: ctx.now,
      issuedBy: ctx.actor.kind === "person" ? ctx.actor.id : null, totalMinor: sheet.totals.totalMinor, depositAppliedMinor: sheet.deposit.appliedMinor, version: sql`${invoices.version} + 1`,
    }).where(draftAt(ctx, draft.value.id));

    const surplus = await surplusLines(ctx, orderId, checked.value.depositSurplusMinor);
    await spendDeposits(ctx, orderId, sheet.deposit.appliedMinor + (surplus[0]?.amountMinor ?? 0));
    const post = (rule: string, text: string, lines: readonly EntryLine[]) => lines.length === 0 ? ok(null) : postEntry(ctx, {
      date: sheet.date, text, rule, sourceKind: "invoice", sourceId: draft.value.id, workOrderId: orderId, customerId: draft.value.customerId, lines,
    });
    const entries = [
      ["invoiceIssued", `Invoice ${number}`, invoiceIssued(sheet.totals)],
      ["depositApplied", `Deposit applied to ${number}`, depositApplied({ amountMinor: minor(sheet.deposit.appliedMinor) })],
      ["costOfParts", `Parts of ${sheet.orderNumber}, ${number}`, costOfParts({ costMinor })],
      ["depositSurplus", `Deposit not needed by ${number}`, surplus],
    ] as const;
    for (const [rule, text, lines] of entries) {
      const posted = await post(rule, text, lines);
      if (!posted.ok) return posted;
    }
    await leaveJob(ctx, "invoices.paper", { invoiceId: draft.value.id, send: input.send }, { dedupeKey: draft.value.id });
    return ok({ invoiceId: draft.value.id, number, reference: reference.value, totalMinor: sheet.totals.totalMinor, openMinor: sheet.balanceMinor });
  },
  subject: (input) => ({ kind: "invoice", id: input.invoiceId }),
});

/** What the last invoice of an order does not need of the deposit becomes the customer's credit. */
async function surplusLines(ctx: TxContext, workOrderId: string, surplusMinor: number): Promise<EntryLine[]> {
  if (surplusMinor <= 0) return [];
  const bill = await orderToBill(ctx, workOrderId);
  const billed = await billedBefore(ctx, workOrderId);
  const left = bill.ok && bill.value.lines.some((l) => l.kind !== "note" && !billed.lineIds.has(l.id));
  return left ? [] : entryOf(debit("2100", surplusMinor), credit("2110", surplusMinor));
}

/** Marks the deposits of an order as used, the oldest first. */
async function spendDeposits(ctx: TxContext, workOrderId: string, usedMinor: number): Promise<void> {
  const rows = await ctx.tx.select().from(payments).where(and(eq(payments.shopId, ctx.shop.id), eq(payments.workOrderId, workOrderId), eq(payments.purpose, "deposit"))).orderBy(asc(payments.receivedAt)).for("update");
  let left = usedMinor;
  for (const p of rows) {
    const part = Math.min(left, p.amountMinor - p.appliedMinor - p.refundedMinor);
    if (part <= 0) continue;
    await ctx.tx.update(payments).set({ appliedMinor: p.appliedMinor + part }).where(and(eq(payments.shopId, ctx.shop.id), eq(payments.id, p.id)));
    left -= part;
  }
}

/** Row of an issued invoice or credit note of this shop, locked. */
export async function lockIssued(ctx: TxContext, invoiceId: string, kind: "invoice" | "credit" = "invoice"): Promise<typeof invoices.$inferSelect | undefined> {
  const [row] = await ctx.tx.select().from(invoices).where(and(draftAt(ctx, invoiceId), eq(invoices.kind, kind), eq(invoices.state, "issued"))).for("update");
  return row;
}

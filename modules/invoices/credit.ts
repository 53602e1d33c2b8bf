import "server-only";
import { randomUUID } from "node:crypto";
import { and, eq, sql } from "drizzle-orm";
import { invoiceLines, invoices } from "@/db/schema";
import { defineCommand } from "@/modules/access/command";
import { ableTo, settingsOf } from "@/modules/access/context";
import { leaveJob } from "@/modules/access/jobs";
import { takeYearNumber } from "@/modules/access/numbers";
import { creditOf } from "@/modules/books/balances";
import { creditUsed, invoiceIssued, overpaymentCredited, writtenOff } from "@/modules/books/domain/posting-sales";
import { postEntry } from "@/modules/books/post";
import { money } from "@/modules/kernel/format";
import { localDate } from "@/modules/kernel/instant";
import { minor } from "@/modules/kernel/money";
import { ok, refuse } from "@/modules/kernel/result";
import { creditedSum, creditLines } from "./domain/credit-lines";
import { openOf } from "@/modules/books/domain/open-sum";
import type { InvoiceSnapshot } from "./domain/invoice-snapshot";
import { checkCredit } from "./domain/totals";
import { applyCreditInput, creditInvoiceInput, writeOffInput } from "./input";
import { lockIssued } from "./issue";

/**
 * The only way to take an issued invoice back, whole or in part: a document of its own series that mirrors it and names
 * it. Money already paid on what is taken back becomes the customer's credit.
 */
export const creditInvoice = defineCommand({
  name: "invoices.credit",
  act: "credit.write",
  input: creditInvoiceInput,
  async run(ctx, input) {
    const { tx, shop } = ctx;
    const invoice = await lockIssued(ctx, input.invoiceId);
    if (!invoice) return refuse("NOT_FOUND", "This invoice is not here.");
    if (input.lines === null && invoice.creditedMinor > 0) {
      return refuse("PARTLY_CREDITED", "Part of this invoice is credited already. Choose the lines that are left.", { field: "lines" });
    }
    const original = invoice.snapshot as InvoiceSnapshot;
    const made = creditLines(original, input.lines);
    if (!made.ok) return made;
    const { lines, totals } = made.value;
    const sum = creditedSum(totals);
    if (!(original.totals.totalMinor === 0 && input.lines === null)) {
      const fits = checkCredit({ invoiceTotalMinor: minor(invoice.totalMinor), creditedMinor: minor(invoice.creditedMinor), wantedMinor: sum });
      if (!fits.ok) return refuse(fits.refusal.code, `${fits.refusal.message} Left: ${money(invoice.totalMinor - invoice.creditedMinor, shop)}.`, { field: "lines" });
    }
    const settings = await settingsOf(ctx);
    const today = localDate(ctx.now, shop.zone);
    const id = randomUUID();
    const number = await takeYearNumber(ctx, "CN", today.slice(0, 4), 5);
    const snapshot: InvoiceSnapshot = {
      ...original, kind: "credit", number, date: today, supplyOn: original.supplyOn, dueOn: today, terms: "", lines, totals, deposit: { appliedMinor: 0, on: null }, balanceMinor: totals.totalMinor,
      shop: { name: shop.name, address: settings.address, phone: settings.phone, email: settings.email, taxNumber: settings.taxNumber },
      reference: null, pieces: [], approvals: [], refused: [], words: "", credits: { number: invoice.number ?? "", reason: input.reason },
    };
    await tx.insert(invoices).values({
      shopId: shop.id, id, kind: "credit", number, workOrderId: invoice.workOrderId, customerId: invoice.customerId, state: "draft", terms: "", creditsInvoiceId: invoice.id, creditReason: input.reason,
    });
    await tx.insert(invoiceLines).values(lines.map((l, i) => ({
      shopId: shop.id, id: randomUUID(), invoiceId: id, lineNo: i + 1, kind: l.kind, pieceTag: l.pieceTag, description: l.description, qtyMilli: l.qtyMilli,
      unitPriceMinor: l.unitPriceMinor, amountMinor: l.amountMinor, bookMinutes: l.bookMinutes, actualMinutes: l.actualMinutes,
    })));
    await tx.update(invoices).set({ state: "issued", snapshot, issuedOn: today, supplyOn: original.supplyOn, dueOn: today, issuedAt: ctx.now, issuedBy: ctx.actor.kind === "person" ? ctx.actor.id : null, totalMinor: totals.totalMinor })
      .where(and(eq(invoices.shopId, shop.id), eq(invoices.id, id)));
    const over = Math.max(0, -(openOf(invoice) - sum));
    await tx.update(invoices).set({ creditedMinor: sql`${invoices.creditedMinor} + ${sum}`, paidMinor: sql`${invoices.paidMinor} - ${over}`, version: sql`${invoices.version} + 1` })
      .where(and(eq(invoices.shopId, shop.id), eq(invoices.id, invoice.id)));
    const entry = { date: today, sourceKind: "invoice", sourceId: id, workOrderId: invoice.workOrderId, customerId: invoice.customerId };
    const mirrored = invoiceIssued(totals);
    if (mirrored.length) {
      const posted = await postEntry(ctx, { ...entry, text: `Credit note ${number} for ${invoice.number ?? ""}`, rule: "creditNote", lines: mirrored });
      if (!posted.ok) return posted;
    }
    if (over > 0) {
      const posted = await postEntry(ctx, { ...entry, text: `Paid on ${invoice.number ?? ""}, now the customer's credit`, rule: "overpaymentCredited", lines: overpaymentCredited({ amountMinor: minor(over) }) });
      if (!posted.ok) return posted;
    }
    await leaveJob(ctx, "invoices.paper", { invoiceId: id, send: true }, { dedupeKey: id });
    return ok({ invoiceId: id, number, totalMinor: totals.totalMinor, creditMinor: over });
  },
  subject: (_, value) => ({ kind: "invoice", id: value.invoiceId }),
});

/** Takes what the shop owes the customer off an open invoice, as far as both reach. */
export const applyCredit = defineCommand({
  name: "invoices.apply-credit",
  act: "invoice.write",
  input: applyCreditInput,
  async run(ctx, input) {
    const invoice = await lockIssued(ctx, input.invoiceId);
    if (!invoice) return refuse("NOT_FOUND", "This invoice is not here.");
    const amount = Math.min(openOf(invoice), await creditOf(ctx, invoice.customerId));
    if (amount <= 0) return refuse("NO_CREDIT", "There is no credit to use, or nothing is open.");
    const posted = await postEntry(ctx, {
      date: localDate(ctx.now, ctx.shop.zone), text: `Credit used on ${invoice.number ?? ""}`, rule: "creditUsed", sourceKind: "invoice", sourceId: `${invoice.id}:${invoice.version}`,
      workOrderId: invoice.workOrderId, customerId: invoice.customerId, lines: creditUsed({ amountMinor: minor(amount) }),
    });
    if (!posted.ok) return posted;
    await ctx.tx.update(invoices).set({ paidMinor: sql`${invoices.paidMinor} + ${amount}`, version: sql`${invoices.version} + 1` }).where(and(eq(invoices.shopId, ctx.shop.id), eq(invoices.id, invoice.id)));
    return ok({ invoiceId: invoice.id, amountMinor: amount });
  },
  subject: (input) => ({ kind: "invoice", id: input.invoiceId }),
});

/** Gives up what is open: the bookkeeper up to the shop's limit, the owner above it. */
export const writeOffInvoice = defineCommand({
  name: "invoices.write-off",
  act: "bank.match",
  input: writeOffInput,
  async run(ctx, input) {
    const invoice = await lockIssued(ctx, input.invoiceId);
    if (!invoice) return refuse("NOT_FOUND", "This invoice is not here.");
    const open = openOf(invoice);
    if (open <= 0) return refuse("NOTHING_OPEN", "Nothing is open on this invoice.");
    const { writeOffLimitMinor } = await settingsOf(ctx);
    if (open > writeOffLimitMinor && !ableTo(ctx, "settings.write")) return refuse("ABOVE_LIMIT", `Above ${money(writeOffLimitMinor, ctx.shop)} only the owner may write off.`);
    const posted = await postEntry(ctx, {
      date: localDate(ctx.now, ctx.shop.zone), text: `Written off on ${invoice.number ?? ""}: ${input.reason}`.slice(0, 240), rule: "writtenOff", sourceKind: "invoice", sourceId: `${invoice.id}:${invoice.version}`,
      workOrderId: invoice.workOrderId, customerId: invoice.customerId, lines: writtenOff({ amountMinor: open }),
    });
    if (!posted.ok) return posted;
    await ctx.tx.update(invoices).set({ paidMinor: sql`${invoices.paidMinor} + ${open}`, version: sql`${invoices.version} + 1` }).where(and(eq(invoices.shopId, ctx.shop.id), eq(invoices.id, invoice.id)));
    return ok({ invoiceId: invoice.id, amountMinor: open });
  },
  subject: (input) => ({ kind: "invoice", id: input.invoiceId }),
});

import "server-only";
import { and, eq, sql } from "drizzle-orm";
import { customers, invoices, workOrders } from "@/db/schema";
import { withShop } from "@/db/scope";
import { defineCommand } from "@/modules/access/command";
import { type ShopContext, type TxContext } from "@/modules/access/context";
import { leaveJob } from "@/modules/access/jobs";
import { linkFor } from "@/modules/access/link";
import { addFileRow, keepBytes } from "@/modules/documents/files";
import { queueMail } from "@/modules/documents/mail";
import { date, decimal, money } from "@/modules/kernel/format";
import { ok, refuse } from "@/modules/kernel/result";
import { renderPdf } from "@/modules/outbound/pdf/render";
import type { InvoiceSnapshot } from "./domain/invoice-snapshot";
import { sendInvoiceInput } from "./input";
import { invoicePaper } from "./pdf/invoice-paper";

/** An issued document with the link its customer opens it by. A credit note is shown on its invoice's page. */
async function issued(ctx: TxContext, invoiceId: string) {
  const [row] = await ctx.tx.select({ i: invoices, customerName: customers.name, email: customers.email, orderNumber: workOrders.number }).from(invoices)
    .innerJoin(customers, and(eq(customers.shopId, invoices.shopId), eq(customers.id, invoices.customerId)))
    .leftJoin(workOrders, and(eq(workOrders.shopId, invoices.shopId), eq(workOrders.id, invoices.workOrderId)))
    .where(and(eq(invoices.shopId, ctx.shop.id), eq(invoices.id, invoiceId), eq(invoices.state, "issued")));
  if (!row?.i.snapshot || !row.i.issuedAt) return null;
  const link = await linkFor(ctx, { purpose: "invoice", subjectId: row.i.creditsInvoiceId ?? row.i.id, customerId: row.i.customerId, workOrderId: row.i.workOrderId });
  return { ...row, snapshot: row.i.snapshot as InvoiceSnapshot, issuedAt: row.i.issuedAt, link };
}

/**
 * Job: makes the paper of an issued document from what was frozen, keeps it with its hash, and mails it. Run again it
 * finds the paper there and does not mail twice.
 */
export async function makeInvoicePaper(ctx: ShopContext, invoiceId: string, send: boolean): Promise<void> {
  const found = await withShop(ctx.shop.id, (tx) => issued({ ...ctx, tx }, invoiceId));
  if (!found) return;
  const { i, snapshot, link, issuedAt } = found;
  const kept = i.pdfFileId ? null : await keepBytes(ctx.shop.id, {
    kind: "invoice", name: `${snapshot.number ?? "invoice"}.pdf`, mime: "application/pdf", extension: "pdf",
    bytes: await renderPdf(invoicePaper(snapshot, snapshot.kind === "invoice" ? link : null), { creationDate: issuedAt }), subject: { kind: "invoice", id: invoiceId },
  });
  await withShop(ctx.shop.id, async (tx) => {
    const inner: TxContext = { ...ctx, tx };
    const at = and(eq(invoices.shopId, ctx.shop.id), eq(invoices.id, invoiceId));
    const [now] = await tx.select({ pdfFileId: invoices.pdfFileId, sentAt: invoices.sentAt }).from(invoices).where(at).for("update");
    if (!now) return;
    let fileId = now.pdfFileId;
    if (!fileId && kept) {
      fileId = await addFileRow(inner, kept);
      await tx.update(invoices).set({ pdfFileId: fileId }).where(at);
    }
    if (fileId && send && !now.sentAt) await mailInvoice(inner, found, fileId);
  });
}

async function mailInvoice(ctx: TxContext, of: { i: typeof invoices.$inferSelect; snapshot: InvoiceSnapshot; customerName: string; email: string | null; link: string }, fileId: string): Promise<boolean> {
  const { i, snapshot: s } = of;
  if (!of.email) return false;
  const credit = s.kind === "credit";
  const gains = s.pieces.flatMap((p) => p.gain.sides.flatMap((x) => (x.comparison.comparable ? [`${p.tag} ${x.side}: ${x.comparison.meanGainCfm >= 0 ? "+" : ""}${decimal(x.comparison.meanGainCfm, 2, s.locale)} CFM on the mean of ${x.comparison.rows.length} lifts`] : [])));
  await queueMail(ctx, {
    kind: credit ? "credit-note" : "invoice", to: of.email, toName: of.customerName,
    subject: credit ? `Credit note ${s.number ?? ""} for ${s.credits?.number ?? ""}` : `Invoice ${s.number ?? ""}, ${money(s.balanceMinor, ctx.shop)}${s.balanceMinor > 0 ? " to pay" : ""}`,
    paragraphs: credit
      ? [`Credit note ${s.number ?? ""} takes ${money(-s.totals.totalMinor, ctx.shop)} off invoice ${s.credits?.number ?? ""}. Reason: ${s.credits?.reason ?? ""}`, "The paper is attached."]
      : [
          `Invoice ${s.number ?? ""} for order ${s.orderNumber} is attached: ${money(s.totals.totalMinor, ctx.shop)} in all${s.deposit.appliedMinor > 0 ? `, less your deposit of ${money(s.deposit.appliedMinor, ctx.shop)}` : ""}.`,
          ...(gains.length ? [`Measured on our bench, after against before:\n${gains.join("\n")}`] : []),
          s.balanceMinor > 0 ? `To pay: ${money(s.balanceMinor, ctx.shop)}${s.dueOn === s.date ? ", due on receipt" : ` by ${date(s.dueOn, s.locale)}`}. By transfer, give the reference ${s.reference ?? ""}.` : "Nothing is left to pay.",
        ],
    button: { label: credit || s.balanceMinor <= 0 ? "See it" : "See it and pay", url: of.link }, attachmentFileIds: [fileId], workOrderId: i.workOrderId, about: { kind: "invoice", id: i.id },
  });
  await ctx.tx.update(invoices).set({ sentAt: ctx.now }).where(and(eq(invoices.shopId, ctx.shop.id), eq(invoices.id, i.id)));
  return true;
}

/** Sends an issued document (again). When its paper is not made yet, the job that makes it sends it. */
export const sendInvoice = defineCommand({
  name: "invoices.send",
  act: "invoice.write",
  input: sendInvoiceInput,
  async run(ctx, input) {
    const found = await issued(ctx, input.invoiceId);
    if (!found) return refuse("NOT_FOUND", "This invoice is not here, or not issued yet.");
    if (!found.email) return refuse("NO_ADDRESS", "This customer has no e-mail address. Print it, or add the address to the customer first.");
    if (!found.i.pdfFileId) {
      await leaveJob(ctx, "invoices.paper", { invoiceId: input.invoiceId, send: true });
      return ok({ invoiceId: input.invoiceId, to: found.email });
    }
    await mailInvoice(ctx, found, found.i.pdfFileId);
    await ctx.tx.update(invoices).set({ version: sql`${invoices.version} + 1` }).where(and(eq(invoices.shopId, ctx.shop.id), eq(invoices.id, input.invoiceId)));
    return ok({ invoiceId: input.invoiceId, to: found.email });
  },
  subject: (input) => ({ kind: "invoice", id: input.invoiceId }),
});

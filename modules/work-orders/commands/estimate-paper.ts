import "server-only";
import { and, eq } from "drizzle-orm";
import { customers, estimates, workOrders } from "@/db/schema";
import { withShop } from "@/db/scope";
import type { ShopContext, TxContext } from "@/modules/access/context";
import { linkFor } from "@/modules/access/link";
import { addFileRow, keepBytes } from "@/modules/documents/files";
import { queueMail } from "@/modules/documents/mail";
import { date, money } from "@/modules/kernel/format";
import { renderPdf } from "@/modules/outbound/pdf/render";
import type { EstimateSnapshot } from "../domain/estimate-snapshot";
import { estimatePaper } from "../pdf/estimate-paper";

/** A sent version as it is on file, with who it is for. */
async function sentVersion(ctx: TxContext, estimateId: string) {
  const [row] = await ctx.tx.select({ e: estimates, customerId: customers.id, customerName: customers.name }).from(estimates)
    .innerJoin(workOrders, and(eq(workOrders.shopId, estimates.shopId), eq(workOrders.id, estimates.workOrderId)))
    .innerJoin(customers, and(eq(customers.shopId, workOrders.shopId), eq(customers.id, workOrders.customerId)))
    .where(and(eq(estimates.shopId, ctx.shop.id), eq(estimates.id, estimateId)));
  if (!row?.e.snapshot || !row.e.sentAt) return null;
  const link = await linkFor(ctx, { purpose: "estimate", subjectId: estimateId, customerId: row.customerId, workOrderId: row.e.workOrderId });
  return { ...row, snapshot: row.e.snapshot as EstimateSnapshot, sentAt: row.e.sentAt, link };
}

/**
 * Job: makes the paper of a sent version from what was frozen, keeps it, and mails it with the link. Run again it finds
 * the paper there and does nothing.
 */
export async function makeEstimatePaper(ctx: ShopContext, estimateId: string): Promise<void> {
  const found = await withShop(ctx.shop.id, (tx) => sentVersion({ ...ctx, tx }, estimateId));
  if (!found || found.e.pdfFileId) return;
  const { snapshot, link, sentAt } = found;
  const bytes = await renderPdf(estimatePaper(snapshot, link), { creationDate: sentAt });
  const kept = await keepBytes(ctx.shop.id, {
    kind: "estimate", name: `${snapshot.number}-estimate-${snapshot.version}.pdf`, mime: "application/pdf", extension: "pdf", bytes, subject: { kind: "estimate", id: estimateId },
  });
  await withShop(ctx.shop.id, async (tx) => {
    const inner: TxContext = { ...ctx, tx };
    const at = and(eq(estimates.shopId, ctx.shop.id), eq(estimates.id, estimateId));
    const [now] = await tx.select({ pdfFileId: estimates.pdfFileId, sentTo: estimates.sentTo }).from(estimates).where(at).for("update");
    if (!now || now.pdfFileId) return;
    const fileId = await addFileRow(inner, kept);
    await tx.update(estimates).set({ pdfFileId: fileId }).where(at);
    if (!now.sentTo) return;
    const total = money(snapshot.totals.totalMinor, ctx.shop);
    const change = snapshot.change;
    await queueMail(inner, {
      kind: change ? "finding" : "estimate", to: now.sentTo, toName: found.customerName,
      subject: change ? `${snapshot.number}: something to decide, ${money(change.changeMinor, ctx.shop)}` : `${snapshot.number}: your estimate, ${total}`,
      paragraphs: [
        ...(snapshot.message ? [snapshot.message] : []),
        ...snapshot.findings.map((f) => `${f.position ? `${f.position}: ` : ""}${f.words}`),
        change ? `This changes the total by ${money(change.changeMinor, ctx.shop)} to ${total}. What you agreed to before goes on meanwhile; nothing of this is started before you say yes.` : `What we would do and what it costs: ${total} in all. Work starts when you say yes.`,
        `The offer is good until ${date(snapshot.validUntil, ctx.shop.locale)}. The paper is attached.`,
      ],
      button: { label: change ? "See it and answer" : "See it and approve", url: link }, attachmentFileIds: [fileId], workOrderId: found.e.workOrderId, about: { kind: "estimate", id: estimateId },
    });
  });
}

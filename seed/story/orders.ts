import { and, eq } from "drizzle-orm";
import { estimates, invoices, links, workPieces } from "@/db/schema";
import { withShop } from "@/db/scope";
import type { ShopContext } from "@/modules/access/context";
import { draftInvoice } from "@/modules/invoices/draft";
import { issueInvoice } from "@/modules/invoices/issue";
import { draftSheet } from "@/modules/invoices/sheet";
import { instantOf } from "@/modules/kernel/instant";
import { bookPayment } from "@/modules/payments/book-payment";
import { answerByLink } from "@/modules/work-orders/commands/answer-estimate";
import { saveEstimate, startEstimate } from "@/modules/work-orders/commands/estimate-draft";
import { receivePiece } from "@/modules/work-orders/commands/receive-piece";
import { sendEstimate } from "@/modules/work-orders/commands/send-estimate";
import { must, type Cast } from "../cast";

export type Line = Parameters<typeof saveEstimate>[1]["lines"][number];

export interface Offer { lines: Line[]; discount: string; freight: string; deposit: string; to: string; readyOn?: string; message?: string; findingIds?: string[] }

/** Writes the next version of an estimate and sends it. */
export async function offer(cast: Cast, who: string, at: string, workOrderId: string, o: Offer): Promise<{ estimateId: string }> {
  const draft = must(await startEstimate(cast.as(who, at), { workOrderId, findingIds: o.findingIds ?? [] }));
  const saved = must(await saveEstimate(cast.as(who, at), {
    estimateId: draft.estimateId, version: draft.version, laborDiscountPercent: o.discount, freight: o.freight, depositPercent: o.deposit, exclusions: "", message: o.message ?? "",
    readyOn: o.readyOn ?? "", lines: o.lines,
  }));
  must(await sendEstimate(cast.as(who, at), { estimateId: draft.estimateId, version: saved.version, to: o.to }));
  return { estimateId: draft.estimateId };
}

/** The customer as the link in their mail makes them. */
async function customerAt(cast: Cast, estimateId: string, local: string): Promise<{ ctx: ShopContext; hash: string }> {
  return withShop(cast.shop.id, async (tx) => {
    const [link] = await tx.select().from(links).where(and(eq(links.shopId, cast.shop.id), eq(links.subjectId, estimateId)));
    const [estimate] = await tx.select({ hash: estimates.documentHash }).from(estimates).where(and(eq(estimates.shopId, cast.shop.id), eq(estimates.id, estimateId)));
    if (!link || !estimate?.hash) throw new Error("the estimate was not sent");
    return {
      hash: estimate.hash,
      ctx: {
        shop: cast.shop, actor: { kind: "customer", id: link.customerId, name: "", linkId: link.id, purpose: link.purpose, subjectId: estimateId }, now: instantOf(local, cast.shop.zone),
        request: { ip: "203.0.113.9", agent: "a telephone" },
      },
    };
  });
}

/** The customer opens the link and answers. */
export async function answer(cast: Cast, estimateId: string, local: string, name: string, yes = true): Promise<void> {
  const { ctx, hash } = await customerAt(cast, estimateId, local);
  must(await answerByLink(ctx, { answer: yes ? "approved" : "declined", name, documentHash: hash }), `${name} answers`);
}

let charges = 0;
/** A card payment as the provider's signed event would book it. */
export async function paidByCard(cast: Cast, local: string, target: { workOrderId: string } | { invoiceId: string }, amountMinor: number): Promise<{ paymentIntent: string }> {
  const at = instantOf(local, cast.shop.zone);
  charges += 1;
  const paymentIntent = `pi_demo_${cast.shop.slug}_${String(charges).padStart(4, "0")}`;
  must(await withShop(cast.shop.id, (tx) => bookPayment({ ...cast.system(local), tx }, { for: target, method: "card", amountMinor, receivedAt: at, providerPaymentId: paymentIntent })), "card payment");
  return { paymentIntent };
}

export const versionOf = async (cast: Cast, pieceId: string): Promise<number> => {
  const [row] = await withShop(cast.shop.id, (tx) => tx.select({ v: workPieces.version }).from(workPieces).where(and(eq(workPieces.shopId, cast.shop.id), eq(workPieces.id, pieceId))));
  return row?.v ?? 0;
};

/** Books a piece in; returns its tag. */
export async function bookIn(cast: Cast, who: string, at: string, pieceId: string, more: Partial<Omit<Parameters<typeof receivePiece>[1], "pieceId" | "version">> = {}): Promise<string> {
  const came = must(await receivePiece(cast.as(who, at), {
    pieceId, version: await versionOf(cast, pieceId), parcelCondition: "sound", counts: { valves: 4, springs: 4, shims: 4 }, place: "Rack A", fewPhotosOk: true, ...more,
  }), "booking in");
  return came.tag;
}

/** Drafts the invoice of an order and issues it as it stands. */
export async function bill(cast: Cast, who: string, at: string, workOrderId: string, send = true): Promise<{ invoiceId: string; number: string; totalMinor: number; openMinor: number }> {
  const ctx = cast.as(who, at);
  const { invoiceId } = must(await draftInvoice(ctx, { workOrderId }), "invoice draft");
  const { version, totalMinor } = await withShop(cast.shop.id, async (tx) => {
    const [row] = await tx.select().from(invoices).where(and(eq(invoices.shopId, cast.shop.id), eq(invoices.id, invoiceId)));
    if (!row) throw new Error("no draft");
    return { version: row.version, totalMinor: must(await draftSheet({ ...ctx, tx }, row), "invoice sheet").snapshot.totals.totalMinor };
  });
  return must(await issueInvoice(ctx, { invoiceId, version, totalMinor, send }), "invoice");
}

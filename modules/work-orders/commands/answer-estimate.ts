import "server-only";
import { randomUUID } from "node:crypto";
import { and, eq, gt, isNull, ne, sql } from "drizzle-orm";
import { approvals, customers, estimates, links, shopSettings, workOrders } from "@/db/schema";
import { defineCommand } from "@/modules/access/command";
import { personIdOf, type TxContext } from "@/modules/access/context";
import { linkFor } from "@/modules/access/link";
import { queueMail } from "@/modules/documents/mail";
import { dateTimeZone, money } from "@/modules/kernel/format";
import { localDate } from "@/modules/kernel/instant";
import { ok, refuse, type Result } from "@/modules/kernel/result";
import type { EstimateSnapshot } from "../domain/estimate-snapshot";
import { answerInput, spokenAnswerInput } from "../input";
import { putToWork } from "./agreed-work";

interface Answer {
  estimateId: string;
  answer: "approved" | "declined";
  via: "link" | "phone" | "counter";
  name: string;
  phoneNumber: string;
  /** What was on the answerer's screen; null when the shop writes down what was said. */
  documentHash: string | null;
  note: string;
}
export interface Answered { estimateId: string; answer: "approved" | "declined"; version: number; totalMinor: number; depositMinor: number; workOrderId: string }

/** A link that was answered goes on showing where the head is, for a year. */
const LINK_DAYS_AFTER_ANSWER = 365;

/** Writes the one answer of a sent version and puts an approved one to work. */
async function answerEstimate(ctx: TxContext, a: Answer): Promise<Result<Answered>> {
  const { tx, shop } = ctx;
  const [row] = await tx.select({ e: estimates, o: workOrders, c: customers }).from(estimates)
    .innerJoin(workOrders, and(eq(workOrders.shopId, estimates.shopId), eq(workOrders.id, estimates.workOrderId)))
    .innerJoin(customers, and(eq(customers.shopId, workOrders.shopId), eq(customers.id, workOrders.customerId)))
    .where(and(eq(estimates.shopId, shop.id), eq(estimates.id, a.estimateId))).for("update", { of: [estimates, workOrders] });
  if (!row) return refuse("NOT_FOUND", "This estimate is not here.");
  const { e, o, c } = row;
  if (e.state === "replaced") return refuse("REPLACED", "A newer version took this one's place. Nothing was agreed; open the newer one to answer it.");
  if (e.state === "draft") return refuse("NOT_SENT", "This version was not sent yet. Send it, or hand it over in print, before it is answered.");
  if (e.state !== "sent") return refuse("ALREADY_ANSWERED", `This version was ${e.state} already. It is answered once.`);
  if (o.closedAt || o.cancelledAt) return refuse("ORDER_CLOSED", "This order is closed. Call the shop if you think it should not be.");
  if (e.validUntil && localDate(ctx.now, shop.zone) > e.validUntil) return refuse("OUT_OF_DATE", "This offer is out of date. The price must be confirmed again; ask the shop for a new one.");
  if (a.documentHash !== null && a.documentHash !== e.documentHash) return refuse("CHANGED_MEANWHILE", "What you saw is not the version on file. Load the page again.");
  const snapshot = e.snapshot as EstimateSnapshot;
  await tx.insert(approvals).values({
    shopId: shop.id, id: randomUUID(), estimateId: e.id, answer: a.answer, via: a.via, name: a.name, at: ctx.now,
    ip: a.via === "phone" ? "" : ctx.request.ip, agent: a.via === "link" ? ctx.request.agent : "", phoneNumber: a.phoneNumber, takenBy: personIdOf(ctx),
    documentHash: e.documentHash ?? "", words: a.note ? `${snapshot.words} (${a.note})` : snapshot.words, totalMinor: snapshot.totals.totalMinor,
  });
  await tx.update(estimates).set({ state: a.answer, version: sql`${estimates.version} + 1` }).where(and(eq(estimates.shopId, shop.id), eq(estimates.id, e.id)));
  if (a.answer === "approved") {
    await tx.update(estimates).set({ state: "replaced", version: sql`${estimates.version} + 1` })
      .where(and(eq(estimates.shopId, shop.id), eq(estimates.workOrderId, o.id), eq(estimates.state, "approved"), ne(estimates.id, e.id)));
    await tx.update(workOrders).set({ agreedEstimateId: e.id, laborDiscountBasisPoints: e.laborDiscountBasisPoints, version: sql`${workOrders.version} + 1` })
      .where(and(eq(workOrders.shopId, shop.id), eq(workOrders.id, o.id)));
    await putToWork(ctx, o.id, e.id);
    await tx.update(links).set({ expiresAt: new Date(ctx.now.getTime() + LINK_DAYS_AFTER_ANSWER * 86_400_000) })
      .where(and(eq(links.shopId, shop.id), eq(links.workOrderId, o.id), eq(links.purpose, "estimate"), isNull(links.revokedAt), gt(links.expiresAt, ctx.now)));
  }
  await tellBoth(ctx, { e, o, c }, a, snapshot);
  return ok({ estimateId: e.id, answer: a.answer, version: e.estimateNo, totalMinor: snapshot.totals.totalMinor, depositMinor: snapshot.depositMinor, workOrderId: o.id });
}

/** The copy of what was agreed, to the customer and to the shop. */
async function tellBoth(
  ctx: TxContext,
  of: { e: typeof estimates.$inferSelect; o: { id: string; number: string }; c: { id: string; name: string; email: string | null } },
  a: Answer, snapshot: EstimateSnapshot,
): Promise<void> {
  const { e, o, c } = of;
  const total = money(snapshot.totals.totalMinor, ctx.shop);
  const when = dateTimeZone(ctx.now, ctx.shop);
  const how = a.via === "link" ? "on the page behind the link" : a.via === "phone" ? `by telephone (${a.phoneNumber})` : "at the counter";
  const about = { kind: "estimate", id: e.id };
  const attachmentFileIds = e.pdfFileId ? [e.pdfFileId] : [];
  if (c.email) {
    const url = await linkFor(ctx, { purpose: "estimate", subjectId: e.id, customerId: c.id, workOrderId: o.id });
    const paragraphs = a.answer === "approved"
      ? [`Thank you. ${a.name} approved version ${e.estimateNo} of order ${o.number} for ${total} ${how}, ${when}.`, `The words agreed to: ${snapshot.words}`]
      : [`We noted that ${a.name} said no to version ${e.estimateNo} of order ${o.number}, ${how}, ${when}. Nothing of it is started. We will call you about what happens next.`];
    await queueMail(ctx, {
      kind: "estimate-answer", to: c.email, toName: c.name, subject: `${o.number}: version ${e.estimateNo} ${a.answer}`, paragraphs,
      button: { label: a.answer === "approved" && !snapshot.depositStands && snapshot.depositMinor > 0 ? "See your order and pay the deposit" : "See your order", url },
      attachmentFileIds, workOrderId: o.id, about,
    });
  }
  const [settings] = await ctx.tx.select({ email: shopSettings.email }).from(shopSettings).where(eq(shopSettings.shopId, ctx.shop.id));
  if (settings?.email) {
    await queueMail(ctx, {
      kind: "estimate-answer-shop", to: settings.email, toName: ctx.shop.name, subject: `${o.number} ${c.name}: version ${e.estimateNo} ${a.answer}, ${total}`,
      paragraphs: [`${a.name} ${a.answer} version ${e.estimateNo} of order ${o.number} for ${total} ${how}, ${when}.`, ...(a.via === "link" ? [] : [`Taken by ${ctx.actor.name}.`])],
      attachmentFileIds, workOrderId: o.id, about,
    });
  }
}

/** The customer's own answer. Which version is meant comes from the link they hold, never from what they send. */
export const answerByLink = defineCommand({
  name: "estimates.answer",
  act: "customer.approve",
  input: answerInput,
  async run(ctx, input) {
    if (ctx.actor.kind !== "customer" || ctx.actor.purpose !== "estimate") return refuse("NOT_FOUND", "This page is not for answering.");
    return answerEstimate(ctx, { estimateId: ctx.actor.subjectId, answer: input.answer, via: "link", name: input.name, phoneNumber: "", documentHash: input.documentHash, note: "" });
  },
  subject: (_, value) => ({ kind: "estimate", id: value.estimateId }),
});

/** An answer given by telephone or across the counter: who said it, when, on which number, who took it. */
export const enterSpokenAnswer = defineCommand({
  name: "estimates.answer-spoken",
  act: "approval.enter",
  input: spokenAnswerInput,
  run: (ctx, input) => answerEstimate(ctx, { ...input, documentHash: null }),
  subject: (input) => ({ kind: "estimate", id: input.estimateId }),
});

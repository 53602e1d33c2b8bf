import "server-only";
import { randomUUID } from "node:crypto";
import { and, eq, isNull, sql } from "drizzle-orm";
import { estimates, findings, holds, workPieces } from "@/db/schema";
import { changedMeanwhile, defineCommand } from "@/modules/access/command";
import { personIdOf } from "@/modules/access/context";
import { ok, refuse } from "@/modules/kernel/result";
import { findingIdInput, findingInput } from "../input";
import { draftOf } from "./estimate-draft";

/** Something found after the price was agreed. Nothing of it is started before a yes; "stop meanwhile" holds the piece. */
export const recordFinding = defineCommand({
  name: "findings.record",
  act: "finding.record",
  input: findingInput,
  async run(ctx, input) {
    const [piece] = await ctx.tx.select({ workOrderId: workPieces.workOrderId, released: workPieces.releasedAt }).from(workPieces)
      .where(and(eq(workPieces.shopId, ctx.shop.id), eq(workPieces.id, input.pieceId)));
    if (!piece) return refuse("NOT_FOUND", "This piece is not here.");
    if (piece.released) return refuse("RELEASED", "This piece is released. Open it again before writing a finding.");
    const id = randomUUID();
    await ctx.tx.insert(findings).values({
      shopId: ctx.shop.id, id, pieceId: input.pieceId, workOrderId: piece.workOrderId, words: input.words, position: input.position, foundAt: ctx.now, foundBy: personIdOf(ctx), goOnMeanwhile: input.goOnMeanwhile,
    });
    if (!input.goOnMeanwhile) {
      await ctx.tx.insert(holds).values({ shopId: ctx.shop.id, id: randomUUID(), pieceId: input.pieceId, reason: "customer answer", words: input.words.slice(0, 200), since: ctx.now, setBy: personIdOf(ctx) });
    }
    return ok({ id, workOrderId: piece.workOrderId });
  },
  subject: (_, value) => ({ kind: "work-order", id: value.workOrderId }),
});

/** Asks the customer: the finding goes into the next estimate version, whose lines are then written. */
export const askAboutFinding = defineCommand({
  name: "findings.ask",
  act: "estimate.write",
  input: findingIdInput,
  async run(ctx, input) {
    const at = and(eq(findings.shopId, ctx.shop.id), eq(findings.id, input.findingId));
    const [f] = await ctx.tx.select({ workOrderId: findings.workOrderId, version: findings.version, withdrawn: findings.withdrawnAt, asked: estimates.state })
      .from(findings).leftJoin(estimates, and(eq(estimates.shopId, findings.shopId), eq(estimates.id, findings.estimateId))).where(at);
    if (!f) return refuse("NOT_FOUND", "This finding is not here.");
    if (f.withdrawn) return refuse("WITHDRAWN", "This finding was taken back.");
    if (f.asked && f.asked !== "draft" && f.asked !== "replaced") return refuse("ASKED_ALREADY", "The customer was asked about this already.");
    if (f.version !== input.version) return changedMeanwhile("This finding");
    const draft = await draftOf(ctx, f.workOrderId, [input.findingId]);
    return draft.ok ? ok({ ...draft.value, workOrderId: f.workOrderId }) : draft;
  },
  subject: (_, value) => ({ kind: "work-order", id: value.workOrderId }),
});

/** Takes a finding back: it was nothing, or was settled another way. */
export const withdrawFinding = defineCommand({
  name: "findings.withdraw",
  act: "work.override",
  input: findingIdInput,
  async run(ctx, input) {
    const [row] = await ctx.tx.update(findings).set({ withdrawnAt: ctx.now, version: sql`${findings.version} + 1` })
      .where(and(eq(findings.shopId, ctx.shop.id), eq(findings.id, input.findingId), eq(findings.version, input.version), isNull(findings.withdrawnAt))).returning({ workOrderId: findings.workOrderId });
    return row ? ok({ workOrderId: row.workOrderId }) : changedMeanwhile("This finding");
  },
  subject: (_, value) => ({ kind: "work-order", id: value.workOrderId }),
});

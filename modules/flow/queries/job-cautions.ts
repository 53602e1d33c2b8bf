import "server-only";
import { and, asc, eq, gte } from "drizzle-orm";
import { auditLog, cautionsSeen, people } from "@/db/schema";
import { inShop, mustBeAble, personIdOf, type ShopContext } from "@/modules/access/context";
import { localDate } from "@/modules/kernel/instant";
import { seenInput } from "../caution-input";
import { CAUTIONS_SEEN } from "../commands/job-cautions";
import { cautionsFor, type Hazard } from "../domain/cautions";

/** Cautions of the given words that this person has not yet confirmed at this step of the job. */
export async function cautionsToShow(ctx: ShopContext, ask: { workOrderId: string; step: string; hazards: readonly string[] }): Promise<Hazard[]> {
  mustBeAble(ctx, "clock.use");
  const all = cautionsFor(ask.hazards).map((c) => c.hazard);
  const personId = personIdOf(ctx);
  if (all.length === 0 || !personId) return all;
  const seen = await inShop(ctx, (tx) => tx.select({ hazard: cautionsSeen.hazard }).from(cautionsSeen)
    .where(and(eq(cautionsSeen.shopId, ctx.shop.id), eq(cautionsSeen.workOrderId, ask.workOrderId), eq(cautionsSeen.step, ask.step), eq(cautionsSeen.personId, personId))));
  return all.filter((h) => !seen.some((s) => s.hazard === h));
}

/**
 * The same on a head of the shop's own. It has no job that ends, so a working day stands for one: what was confirmed today is not
 * shown again today.
 */
export async function cautionsOfOwnHead(ctx: ShopContext, ask: { headId: string; step: string; hazards: readonly string[] }): Promise<Hazard[]> {
  mustBeAble(ctx, "clock.use");
  const all = cautionsFor(ask.hazards).map((c) => c.hazard);
  const personId = personIdOf(ctx);
  if (all.length === 0 || !personId) return all;
  const { zone } = ctx.shop;
  const rows = await inShop(ctx, (tx) => tx.select({ at: auditLog.at, detail: auditLog.detail }).from(auditLog)
    .where(and(eq(auditLog.shopId, ctx.shop.id), eq(auditLog.subjectKind, "head"), eq(auditLog.subjectId, ask.headId), eq(auditLog.command, CAUTIONS_SEEN), eq(auditLog.actor, `person:${personId}`), gte(auditLog.at, new Date(ctx.now.getTime() - 86_400_000)))));
  const seen = rows.flatMap((r) => {
    const input = seenInput.safeParse((r.detail as { input?: unknown } | null)?.input);
    return input.success && input.data.step === ask.step && localDate(r.at, zone) === localDate(ctx.now, zone) ? input.data.hazards : [];
  });
  return all.filter((h) => !seen.includes(h));
}

export interface CautionSeenRow { hazard: string; step: string; person: string; at: string }

/** Who confirmed which caution on a job, oldest first. */
export async function cautionsSeenOn(ctx: ShopContext, workOrderId: string): Promise<CautionSeenRow[]> {
  mustBeAble(ctx, "orders.see");
  const rows = await inShop(ctx, (tx) => tx.select({ hazard: cautionsSeen.hazard, step: cautionsSeen.step, person: people.name, at: cautionsSeen.at }).from(cautionsSeen)
    .innerJoin(people, and(eq(people.shopId, cautionsSeen.shopId), eq(people.id, cautionsSeen.personId)))
    .where(and(eq(cautionsSeen.shopId, ctx.shop.id), eq(cautionsSeen.workOrderId, workOrderId))).orderBy(asc(cautionsSeen.at), asc(cautionsSeen.hazard)));
  return rows.map((r) => ({ ...r, at: r.at.toISOString() }));
}

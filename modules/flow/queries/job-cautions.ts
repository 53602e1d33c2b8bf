import "server-only";
import { and, asc, eq } from "drizzle-orm";
import { cautionsSeen, people } from "@/db/schema";
import { inShop, mustBeAble, personIdOf, type ShopContext } from "@/modules/access/context";
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

export interface CautionSeenRow { hazard: string; step: string; person: string; at: string }

/** Who confirmed which caution on a job, oldest first. */
export async function cautionsSeenOn(ctx: ShopContext, workOrderId: string): Promise<CautionSeenRow[]> {
  mustBeAble(ctx, "orders.see");
  const rows = await inShop(ctx, (tx) => tx.select({ hazard: cautionsSeen.hazard, step: cautionsSeen.step, person: people.name, at: cautionsSeen.at }).from(cautionsSeen)
    .innerJoin(people, and(eq(people.shopId, cautionsSeen.shopId), eq(people.id, cautionsSeen.personId)))
    .where(and(eq(cautionsSeen.shopId, ctx.shop.id), eq(cautionsSeen.workOrderId, workOrderId))).orderBy(asc(cautionsSeen.at), asc(cautionsSeen.hazard)));
  return rows.map((r) => ({ ...r, at: r.at.toISOString() }));
}

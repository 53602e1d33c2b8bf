import "server-only";
import { and, desc, eq, gt, isNull, or } from "drizzle-orm";
import { punches, timeEntries } from "@/db/schema";
import { settingsOf, type TxContext } from "@/modules/access/context";
import { minutesWithin, type Span } from "../domain/clipped-minutes";
import { isOutMissing } from "../domain/missing-out";
import { WEEK_MINUTES } from "../domain/overtime";
import { weekHolding } from "../domain/workweek";

/** A person's attendance of the running week, to the minute, and whether overtime is forming. */
export async function ownWeek(ctx: TxContext, personId: string): Promise<{ weekMinutes: number; overtimeMinutes: number }> {
  const { workweekStartDay } = await settingsOf(ctx);
  const week = weekHolding(ctx.now, workweekStartDay, ctx.shop.zone);
  const spans = await doorSpans(ctx, personId, week.from);
  const weekMinutes = minutesWithin(spans, week.from, ctx.now);
  return { weekMinutes, overtimeMinutes: Math.max(0, weekMinutes - WEEK_MINUTES) };
}

const doorSpans = (ctx: TxContext, personId: string, from: Date): Promise<Span[]> =>
  ctx.tx.select({ startedAt: timeEntries.startedAt, endedAt: timeEntries.endedAt }).from(timeEntries).where(and(
    eq(timeEntries.shopId, ctx.shop.id), eq(timeEntries.personId, personId), eq(timeEntries.clock, "door"), isNull(timeEntries.voidedAt), or(isNull(timeEntries.endedAt), gt(timeEntries.endedAt, from))));

/** An attendance that was left open, with the last thing seen of the person in it. */
export async function missingOut(ctx: TxContext, personId: string): Promise<{ since: string; lastSeen: string } | null> {
  const [open] = await ctx.tx.select({ startedAt: timeEntries.startedAt }).from(timeEntries).where(and(
    eq(timeEntries.shopId, ctx.shop.id), eq(timeEntries.personId, personId), eq(timeEntries.clock, "door"), isNull(timeEntries.endedAt), isNull(timeEntries.voidedAt)));
  if (!open || !isOutMissing(open.startedAt, ctx.now, ctx.shop.zone)) return null;
  const [last] = await ctx.tx.select({ at: punches.at }).from(punches).where(and(eq(punches.shopId, ctx.shop.id), eq(punches.personId, personId))).orderBy(desc(punches.at)).limit(1);
  const lastSeen = last && last.at > open.startedAt ? last.at : open.startedAt;
  return { since: open.startedAt.toISOString(), lastSeen: lastSeen.toISOString() };
}

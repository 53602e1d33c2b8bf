import "server-only";
import { and, asc, desc, eq, gt, isNull, lt, lte, or } from "drizzle-orm";
import { operations, payRates, people, timeEntries, workPieces } from "@/db/schema";
import { ableTo, inShop, mustBeAble, NotFound, personIdOf, settingsOf, type ShopContext } from "@/modules/access/context";
import { localDate, startOfDay, addDays } from "@/modules/kernel/instant";
import { minor } from "@/modules/kernel/money";
import { minutesWithin } from "../domain/clipped-minutes";
import { daySummary, type DaySummary } from "../domain/day-summary";
import { elapsedMinutes } from "../domain/elapsed";
import { PAID_BREAK } from "../domain/indirect-work";
import { WEEK_MINUTES, weekPay } from "../domain/overtime";
import { workweekOf } from "../domain/workweek";

export interface SheetEntry {
  readonly id: string;
  readonly clock: "door" | "bench";
  readonly words: string;
  readonly operationId: string | null;
  readonly indirect: string | null;
  readonly startedAt: string;
  readonly endedAt: string | null;
  readonly minutes: number;
  readonly source: string;
  readonly reason: string;
  readonly isRework: boolean;
  /** Corrected or set aside: no longer counted, still to be seen. */
  readonly isReplaced: boolean;
}
export interface SheetDay extends DaySummary { readonly date: string; readonly entries: readonly SheetEntry[] }
export interface WeekSheet {
  readonly personId: string;
  readonly name: string;
  readonly isOwn: boolean;
  readonly from: string;
  readonly days: readonly SheetDay[];
  readonly doorMinutes: number;
  readonly benchMinutes: number;
  readonly overtimeMinutes: number;
  /** An estimate of pay, for the person and those who may see pay; payroll decides. */
  readonly pay: { readonly straightMinor: number; readonly premiumMinor: number; readonly totalMinor: number } | null;
}

/** One person's week to the minute: attendance against bench, with what is not explained. @throws NotFound for another's week without the right */
export async function weekSheet(ctx: ShopContext, ask: { personId?: string | undefined; date?: string | undefined }): Promise<WeekSheet> {
  const self = personIdOf(ctx);
  const personId = ask.personId ?? self;
  if (!personId) throw new NotFound("person");
  const isOwn = personId === self;
  mustBeAble(ctx, isOwn ? "time.see-own" : "time.see-all");
  const { zone } = ctx.shop;
  return inShop(ctx, async (tx) => {
    const { workweekStartDay } = await settingsOf({ ...ctx, tx });
    const week = workweekOf(ask.date ?? localDate(ctx.now, zone), workweekStartDay, zone);
    const [person] = await tx.select({ name: people.name }).from(people).where(and(eq(people.shopId, ctx.shop.id), eq(people.id, personId)));
    if (!person) throw new NotFound("person");
    const rows = await tx.select({ e: timeEntries, operation: operations.name, tag: workPieces.tag }).from(timeEntries)
      .leftJoin(operations, and(eq(operations.shopId, timeEntries.shopId), eq(operations.id, timeEntries.operationId)))
      .leftJoin(workPieces, and(eq(workPieces.shopId, timeEntries.shopId), eq(workPieces.id, timeEntries.pieceId)))
      .where(and(eq(timeEntries.shopId, ctx.shop.id), eq(timeEntries.personId, personId), lt(timeEntries.startedAt, week.to), or(isNull(timeEntries.endedAt), gt(timeEntries.endedAt, week.from))))
      .orderBy(asc(timeEntries.startedAt));
    const counted = rows.filter((r) => r.e.voidedAt === null).map((r) => r.e);
    const within = (test: (e: (typeof counted)[number]) => boolean, date: string): number => {
      const end = startOfDay(addDays(date, 1), zone);
      return minutesWithin(counted.filter(test), startOfDay(date, zone), end < ctx.now ? end : ctx.now);
    };
    const days = week.days.map((date): SheetDay => ({
      date,
      ...daySummary({
        doorMinutes: within((e) => e.clock === "door", date), directMinutes: within((e) => e.operationId !== null, date),
        indirectMinutes: within((e) => e.clock === "bench" && e.operationId === null && e.indirectCode !== PAID_BREAK, date), paidBreakMinutes: within((e) => e.indirectCode === PAID_BREAK, date),
      }),
      // An entry stands on the day it began; one from before the week, on its first day.
      entries: rows.filter((r) => localDate(r.e.startedAt < week.from ? week.from : r.e.startedAt, zone) === date).map(({ e, operation, tag }) => ({
        id: e.id, clock: e.clock === "door" ? "door" : "bench", words: e.clock === "door" ? "At the door" : operation ? `${operation}${tag ? `, ${tag}` : ""}` : (e.indirectCode ?? ""),
        operationId: e.operationId, indirect: e.indirectCode, startedAt: e.startedAt.toISOString(), endedAt: e.endedAt?.toISOString() ?? null, minutes: elapsedMinutes(e.startedAt, e.endedAt ?? ctx.now),
        source: e.source, reason: e.reason, isRework: e.rework, isReplaced: e.voidedAt !== null,
      })),
    }));
    const doorMinutes = days.reduce((n, d) => n + d.doorMinutes, 0);
    const seesPay = isOwn || ableTo(ctx, "pay.see");
    const rates = seesPay ? await tx.select({ validFrom: payRates.validFrom, rateMinor: payRates.rateMinor }).from(payRates)
      .where(and(eq(payRates.shopId, ctx.shop.id), eq(payRates.personId, personId), lte(payRates.validFrom, week.days[6] ?? ""))).orderBy(desc(payRates.validFrom)) : [];
    const paid = days.filter((d) => d.doorMinutes > 0).map((d) => ({ minutes: d.doorMinutes, rate: rates.find((r) => r.validFrom <= d.date)?.rateMinor }));
    const pay = paid.length > 0 && paid.every((d) => d.rate !== undefined) ? weekPay(paid.map((d) => ({ kind: "hourly", minutes: d.minutes, rateMinorPerHour: minor(d.rate ?? 0) }))) : null;
    return {
      personId, name: person.name, isOwn, from: week.days[0] ?? "", days, doorMinutes, benchMinutes: days.reduce((n, d) => n + d.directMinutes + d.indirectMinutes + d.paidBreakMinutes, 0),
      overtimeMinutes: Math.max(0, doorMinutes - WEEK_MINUTES), pay: pay?.ok ? { straightMinor: pay.value.straightMinor, premiumMinor: pay.value.premiumMinor, totalMinor: pay.value.totalMinor } : null,
    };
  });
}

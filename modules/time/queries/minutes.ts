import "server-only";
import { and, asc, desc, eq, inArray, isNull, lte } from "drizzle-orm";
import { payRates, people, timeEntries } from "@/db/schema";
import { ableTo, inShop, mustBeAble, type ShopContext, type TxContext } from "@/modules/access/context";
import { localDate } from "@/modules/kernel/instant";
import { minor, timesFraction, type Minor } from "@/modules/kernel/money";
import { elapsedMinutes } from "../domain/elapsed";

export interface OperationMinutes {
  readonly operationId: string;
  /** Whole minutes of closed entries, rework too. */
  readonly minutes: number;
  readonly reworkMinutes: number;
  /** Short names, in the order they first worked on it. */
  readonly people: readonly string[];
  /** Who is on it now, since when. */
  readonly running: readonly { readonly personId: string; readonly person: string; readonly since: string }[];
}

const entriesOf = (ctx: TxContext, workOrderId: string) => ctx.tx.select({
  operationId: timeEntries.operationId, personId: timeEntries.personId, person: people.shortName, name: people.name,
  startedAt: timeEntries.startedAt, endedAt: timeEntries.endedAt, rework: timeEntries.rework,
}).from(timeEntries).innerJoin(people, and(eq(people.shopId, timeEntries.shopId), eq(people.id, timeEntries.personId)))
  .where(and(eq(timeEntries.shopId, ctx.shop.id), eq(timeEntries.workOrderId, workOrderId), eq(timeEntries.clock, "bench"), isNull(timeEntries.voidedAt)))
  .orderBy(asc(timeEntries.startedAt));

/** Bench minutes of each operation of a work order that has any. */
export async function minutesByOperation(ctx: ShopContext, workOrderId: string): Promise<OperationMinutes[]> {
  mustBeAble(ctx, "orders.see");
  const rows = await inShop(ctx, (tx) => entriesOf({ ...ctx, tx }, workOrderId));
  const by = new Map<string, { minutes: number; reworkMinutes: number; people: Set<string>; running: { personId: string; person: string; since: string }[] }>();
  for (const r of rows) {
    if (!r.operationId) continue;
    const o = by.get(r.operationId) ?? { minutes: 0, reworkMinutes: 0, people: new Set<string>(), running: [] };
    by.set(r.operationId, o);
    o.people.add(r.person);
    if (r.endedAt) {
      const m = elapsedMinutes(r.startedAt, r.endedAt);
      o.minutes += m;
      if (r.rework) o.reworkMinutes += m;
    } else o.running.push({ personId: r.personId, person: r.person, since: r.startedAt.toISOString() });
  }
  return [...by].map(([operationId, o]) => ({ operationId, ...o, people: [...o.people] }));
}

export interface LaborShare {
  readonly personId: string;
  readonly name: string;
  readonly shortName: string;
  readonly minutes: number;
  /** Pay rate per hour on the days worked; null when none was set. A person whose rate changed has one row a rate. */
  readonly rateMinor: Minor | null;
  /** Minutes at that rate, half-up to the minor unit; 0 without a rate. No burden, no overtime premium. */
  readonly costMinor: Minor;
}

/** For costing inside the server only: pay rates are in it. Never hand it to a page without asking for `cost.see`. */
export async function laborOf(ctx: TxContext, workOrderId: string): Promise<LaborShare[]> {
  const rows = await entriesOf(ctx, workOrderId);
  const ids = [...new Set(rows.map((r) => r.personId))];
  const rates = ids.length === 0 ? [] : await ctx.tx.select({ personId: payRates.personId, validFrom: payRates.validFrom, rateMinor: payRates.rateMinor }).from(payRates)
    .where(and(eq(payRates.shopId, ctx.shop.id), inArray(payRates.personId, ids), lte(payRates.validFrom, localDate(ctx.now, ctx.shop.zone)))).orderBy(desc(payRates.validFrom));
  const shares = new Map<string, { personId: string; name: string; shortName: string; minutes: number; rateMinor: number | null }>();
  for (const r of rows) {
    if (!r.endedAt) continue;
    const day = localDate(r.startedAt, ctx.shop.zone);
    const rateMinor = rates.find((x) => x.personId === r.personId && x.validFrom <= day)?.rateMinor ?? null;
    const key = `${r.personId}:${rateMinor}`;
    const share = shares.get(key) ?? { personId: r.personId, name: r.name, shortName: r.person, minutes: 0, rateMinor };
    share.minutes += elapsedMinutes(r.startedAt, r.endedAt);
    shares.set(key, share);
  }
  return [...shares.values()].map((s) => ({
    ...s, rateMinor: s.rateMinor === null ? null : minor(s.rateMinor), costMinor: timesFraction(s.rateMinor ?? 0, s.minutes, 60),
  }));
}

/** Bench minutes of a work order by person. Rates only for those who may see pay. */
export async function minutesByPerson(ctx: ShopContext, workOrderId: string): Promise<{ personId: string; name: string; minutes: number; rateMinor?: number | null }[]> {
  mustBeAble(ctx, "orders.see");
  const seesPay = ableTo(ctx, "pay.see");
  const shares = await inShop(ctx, (tx) => laborOf({ ...ctx, tx }, workOrderId));
  if (seesPay) return shares.map(({ personId, name, minutes, rateMinor }) => ({ personId, name, minutes, rateMinor }));
  const sums = new Map<string, { personId: string; name: string; minutes: number }>();
  for (const { personId, name, minutes } of shares) sums.set(personId, { personId, name, minutes: (sums.get(personId)?.minutes ?? 0) + minutes });
  return [...sums.values()];
}

import "server-only";
import { and, asc, desc, eq } from "drizzle-orm";
import { devices, payRates, people } from "@/db/schema";
import { ableTo, inShop, mustBeAble, NotFound, type ShopContext } from "@/modules/access/context";
import { PIN_TRIES_MAX } from "../domain/pin-rules";

/** The shop's tablets, newest first. Never their secrets. */
export async function deviceList(ctx: ShopContext) {
  mustBeAble(ctx, "devices.write");
  const rows = await inShop(ctx, (tx) => tx.select().from(devices).where(eq(devices.shopId, ctx.shop.id)).orderBy(desc(devices.createdAt)));
  return rows.map((d) => ({
    id: d.id, name: d.name, kind: d.kind, lastSeenAt: d.lastSeenAt?.toISOString() ?? null, since: d.createdAt.toISOString(),
    state: d.revokedAt ? ("out of use" as const) : d.tokenHash ? ("enrolled" as const) : d.enrolCodeExpiresAt && d.enrolCodeExpiresAt > ctx.now ? ("waits for its code" as const) : ("not enrolled" as const),
  }));
}
export type DeviceRow = Awaited<ReturnType<typeof deviceList>>[number];

const row = (p: typeof people.$inferSelect) => ({
  id: p.id, name: p.name, shortName: p.shortName, email: p.email ?? "", roles: p.roles, skills: p.skills.join(", "), version: p.version, hasSignIn: p.userId !== null, hasBadge: p.badgeCode !== null,
  pin: p.pinHash === null ? ("none" as const) : p.pinFailedTries >= PIN_TRIES_MAX ? ("dead" as const) : ("set" as const), leftAt: p.leftAt?.toISOString() ?? null,
});

export async function peopleList(ctx: ShopContext) {
  mustBeAble(ctx, "devices.write");
  const rows = await inShop(ctx, (tx) => tx.select().from(people).where(eq(people.shopId, ctx.shop.id)).orderBy(asc(people.name)));
  return rows.map(row).sort((a, b) => Number(a.leftAt !== null) - Number(b.leftAt !== null));
}
export type PersonRow = Awaited<ReturnType<typeof peopleList>>[number];

/** One person with what the asker may see. @throws NotFound */
export async function getPerson(ctx: ShopContext, id: string) {
  mustBeAble(ctx, "devices.write");
  return inShop(ctx, async (tx) => {
    const [p] = await tx.select().from(people).where(and(eq(people.shopId, ctx.shop.id), eq(people.id, id)));
    if (!p) throw new NotFound("person");
    const rates = ableTo(ctx, "pay.see") ? await tx.select({ validFrom: payRates.validFrom, rateMinor: payRates.rateMinor }).from(payRates)
      .where(and(eq(payRates.shopId, ctx.shop.id), eq(payRates.personId, id))).orderBy(desc(payRates.validFrom)) : null;
    return { ...row(p), rates };
  });
}

/** Names for a choice of person. */
export async function peopleNames(ctx: ShopContext): Promise<{ id: string; name: string }[]> {
  mustBeAble(ctx, "time.see-all");
  return inShop(ctx, (tx) => tx.select({ id: people.id, name: people.name }).from(people).where(eq(people.shopId, ctx.shop.id)).orderBy(asc(people.name)));
}

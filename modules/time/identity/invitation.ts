import "server-only";
import { createHmac, timingSafeEqual } from "node:crypto";
import { and, eq, isNull } from "drizzle-orm";
import { people, shops } from "@/db/schema";
import { withShop, withSystem } from "@/db/scope";
import { now } from "@/modules/access/clock";
import { mustBeAble, type ShopContext } from "@/modules/access/context";
import { env } from "@/modules/access/env";
import { isUuid } from "@/modules/kernel/id";

/** An invitation works so long, once, and only the newest: it is bound to the person's version, which taking it changes. */
const INVITATION_HOURS = 72;

const sign = (body: string): string => createHmac("sha256", env().NEXTAUTH_SECRET).update(`invitation:${body}`).digest("base64url");

/** The address a person opens to set their own password. For the owner to hand over; it is kept nowhere. */
export function invitationFor(ctx: ShopContext, person: { id: string; version: number }): { address: string; until: string } {
  mustBeAble(ctx, "people.write");
  const until = ctx.now.getTime() + INVITATION_HOURS * 3_600_000;
  const body = `${ctx.shop.id}.${person.id}.${person.version}.${until}`;
  return { address: `${env().VK_APP_URL}/join/${body}.${sign(body)}`, until: new Date(until).toISOString() };
}

export interface Invited { readonly ctx: ShopContext; readonly personId: string; readonly version: number; readonly email: string; readonly name: string }

/** Who an invitation is for, or null: wrong, over, used and replaced look alike. */
export async function openInvitation(token: string): Promise<Invited | null> {
  const m = /^(([0-9a-f-]{36})\.([0-9a-f-]{36})\.(\d{1,12})\.(\d{10,16}))\.([\w-]{43})$/.exec(token);
  const [, body = "", shopId = "", personId = "", version, until, mac = ""] = m ?? [];
  if (!m || !isUuid(shopId) || !isUuid(personId) || !timingSafeEqual(Buffer.from(sign(body)), Buffer.from(mac)) || Number(until) < now().getTime()) return null;
  const [row] = await withSystem("an invitation names its shop", (tx) => tx.select().from(shops).where(eq(shops.id, shopId)));
  if (!row) return null;
  const { createdAt: _, ...shop } = row;
  const [person] = await withShop(shopId, (tx) => tx.select({ email: people.email, name: people.name }).from(people).where(and(
    eq(people.shopId, shopId), eq(people.id, personId), eq(people.version, Number(version)), isNull(people.userId), isNull(people.leftAt))));
  if (!person?.email) return null;
  return { ctx: { shop, actor: { kind: "system", id: `invitation:${personId}`, name: person.name }, now: now(), request: { ip: "", agent: "" } }, personId, version: Number(version), email: person.email, name: person.name };
}

export const invitationContext = async (token: string): Promise<ShopContext | null> => (await openInvitation(token))?.ctx ?? null;

import "server-only";
import { and, eq, gt, isNull, sql } from "drizzle-orm";
import { getServerSession } from "next-auth";
import { headers } from "next/headers";
import { cache } from "react";
import { people, sessions, shops, users } from "@/db/schema";
import { withSystem, withUser } from "@/db/scope";
import { authOptions } from "./auth";
import { now } from "./clock";
import { NotFound, type Shop, type ShopContext } from "./context";
import type { Role } from "./roles";

/** Idle for so long and the session is over. */
const IDLE_HOURS = 12;

export interface SignedIn { sessionId: string; userId: string; name: string; email: string }

/** The user behind this request, read from the database each time; null when signed out, ended or disabled. */
export const signedIn = cache(async (): Promise<SignedIn | null> => {
  const session = await getServerSession<ReturnType<typeof authOptions>, { sid?: string }>(authOptions());
  const sid = session?.sid;
  if (!sid || !/^[0-9a-f-]{36}$/.test(sid)) return null;
  return withSystem("who is signed in", async (tx) => {
    const [row] = await tx.select({ sessionId: sessions.id, userId: users.id, name: users.name, email: users.email, lastSeenAt: sessions.lastSeenAt })
      .from(sessions).innerJoin(users, eq(users.id, sessions.userId))
      .where(and(eq(sessions.id, sid), isNull(sessions.revokedAt), isNull(users.disabledAt), gt(sessions.expiresAt, sql`now()`),
        gt(sessions.lastSeenAt, sql`now() - make_interval(hours => ${IDLE_HOURS})`)));
    if (!row) return null;
    if (row.lastSeenAt.getTime() < Date.now() - 60_000) await tx.update(sessions).set({ lastSeenAt: sql`now()` }).where(eq(sessions.id, sid));
    return row;
  });
});

/** The shops a user works in. */
export const shopsOf = cache(async (userId: string): Promise<(Shop & { personId: string; personName: string; roles: Role[] })[]> =>
  withUser(userId, async (tx) => {
    const rows = await tx.select({ shop: shops, personId: people.id, personName: people.shortName, roles: people.roles })
      .from(people).innerJoin(shops, eq(shops.id, people.shopId))
      .where(and(eq(people.userId, userId), isNull(people.leftAt)));
    return rows.map(({ shop: { createdAt: _, ...shop }, ...r }) => ({ ...shop, ...r, roles: r.roles as Role[] }));
  }));

export async function requestFacts(): Promise<{ ip: string; agent: string }> {
  const h = await headers();
  return { ip: (h.get("x-forwarded-for") ?? "local").split(",")[0]?.trim() ?? "local", agent: (h.get("user-agent") ?? "").slice(0, 300) };
}

/** The context of a shop's page or act, or null when nobody is signed in. @throws NotFound for a shop the user does not work in. */
export const shopContextOrNull = cache(async (slug: string): Promise<ShopContext | null> => {
  const user = await signedIn();
  if (!user) return null;
  const found = (await shopsOf(user.userId)).find((s) => s.slug === slug);
  if (!found) throw new NotFound("shop");
  const { personId, personName, roles, ...shop } = found;
  return {
    shop,
    actor: { kind: "person", id: personId, name: personName, roles, sessionId: user.sessionId },
    now: now(),
    request: await requestFacts(),
  };
});

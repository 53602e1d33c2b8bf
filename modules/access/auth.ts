import "server-only";
import { randomUUID } from "node:crypto";
import { eq } from "drizzle-orm";
import type { NextAuthOptions } from "next-auth";
import Credentials from "next-auth/providers/credentials";
import { sessions, users } from "@/db/schema";
import { awayOf } from "@/db/outage";
import { withSystem } from "@/db/scope";
import { TRY_AGAIN } from "@/modules/kernel/away";
import { env } from "./env";
import { logFault } from "./fault";
import { hashSecret, verifySecret } from "./password";
import { allowed } from "./rate-limit";

const SESSION_SECONDS = 30 * 24 * 3600;
// Compared against when the address is unknown, so that both answers take as long.
const nobody = hashSecret(randomUUID());

/** The name of why a sign-in did not work, for the form; next-auth writes it into an address, so it says nothing else. */
class SignInRefused extends Error {
  constructor(reason: "TOO_MANY_TRIES" | typeof TRY_AGAIN | "BROKEN") { super(reason); }
}

/** Signs in with address and password. Grows a delay after ten wrong tries; the right password works again after it. */
async function userFor(email: string, password: string, ip: string): Promise<{ id: string; name: string; email: string } | null> {
  if (!(await allowed(`sign-in:${ip}`, 60, 60)) || !(await allowed(`sign-in:${email}`, 20, 60))) throw new SignInRefused("TOO_MANY_TRIES");
  const [user] = await withSystem("sign-in looks a user up by address", (tx) => tx.select().from(users).where(eq(users.email, email)));
  const right = await verifySecret(user?.passwordHash ?? (await nobody), password);
  if (!user || user.disabledAt) return null;
  if (user.lockedUntil && user.lockedUntil > new Date()) throw new SignInRefused("TOO_MANY_TRIES");
  if (!right) {
    const tries = user.failedTries + 1;
    const wait = tries < 10 ? 0 : Math.min(900, 2 ** (tries - 8));
    await withSystem("count a wrong password", (tx) =>
      tx.update(users).set({ failedTries: tries, lockedUntil: wait ? new Date(Date.now() + wait * 1000) : null }).where(eq(users.id, user.id)));
    return null;
  }
  if (user.failedTries) await withSystem("forget wrong passwords", (tx) => tx.update(users).set({ failedTries: 0, lockedUntil: null }).where(eq(users.id, user.id)));
  return { id: user.id, name: user.name, email: user.email };
}

/** The cookie is a signed token that carries the session's id alone; the row behind it decides on each request. */
export function authOptions(): NextAuthOptions {
  return {
    secret: env().NEXTAUTH_SECRET,
    session: { strategy: "jwt", maxAge: SESSION_SECONDS },
    pages: { signIn: "/sign-in", error: "/sign-in" },
    providers: [
      Credentials({
        name: "Password",
        credentials: { email: { type: "email" }, password: { type: "password" } },
        async authorize(given, request) {
          const headers = (request.headers ?? {}) as Record<string, string | undefined>;
          try {
            return await userFor((given?.email ?? "").trim().toLowerCase().slice(0, 320), (given?.password ?? "").slice(0, 1024), headers["x-forwarded-for"] ?? "local");
          } catch (error) {
            if (error instanceof SignInRefused) throw error;
            logFault("sign-in", error);
            throw new SignInRefused(awayOf(error) ? TRY_AGAIN : "BROKEN");
          }
        },
      }),
    ],
    callbacks: {
      async jwt({ token, user }) {
        if (user) {
          const id = randomUUID();
          await withSystem("a new session", (tx) =>
            tx.insert(sessions).values({ id, userId: user.id, expiresAt: new Date(Date.now() + SESSION_SECONDS * 1000) }));
          token.sid = id;
        }
        return token;
      },
      session({ session, token }) {
        return { ...session, sid: token.sid };
      },
    },
    events: {
      async signOut({ token }) {
        if (typeof token?.sid === "string") await endSession(token.sid);
      },
    },
    logger: { error: (code) => console.error(JSON.stringify({ at: new Date().toISOString(), event: "auth-error", code })), warn: () => undefined, debug: () => undefined },
  };
}

const endSession = (id: string): Promise<unknown> =>
  withSystem("sign out", (tx) => tx.update(sessions).set({ revokedAt: new Date() }).where(eq(sessions.id, id)));

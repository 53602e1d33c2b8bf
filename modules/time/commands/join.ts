import "server-only";
import { randomUUID } from "node:crypto";
import { and, eq, isNull, sql } from "drizzle-orm";
import { people, users } from "@/db/schema";
import { defineCommand } from "@/modules/access/command";
import { hashSecret, verifySecret } from "@/modules/access/password";
import { ok, refuse } from "@/modules/kernel/result";
import { passwordProblem } from "../domain/password-rules";
import { openInvitation } from "../identity/invitation";
import { joinInput } from "../join-input";

/**
 * Takes an invitation: the person sets their own password, or, known from another shop, proves the one they have. Once.
 */
export const acceptInvitation = defineCommand({
  name: "time.acceptInvitation", act: "system.run", input: joinInput, secret: ["token", "password"],
  run: async (ctx, { token, password }) => {
    const over = () => refuse("INVITATION_OVER", "This invitation is not good (any more). Ask the owner for a new one.");
    const invited = await openInvitation(token);
    if (!invited || invited.ctx.shop.id !== ctx.shop.id) return over();
    // Held until the end, so that two takers of one invitation come one after the other.
    const mine = and(eq(people.shopId, ctx.shop.id), eq(people.id, invited.personId), eq(people.version, invited.version), isNull(people.userId), isNull(people.leftAt));
    if (!(await ctx.tx.select({ id: people.id }).from(people).where(mine).for("update")).length) return over();
    const problem = passwordProblem(password, [invited.name, ctx.shop.name, invited.email]);
    if (problem) return refuse("PASSWORD_WEAK", problem, { field: "password" });
    const [known] = await ctx.tx.select().from(users).where(eq(users.email, invited.email));
    if (known && (known.disabledAt || (known.lockedUntil && known.lockedUntil > ctx.now) || !(await verifySecret(known.passwordHash, password)))) {
      return refuse("PASSWORD_OTHER", "This address signs in already. Type the password it has.", { field: "password" });
    }
    const userId = known?.id ?? randomUUID();
    if (!known) await ctx.tx.insert(users).values({ id: userId, email: invited.email, name: invited.name, passwordHash: await hashSecret(password) });
    const taken = await ctx.tx.update(people).set({ userId, version: sql`${people.version} + 1` })
      .where(mine).returning({ id: people.id });
    return taken.length ? ok({ personId: invited.personId, slug: ctx.shop.slug }) : over();
  },
  subject: (_, value) => ({ kind: "person", id: value.personId }),
});

import "server-only";
import { and, eq, isNull } from "drizzle-orm";
import { people } from "@/db/schema";
import { withShop } from "@/db/scope";
import { mustBeAble, NotFound, type ShopContext, type TxContext } from "@/modules/access/context";
import { allowed, reached } from "@/modules/access/rate-limit";
import { ok, refuse, type Result } from "@/modules/kernel/result";
import { z } from "@/modules/kernel/zod";
import type { OwnScreen } from "../board";
import { missingOut, ownWeek } from "../queries/own-time";
import { givePass, PASS_SECONDS } from "./pass";
import { checkPin } from "./pin";

export const identifyInput = z.discriminatedUnion("kind", [
  z.strictObject({ kind: z.literal("badge"), badge: z.string().trim().min(1, "Hold your badge to the reader.").max(100) }),
  z.strictObject({ kind: z.literal("pin"), personId: z.uuid(), pin: z.string().regex(/^\d{4,12}$/, "Type the digits of your PIN.") }),
]);

/** Wrong tries a tablet may make in an hour, over all names. */
const WRONG_PER_HOUR = 60;
const HOUR = 3600;

/**
 * Who holds this badge, or whether this is the person's PIN. Answers a pass for this tablet and what the person alone
 * sees. Writes only the count of wrong PINs. It is no session: each act carries the pass, and it ends by itself.
 */
export async function identify(ctx: ShopContext, input: z.output<typeof identifyInput>): Promise<Result<OwnScreen>> {
  mustBeAble(ctx, "clock.use");
  if (ctx.actor.kind !== "device") throw new NotFound("tablet");
  const deviceId = ctx.actor.id;
  const key = `clock:${deviceId}`;
  if (await reached(key, WRONG_PER_HOUR, HOUR)) return refuse("TABLET_WAITS", "Too many wrong tries on this tablet within the hour. Use another tablet, or ask the manager.");
  const result = await withShop(ctx.shop.id, async (tx): Promise<Result<OwnScreen>> => {
    const inner: TxContext = { ...ctx, tx };
    const who = await personOf(inner, input);
    if (!who.ok) return who;
    const passUntil = new Date(ctx.now.getTime() + PASS_SECONDS * 1000).toISOString();
    return ok({
      personId: who.value, pass: givePass({ deviceId, personId: who.value, at: ctx.now }), passUntil,
      ...(await ownWeek(inner, who.value)), missingOut: await missingOut(inner, who.value),
    });
  });
  if (!result.ok && result.refusal.code !== "PIN_WAIT") await allowed(key, WRONG_PER_HOUR, HOUR);
  return result;
}

async function personOf(ctx: TxContext, input: z.output<typeof identifyInput>): Promise<Result<string>> {
  const here = and(eq(people.shopId, ctx.shop.id), isNull(people.leftAt));
  if (input.kind === "badge") {
    const [p] = await ctx.tx.select({ id: people.id }).from(people).where(and(here, eq(people.badgeCode, input.badge)));
    return p ? ok(p.id) : refuse("BADGE_UNKNOWN", "Badge not known here. Ask the manager.", { field: "badge" });
  }
  const [p] = await ctx.tx.select({ id: people.id }).from(people).where(and(here, eq(people.id, input.personId)));
  if (!p) return refuse("PIN_NONE", "There is no PIN for this name. Use your badge, or ask the manager for a PIN.", { field: "pin" });
  const right = await checkPin(ctx, p.id, input.pin);
  return right.ok ? ok(p.id) : right;
}

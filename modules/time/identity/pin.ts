import "server-only";
import { and, eq } from "drizzle-orm";
import { people } from "@/db/schema";
import type { TxContext } from "@/modules/access/context";
import { env } from "@/modules/access/env";
import { hashSecret, verifySecret } from "@/modules/access/password";
import { ok, refuse, type Result } from "@/modules/kernel/result";
import { PIN_TRIES_MAX, pinWaitSeconds } from "../domain/pin-rules";

export const hashPin = (pin: string): Promise<string> => hashSecret(pin + env().VK_PIN_PEPPER);

/** No hash of anybody: as slow to compare as a real one. */
const nobody = hashSecret("nobody's");

/**
 * Whether this is the person's PIN. Counts a wrong one in the open transaction, which must therefore commit.
 * Refuses `PIN_WRONG`, `PIN_WAIT` with seconds, `PIN_DEAD`, `PIN_NONE`.
 */
export async function checkPin(ctx: TxContext, personId: string, pin: string): Promise<Result<true>> {
  const where = and(eq(people.shopId, ctx.shop.id), eq(people.id, personId));
  const [p] = await ctx.tx.select({ pinHash: people.pinHash, tries: people.pinFailedTries, until: people.pinLockedUntil }).from(people).where(where).for("update");
  if (!p?.pinHash) {
    await verifySecret(await nobody, pin);
    return refuse("PIN_NONE", "There is no PIN for this name. Use your badge, or ask the manager for a PIN.", { field: "pin" });
  }
  if (p.tries >= PIN_TRIES_MAX) return dead();
  const left = p.until ? Math.ceil((p.until.getTime() - ctx.now.getTime()) / 1000) : 0;
  if (left > 0) return wait(left);
  if (await verifySecret(p.pinHash, pin + env().VK_PIN_PEPPER)) {
    if (p.tries > 0) await ctx.tx.update(people).set({ pinFailedTries: 0, pinLockedUntil: null }).where(where);
    return ok(true);
  }
  const tries = p.tries + 1;
  const seconds = pinWaitSeconds(tries);
  await ctx.tx.update(people).set({ pinFailedTries: tries, pinLockedUntil: seconds ? new Date(ctx.now.getTime() + seconds * 1000) : null }).where(where);
  if (seconds === null) return dead();
  return seconds > 0 ? wait(seconds) : refuse("PIN_WRONG", "That PIN does not match this name. Try again, or use your badge.", { field: "pin" });
}

const dead = () => refuse("PIN_DEAD", "Ten wrong PINs in a row: this PIN is dead. Use your badge; a manager can set a new PIN.", { field: "pin" });
const wait = (seconds: number) =>
  refuse("PIN_WAIT", `Too many wrong PINs. Wait ${seconds < 90 ? `${seconds} s` : `${Math.ceil(seconds / 60)} min`}, or use your badge.`, { field: "pin", data: { seconds } });

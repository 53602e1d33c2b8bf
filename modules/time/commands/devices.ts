import "server-only";
import { randomUUID } from "node:crypto";
import { and, eq, gt, isNull } from "drizzle-orm";
import { devices } from "@/db/schema";
import { defineCommand } from "@/modules/access/command";
import { personIdOf } from "@/modules/access/context";
import { hashToken, newToken } from "@/modules/access/secret-token";
import { ok, refuse } from "@/modules/kernel/result";
import { z } from "@/modules/kernel/zod";
import { newDeviceInput } from "../device-input";
import { ENROL_MINUTES, enrolCodeHash, newEnrolCode } from "../identity/enrol-code";

const codeUntil = (now: Date) => new Date(now.getTime() + ENROL_MINUTES * 60_000);

/** Makes room for a tablet and a code to type into it. The code is shown once; only its hash is kept. */
export const addDevice = defineCommand({
  name: "time.addDevice", act: "devices.write", input: newDeviceInput,
  run: async (ctx, { name, kind }) => {
    const id = randomUUID();
    const expires = codeUntil(ctx.now);
    await ctx.tx.insert(devices).values({ shopId: ctx.shop.id, id, name, kind, enrolledBy: personIdOf(ctx) });
    return ok({ id, name, expires: expires.toISOString() });
  },
  subject: (_, value) => ({ kind: "device", id: value.id }),
});

/**
 * A fresh code for a tablet that is not enrolled yet. Apart from the commands, because a code is a secret: it is in no
 * record of what was answered.
 */
export const makeEnrolCode = defineCommand({
  name: "time.makeEnrolCode", act: "devices.write", input: z.strictObject({ id: z.uuid(), code: z.string().min(8).max(12) }), secret: ["code"],
  run: async (ctx, { id, code }) => {
    const expires = codeUntil(ctx.now);
    const changed = await ctx.tx.update(devices).set({ enrolCodeHash: enrolCodeHash(code), enrolCodeExpiresAt: expires })
      .where(and(eq(devices.shopId, ctx.shop.id), eq(devices.id, id), isNull(devices.tokenHash), isNull(devices.revokedAt))).returning({ name: devices.name });
    return changed[0] ? ok({ id, name: changed[0].name, expires: expires.toISOString() }) : refuse("ENROLLED", "This tablet is enrolled already, or it was put out of use. Add it anew.");
  },
  subject: (input) => ({ kind: "device", id: input.id }),
});

/**
 * The token of a bench computer. Made where it is shown and sent along once, like a code: only its hash is kept, in no record of
 * what was asked or answered. A new one ends the one before it at once.
 */
export const makeBenchToken = defineCommand({
  name: "time.makeBenchToken", act: "devices.write", input: z.strictObject({ id: z.uuid(), token: z.string().regex(/^[\w-]{43}$/, "A token of 43 letters.") }), secret: ["token"],
  run: async (ctx, { id, token }) => {
    const changed = await ctx.tx.update(devices).set({ tokenHash: hashToken(token), enrolCodeHash: null, enrolCodeExpiresAt: null, enrolledBy: personIdOf(ctx) })
      .where(and(eq(devices.shopId, ctx.shop.id), eq(devices.id, id), eq(devices.kind, "bench"), isNull(devices.revokedAt))).returning({ name: devices.name });
    return changed[0] ? ok({ id, name: changed[0].name }) : refuse("NOT_A_BENCH", "Only a bench computer in use has a token to copy. Add one, or choose another.");
  },
  subject: (input) => ({ kind: "device", id: input.id }),
});

export const freshEnrolCode = newEnrolCode;

/** Ends a tablet's token at once. What it kept meanwhile may still be handed over, to be checked. */
export const revokeDevice = defineCommand({
  name: "time.revokeDevice", act: "devices.write", input: z.strictObject({ id: z.uuid() }),
  run: async (ctx, { id }) => {
    const changed = await ctx.tx.update(devices).set({ revokedAt: ctx.now, enrolCodeHash: null, enrolCodeExpiresAt: null })
      .where(and(eq(devices.shopId, ctx.shop.id), eq(devices.id, id), isNull(devices.revokedAt))).returning({ name: devices.name });
    return changed[0] ? ok({ id, name: changed[0].name }) : refuse("NOT_FOUND", "This tablet is out of use already.");
  },
  subject: (input) => ({ kind: "device", id: input.id }),
});

/** Takes the token in: once, within the code's minutes. The device acts for itself. */
export const enrolDevice = defineCommand({
  name: "time.enrolDevice", act: "clock.use", input: z.strictObject({ codeHash: z.string().length(64), tokenHash: z.string().length(64) }), secret: ["codeHash", "tokenHash"],
  run: async (ctx, { codeHash, tokenHash }) => {
    const changed = await ctx.tx.update(devices).set({ tokenHash, enrolCodeHash: null, enrolCodeExpiresAt: null, lastSeenAt: ctx.now })
      .where(and(eq(devices.shopId, ctx.shop.id), eq(devices.enrolCodeHash, codeHash), gt(devices.enrolCodeExpiresAt, ctx.now), isNull(devices.tokenHash), isNull(devices.revokedAt)))
      .returning({ id: devices.id, name: devices.name, kind: devices.kind });
    return changed[0] ? ok(changed[0]) : refuse("CODE_OVER", "This code is not good (any more). Ask the manager for a new one; it works for ten minutes.", { field: "code" });
  },
  subject: (_, value) => ({ kind: "device", id: value.id }),
});

/** A new token and its hash. */
export const newDeviceToken = (): { token: string; tokenHash: string } => {
  const token = newToken();
  return { token, tokenHash: hashToken(token) };
};

import "server-only";
import { randomUUID } from "node:crypto";
import { and, eq, isNull, sql } from "drizzle-orm";
import { payRates, people } from "@/db/schema";
import { changedMeanwhile, defineCommand } from "@/modules/access/command";
import { personIdOf } from "@/modules/access/context";
import { currencyDecimals } from "@/modules/kernel/format";
import { parseMinor } from "@/modules/kernel/money";
import { ok, refuse } from "@/modules/kernel/result";
import { z } from "@/modules/kernel/zod";
import { hashPin } from "../identity/pin";
import { badgeInput, personEditInput, personInput, pinInput, rateInput } from "../input";

const skillList = (text: string): string[] => [...new Set(text.split(",").map((s) => s.trim().toLowerCase()).filter(Boolean))];
const person = (shopId: string, id: string) => and(eq(people.shopId, shopId), eq(people.id, id), isNull(people.leftAt));
const gone = () => refuse("NOT_FOUND", "This person is not here (any more).");

export const addPerson = defineCommand({
  name: "time.addPerson", act: "people.write", input: personInput,
  run: async (ctx, { skills, email, ...input }) => {
    const id = randomUUID();
    await ctx.tx.insert(people).values({ shopId: ctx.shop.id, id, ...input, email: email.toLowerCase() || null, skills: skillList(skills) });
    return ok({ id });
  },
  subject: (_, value) => ({ kind: "person", id: value.id }),
});

export const changePerson = defineCommand({
  name: "time.changePerson", act: "people.write", input: personEditInput,
  subject: (input) => ({ kind: "person", id: input.id }),
  run: async (ctx, { id, version, skills, email, ...input }) => {
    if (id === personIdOf(ctx) && !input.roles.includes("owner")) return refuse("OWN_ROLE", "You cannot take the owner's role from yourself. Another owner does it.", { field: "roles" });
    const changed = await ctx.tx.update(people).set({ ...input, email: email.toLowerCase() || null, skills: skillList(skills), version: sql`${people.version} + 1` })
      .where(and(person(ctx.shop.id, id), eq(people.version, version))).returning({ version: people.version });
    if (changed[0]) return ok({ id, version: changed[0].version });
    return (await ctx.tx.select({ id: people.id }).from(people).where(person(ctx.shop.id, id))).length ? changedMeanwhile("This person") : gone();
  },
});

export const setBadge = defineCommand({
  name: "time.setBadge", act: "devices.write", input: badgeInput, secret: ["badgeCode"],
  subject: (input) => ({ kind: "person", id: input.id }),
  run: async (ctx, { id, badgeCode }) => {
    const changed = await ctx.tx.update(people).set({ badgeCode: badgeCode || null }).where(person(ctx.shop.id, id)).returning({ id: people.id });
    return changed.length ? ok({ id, hasBadge: badgeCode !== "" }) : gone();
  },
});

/** A new PIN; wakes one that was dead after ten wrong tries. */
export const setPin = defineCommand({
  name: "time.setPin", act: "devices.write", input: pinInput, secret: ["pin"],
  subject: (input) => ({ kind: "person", id: input.id }),
  run: async (ctx, { id, pin }) => {
    const changed = await ctx.tx.update(people).set({ pinHash: await hashPin(pin), pinFailedTries: 0, pinLockedUntil: null }).where(person(ctx.shop.id, id)).returning({ id: people.id });
    return changed.length ? ok({ id }) : gone();
  },
});

/** A pay rate from a day on. Hours before it keep theirs; a second one from the same day replaces the first. */
export const setRate = defineCommand({
  name: "time.setRate", act: "pay.write", input: rateInput,
  subject: (input) => ({ kind: "person", id: input.personId }),
  run: async (ctx, { personId, validFrom, rate }) => {
    const rateMinor = parseMinor(rate, currencyDecimals(ctx.shop.currency));
    if (rateMinor === null || rateMinor <= 0) return refuse("RATE_NOT_READABLE", "An amount an hour, such as 29.50.", { field: "rate" });
    if (!(await ctx.tx.select({ id: people.id }).from(people).where(person(ctx.shop.id, personId))).length) return gone();
    await ctx.tx.insert(payRates).values({ shopId: ctx.shop.id, id: randomUUID(), personId, validFrom, rateMinor })
      .onConflictDoUpdate({ target: [payRates.shopId, payRates.personId, payRates.validFrom], set: { rateMinor } });
    return ok({ personId, validFrom, rateMinor });
  },
});

/** The person leaves: badge, PIN and sign-in to this shop end at once; name and hours stay. */
export const leaveShop = defineCommand({
  name: "time.leaveShop", act: "people.write", input: z.strictObject({ id: z.uuid() }),
  subject: (input) => ({ kind: "person", id: input.id }),
  run: async (ctx, { id }) => {
    if (id === personIdOf(ctx)) return refuse("OWN_LEAVING", "You cannot end your own work here. Another owner does it.");
    const changed = await ctx.tx.update(people).set({ leftAt: ctx.now, badgeCode: null, pinHash: null, version: sql`${people.version} + 1` }).where(person(ctx.shop.id, id)).returning({ id: people.id });
    return changed.length ? ok({ id }) : gone();
  },
});

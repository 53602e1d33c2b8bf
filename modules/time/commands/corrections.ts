import "server-only";
import { randomUUID } from "node:crypto";
import { and, eq, isNull, ne, sql } from "drizzle-orm";
import { correctionRequests, people, punches, timeEntries } from "@/db/schema";
import { defineCommand } from "@/modules/access/command";
import { personIdOf, type TxContext } from "@/modules/access/context";
import { rolesFor } from "@/modules/access/roles";
import { ok, refuse, type Refused } from "@/modules/kernel/result";
import { typedSpan } from "../domain/typed-span";
import { answerInput, askCorrectionInput, enterTimeInput, setAsideInput } from "../input";
import { recordSpan } from "../ledger/record-span";

/** Asks that one's own time be put right; somebody else accepts it. */
export const askCorrection = defineCommand({
  name: "time.askCorrection", act: "time.see-own", input: askCorrectionInput,
  run: async (ctx, input) => {
    const personId = personIdOf(ctx);
    if (!personId) return refuse("NOT_A_PERSON", "A person asks for their own correction.");
    const span = typedSpan(input, ctx.shop.zone, ctx.now);
    if (!span.ok) return span;
    if (input.timeEntryId) {
      const [old] = await ctx.tx.select({ id: timeEntries.id }).from(timeEntries).where(and(
        eq(timeEntries.shopId, ctx.shop.id), eq(timeEntries.id, input.timeEntryId), eq(timeEntries.personId, personId), eq(timeEntries.clock, input.clock), isNull(timeEntries.voidedAt)));
      if (!old) return refuse("NOT_FOUND", "This entry is not yours, or it was corrected already.");
    }
    const id = randomUUID();
    await ctx.tx.insert(correctionRequests).values({
      shopId: ctx.shop.id, id, personId, timeEntryId: input.timeEntryId, clock: input.clock, operationId: input.operationId, indirectCode: input.indirect, ...span.value, reason: input.reason, askedAt: ctx.now,
    });
    return ok({ id });
  },
  subject: (_, value) => ({ kind: "correction", id: value.id }),
});

/** Nobody accepts their own time. Where nobody else may, it is allowed and marked "alone". */
async function notOwn(ctx: TxContext, personId: string): Promise<Refused | "alone" | null> {
  if (personIdOf(ctx) !== personId) return null;
  const others = await ctx.tx.select({ id: people.id }).from(people).where(and(
    eq(people.shopId, ctx.shop.id), isNull(people.leftAt), ne(people.id, personId), sql`${people.roles} && ${sql.raw(`array[${rolesFor("time.correct").map((r) => `'${r}'`).join(",")}]::text[]`)}`)).limit(1);
  return others.length ? refuse("OWN_TIME", "Nobody accepts their own time. Ask for a correction; somebody else accepts it.") : "alone";
}

async function openRequest(ctx: TxContext, id: string) {
  const [request] = await ctx.tx.select().from(correctionRequests).where(and(eq(correctionRequests.shopId, ctx.shop.id), eq(correctionRequests.id, id))).for("update");
  return request && request.answer === null ? request : null;
}
const answered = () => refuse("ALREADY_ANSWERED", "This was answered already.");

export const acceptCorrection = defineCommand({
  name: "time.acceptCorrection", act: "time.correct", input: answerInput,
  subject: (input) => ({ kind: "correction", id: input.id }),
  run: async (ctx, { id, note }) => {
    const request = await openRequest(ctx, id);
    const by = personIdOf(ctx);
    if (!request || !by) return answered();
    const own = await notOwn(ctx, request.personId);
    if (own && own !== "alone") return own;
    const done = await recordSpan(ctx, {
      personId: request.personId, clock: request.clock === "door" ? "door" : "bench", operationId: request.operationId, indirect: request.indirectCode, startedAt: request.startedAt, endedAt: request.endedAt,
      reason: `${own ? "alone: " : ""}${request.reason}`, source: "correction", enteredBy: request.personId, acceptedBy: by, replacesId: request.timeEntryId, isDone: false,
    });
    if (!done.ok) return done;
    await ctx.tx.update(correctionRequests).set({ answer: note ? `accepted: ${note}` : "accepted", answeredBy: by, answeredAt: ctx.now }).where(and(eq(correctionRequests.shopId, ctx.shop.id), eq(correctionRequests.id, id)));
    return ok({ id, entryId: done.value.id });
  },
});

export const refuseCorrection = defineCommand({
  name: "time.refuseCorrection", act: "time.correct", input: setAsideInput,
  subject: (input) => ({ kind: "correction", id: input.id }),
  run: async (ctx, { id, reason }) => {
    const request = await openRequest(ctx, id);
    if (!request) return answered();
    const own = await notOwn(ctx, request.personId);
    if (own && own !== "alone") return own;
    await ctx.tx.update(correctionRequests).set({ answer: `refused: ${reason}`, answeredBy: personIdOf(ctx), answeredAt: ctx.now }).where(and(eq(correctionRequests.shopId, ctx.shop.id), eq(correctionRequests.id, id)));
    return ok({ id });
  },
});

/** A lead or manager enters another's time with a reason, or puts an entry right. The entry replaced stays readable. */
export const enterTime = defineCommand({
  name: "time.enterTime", act: "time.correct", input: enterTimeInput,
  run: async (ctx, input) => {
    const by = personIdOf(ctx);
    if (!by) return refuse("NOT_A_PERSON", "A person enters time.");
    const own = await notOwn(ctx, input.personId);
    if (own && own !== "alone") return own;
    const span = typedSpan(input, ctx.shop.zone, ctx.now);
    if (!span.ok) return span;
    return recordSpan(ctx, {
      personId: input.personId, clock: input.clock, operationId: input.operationId, indirect: input.indirect, ...span.value, reason: `${own ? "alone: " : ""}${input.reason}`, source: "manager",
      enteredBy: by, acceptedBy: by, replacesId: input.replacesId, isDone: input.isDone,
    });
  },
  subject: (_, value) => ({ kind: "timeEntry", id: value.id }),
});

/** Takes an entry out of the count, with a reason; it stays readable. */
export const setAsideEntry = defineCommand({
  name: "time.setAsideEntry", act: "time.correct", input: setAsideInput,
  subject: (input) => ({ kind: "timeEntry", id: input.id }),
  run: async (ctx, { id, reason }) => {
    const at = and(eq(timeEntries.shopId, ctx.shop.id), eq(timeEntries.id, id), isNull(timeEntries.voidedAt));
    const [entry] = await ctx.tx.select({ personId: timeEntries.personId }).from(timeEntries).where(at);
    if (!entry) return refuse("NOT_FOUND", "This entry is not there, or it was corrected already.");
    const own = await notOwn(ctx, entry.personId);
    if (own && own !== "alone") return own;
    await ctx.tx.update(timeEntries).set({ voidedAt: ctx.now, reason, acceptedBy: personIdOf(ctx), version: sql`${timeEntries.version} + 1` }).where(at);
    return ok({ id });
  },
});

/** Somebody looked at a flagged punch and what it asked is settled. The punch itself is never changed. */
export const settlePunch = defineCommand({
  name: "time.settlePunch", act: "time.correct", input: answerInput,
  subject: (input) => ({ kind: "punch", id: input.id }),
  run: async (ctx, { id, note }) => {
    const [punch] = await ctx.tx.select({ personId: punches.personId, at: punches.at }).from(punches).where(and(eq(punches.shopId, ctx.shop.id), eq(punches.id, id)));
    if (!punch) return refuse("NOT_FOUND", "This punch is not there.");
    const own = await notOwn(ctx, punch.personId);
    if (own && own !== "alone") return own;
    const settledId = randomUUID();
    await ctx.tx.insert(punches).values({ shopId: ctx.shop.id, id: settledId, personId: punch.personId, kind: "settled", at: punch.at, receivedAt: ctx.now, source: "manager", note: `${id} ${note}`.trim() });
    return ok({ id });
  },
});

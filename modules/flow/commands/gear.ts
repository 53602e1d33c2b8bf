import "server-only";
import { randomUUID } from "node:crypto";
import { and, desc, eq, inArray, lte } from "drizzle-orm";
import { benchChecks, benches, checkPlates, engineFamilies, fixtures } from "@/db/schema";
import { defineCommand } from "@/modules/access/command";
import { personIdOf, type TxContext } from "@/modules/access/context";
import { localDate } from "@/modules/kernel/instant";
import { ok, refuse, type Result } from "@/modules/kernel/result";
import type { z } from "@/modules/kernel/zod";
import { standingCheck } from "../bench-check-sql";
import { benchFactorFromPlates } from "../domain/bench-factor";
import { parseLiftUm } from "../domain/lift-ladder";
import { checkDoubt } from "../domain/plate-doubt";
import { plateFlowCfm } from "../domain/plate-reading";
import type { BenchRange, BenchScale } from "../domain/raw-test";
import { typedNumber } from "../domain/typed-number";
import type { ValveOfFamily } from "../domain/valve-list";
import { addBenchInput, addFamilyInput, addFixtureInput, benchCheckInput } from "../input";

/** The newest check of a bench up to now that counts: its factor and when it was made. */
export async function latestCheck(ctx: TxContext, benchId: string): Promise<{ at: Date; factor: number } | null> {
  const [row] = await ctx.tx.select({ at: benchChecks.at, factor: benchChecks.factor }).from(benchChecks)
    .where(and(eq(benchChecks.shopId, ctx.shop.id), eq(benchChecks.benchId, benchId), lte(benchChecks.at, ctx.now), standingCheck)).orderBy(desc(benchChecks.at)).limit(1);
  return row ?? null;
}

export const addBench = defineCommand({
  name: "flow.add-bench",
  act: "flow.set-up",
  input: addBenchInput,
  async run(ctx, input) {
    const id = randomUUID();
    await ctx.tx.insert(benches).values({ shopId: ctx.shop.id, id, ...input });
    return ok({ id });
  },
  subject: (_, value) => ({ kind: "bench", id: value.id }),
});

const numberOf = (text: string): number => {
  const typed = typedNumber(text);
  return typed.ok ? typed.value : Number.NaN;
};

type BenchCheckIn = z.output<typeof benchCheckInput>;
interface PlateReading { plateId: string | null; serial: string; referenceCfm: number; indicatedText: string; rangeLabel: string | null; indicatedCfm: number }

/** Plates as flowed: what was typed, and the flow it means on this bench before any factor. */
function plateReadingsOf(bench: { scale: BenchScale; ranges: BenchRange[] }, plates: BenchCheckIn["plates"], known: readonly { id: string; serial: string }[]): Result<PlateReading[]> {
  const out: PlateReading[] = [];
  for (const [i, p] of plates.entries()) {
    const flow = plateFlowCfm(bench, p);
    if (!flow.ok) return refuse(flow.refusal.code, flow.refusal.message, { field: `plates.${i}.${flow.refusal.field === "range" ? "range" : "indicated"}` });
    out.push({ plateId: known.find((k) => k.serial === p.serial)?.id ?? null, serial: p.serial, referenceCfm: numberOf(p.reference), indicatedText: p.indicated, rangeLabel: bench.scale === "direct" || p.range === "" ? null : p.range, indicatedCfm: flow.value });
  }
  return ok(out);
}

/**
 * A bench check. With plates the factor comes out of them, with how far it moved and how well the plates agree; without, the
 * bench was looked over and keeps its factor. A doubtful one is kept with a reason only. Kept for ever, by date.
 */
export const recordBenchCheck = defineCommand({
  name: "flow.record-bench-check",
  act: "flow.record",
  input: benchCheckInput,
  async run(ctx, input) {
    const { tx, shop } = ctx;
    const [bench] = await tx.select({ scale: benches.scale, ranges: benches.ranges }).from(benches).where(and(eq(benches.shopId, shop.id), eq(benches.id, input.benchId)));
    if (!bench) return refuse("NOT_FOUND", "This bench is not here.", { field: "benchId" });
    const last = await latestCheck(ctx, input.benchId);
    const known = input.plates.length === 0 ? [] : await tx.select({ id: checkPlates.id, serial: checkPlates.serial, dueOn: checkPlates.dueOn }).from(checkPlates)
      .where(and(eq(checkPlates.shopId, shop.id), inArray(checkPlates.serial, input.plates.map((p) => p.serial))));
    const today = localDate(ctx.now, shop.zone);
    const read = plateReadingsOf({ scale: bench.scale as BenchScale, ranges: bench.ranges as BenchRange[] }, input.plates, known);
    if (!read.ok) return read;
    const plateReadings = read.value;
    const lastFactor = last ? { lastFactor: last.factor } : {};
    const made = plateReadings.length === 0
      ? ok({ factor: last?.factor ?? 1, maxResidualPercent: 0, flags: [] as const })
      : benchFactorFromPlates({ referenceCfm: plateReadings.map((p) => p.referenceCfm), indicatedCfm: plateReadings.map((p) => p.indicatedCfm), ...lastFactor });
    if (!made.ok) return made;
    const doubt = plateReadings.length === 0 ? null : checkDoubt({ plates: plateReadings, made: made.value, ...lastFactor });
    if (doubt && input.reason === "") return refuse(doubt.code, doubt.words, { field: "reason", data: { askReason: true } });
    const { factor, maxResidualPercent } = made.value;
    const overdue = known.some((k) => k.dueOn !== null && k.dueOn < today);
    const flags: string[] = [...made.value.flags, ...(overdue ? ["CHECK_PLATE_OVERDUE"] : [])];
    const driftPercent = last && plateReadings.length > 0 ? (factor / last.factor - 1) * 100 : null;
    const id = randomUUID();
    await tx.insert(benchChecks).values({
      shopId: shop.id, id, benchId: input.benchId, at: ctx.now, personId: personIdOf(ctx), plateReadings, factor, maxResidualPercent, driftPercent, flags, note: input.note, reason: doubt ? input.reason : null,
    });
    return ok({ id, benchId: input.benchId, factor, maxResidualPercent, driftPercent, flags });
  },
  subject: (input) => ({ kind: "bench", id: input.benchId }),
});

export const addFixture = defineCommand({
  name: "flow.add-fixture",
  act: "flow.set-up",
  input: addFixtureInput,
  async run(ctx, { lengthMm, ...input }) {
    const id = randomUUID();
    await ctx.tx.insert(fixtures).values({ shopId: ctx.shop.id, id, ...input, lengthMm: lengthMm === "" ? null : numberOf(lengthMm) });
    return ok({ id });
  },
  subject: (_, value) => ({ kind: "fixture", id: value.id }),
});

export const addFamily = defineCommand({
  name: "flow.add-family",
  act: "flow.set-up",
  input: addFamilyInput,
  async run(ctx, { camLiftIntake, camLiftExhaust, camLiftUnit, valves, ...input }) {
    const lifts: Record<"camLiftIntake" | "camLiftExhaust", number | null> = { camLiftIntake: null, camLiftExhaust: null };
    for (const [field, text] of [["camLiftIntake", camLiftIntake], ["camLiftExhaust", camLiftExhaust]] as const) {
      if (text === "") continue;
      const um = parseLiftUm(text, camLiftUnit);
      if (!um.ok) return refuse(um.refusal.code, um.refusal.message, { field });
      lifts[field] = um.value;
    }
    const id = randomUUID();
    await ctx.tx.insert(engineFamilies).values({
      shopId: ctx.shop.id, id, ...input, camLiftIntakeUm: lifts.camLiftIntake, camLiftExhaustUm: lifts.camLiftExhaust,
      valves: valves.map((v): ValveOfFamily => ({ side: v.side, position: v.position, headMm: v.headMm, stemMm: v.stemMm ?? null, seatAngleDeg: v.seatAngleDeg ?? null })),
    });
    return ok({ id });
  },
  subject: (_, value) => ({ kind: "engine-family", id: value.id }),
});

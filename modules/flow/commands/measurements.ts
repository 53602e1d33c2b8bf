import "server-only";
import { randomUUID } from "node:crypto";
import { and, desc, eq, sql } from "drizzle-orm";
import { heads, measurementLimits, measurements } from "@/db/schema";
import { changedMeanwhile, defineCommand } from "@/modules/access/command";
import { personIdOf, type TxContext } from "@/modules/access/context";
import { ok, refuse, type Refusal, type Result } from "@/modules/kernel/result";
import type { z } from "@/modules/kernel/zod";
import type { RefusedMeasure, SavedMeasure } from "../domain/measure-answer";
import { DERIVED_KINDS, measureKind, UNITS_OF, type MeasureKind } from "../domain/measure-kinds";
import { measuredValue, measureQuestion, toBase } from "../domain/measure-value";
import { typedNumber } from "../domain/typed-number";
import { limitInput, saveMeasurementsInput, type measurementRow } from "../measure-input";

type Row = z.output<typeof measurementRow>;
export const measureKey = (r: { cylinder: number; side: string; position: string; kind: string }): string => `${r.cylinder}/${r.side}/${r.position}/${r.kind}`;

/** Where a kind may stand: a valve has side and place, a cylinder or head neither. */
const fits = (kind: MeasureKind, r: Row): boolean => (kind.scope === "valve" ? r.side !== "" && r.position !== "" : r.side === "" && r.position === "" && (kind.scope === "cylinder" || r.cylinder === 1));

async function saveRow(ctx: TxContext, at: { headId: string; stage: string; instrument: string; cylinders: number }, r: Row): Promise<Result<SavedMeasure>> {
  const kind = measureKind(r.kind);
  if (!kind || !fits(kind, r) || r.cylinder > at.cylinders) return refuse("NO_SUCH_LINE", "This head has no such line.");
  const here = and(
    eq(measurements.shopId, ctx.shop.id), eq(measurements.headId, at.headId), eq(measurements.cylinder, r.cylinder), eq(measurements.side, r.side), eq(measurements.position, r.position),
    eq(measurements.kind, r.kind), eq(measurements.stage, at.stage),
  );
  const [standing] = await ctx.tx.select({ revision: measurements.revision, valueText: measurements.valueText, unit: measurements.unit }).from(measurements).where(here).orderBy(desc(measurements.revision)).limit(1);
  const revision = standing?.revision ?? 0;
  if (revision !== r.revisionSeen) return refuse("CHANGED_MEANWHILE", `Somebody else wrote here meanwhile: it says ${standing?.valueText ? `${standing.valueText} ${standing.unit}` : "nothing"}. What you typed is still here.`, { data: { revision, valueText: standing?.valueText ?? "", unit: standing?.unit ?? r.unit } });
  const cleared = r.value === "";
  if (cleared && revision === 0) return refuse("NOTHING_THERE", "There is nothing here to take back.");
  const value = cleared ? ok({ valueText: "", unit: standing?.unit ?? r.unit, base: 0 }) : measuredValue(r.value, kind, r.unit);
  if (!value.ok) return value;
  const question = cleared || r.confirmed ? null : measureQuestion(value.value, kind);
  if (question) return refuse(question.code, question.words, { data: { asks: true } });
  await ctx.tx.insert(measurements).values({
    shopId: ctx.shop.id, id: randomUUID(), headId: at.headId, cylinder: r.cylinder, side: r.side, position: r.position, kind: r.kind, revision: revision + 1, valueText: value.value.valueText,
    unit: value.value.unit, valueSi: value.value.base, stage: at.stage, instrument: at.instrument, personId: personIdOf(ctx), at: ctx.now,
  });
  return ok({ key: measureKey(r), revision: revision + 1, ...value.value });
}

/** What stands where somebody else wrote meanwhile, so that the person can decide. */
function theirsOf({ code, data }: Refusal): RefusedMeasure["theirs"] {
  return code === "CHANGED_MEANWHILE" && data ? { revision: Number(data.revision), valueText: String(data.valueText), unit: String(data.unit) } : null;
}

/** Lines of the measurement sheet. Each is kept or refused by itself; a refused one keeps nothing of the others away. */
export const saveMeasurements = defineCommand({
  name: "flow.save-measurements",
  act: "flow.record",
  input: saveMeasurementsInput,
  async run(ctx, input) {
    if (input.by !== undefined && input.by !== personIdOf(ctx)) return refuse("OTHER_PERSON", "Somebody else typed this. It waits on the device until they sign in.");
    const [head] = await ctx.tx.select({ cylinders: heads.cylinders }).from(heads).where(and(eq(heads.shopId, ctx.shop.id), eq(heads.id, input.headId))).for("update");
    if (!head) return refuse("NOT_FOUND", "This head is not here.");
    const saved: SavedMeasure[] = [];
    const refused: RefusedMeasure[] = [];
    for (const row of input.rows) {
      const one = await saveRow(ctx, { headId: input.headId, stage: input.stage, instrument: input.instrument, cylinders: head.cylinders }, row);
      if (one.ok) saved.push(one.value);
      else refused.push({ key: measureKey(row), code: one.refusal.code, message: one.refusal.message, asks: one.refusal.data?.asks === true, theirs: theirsOf(one.refusal) });
    }
    return ok({ headId: input.headId, saved, refused });
  },
  subject: (input) => ({ kind: "head", id: input.headId }),
});

/** A limit of a family, as the shop read it in the manual. A later one replaces it and the trail keeps both. */
export const setMeasurementLimit = defineCommand({
  name: "flow.set-limit",
  act: "flow.set-up",
  input: limitInput,
  async run(ctx, input) {
    const dimension = measureKind(input.kind)?.dimension ?? DERIVED_KINDS.find((d) => d.key === input.kind)?.dimension;
    if (!dimension) return refuse("NO_SUCH_LINE", "The sheet has no such line.", { field: "kind" });
    if (!UNITS_OF[dimension].includes(input.unit)) return refuse("UNIT_KIND_MISMATCH", `${input.unit} does not fit here. Write ${UNITS_OF[dimension].join(" or ")}.`, { field: "unit" });
    const [min, max] = [input.min, input.max].map((t) => { const n = typedNumber(t); return t !== "" && n.ok ? toBase(n.value, input.unit, dimension) : null; });
    if (min?.ok && max?.ok && min.value > max.value) return refuse("LIMITS_CROSSED", "The least is larger than the most. Change them over.", { field: "max" });
    const at = and(eq(measurementLimits.shopId, ctx.shop.id), eq(measurementLimits.family, input.family), eq(measurementLimits.kind, input.kind), eq(measurementLimits.side, input.side));
    const values = { minText: input.min || null, maxText: input.max || null, unit: input.unit, sourceText: input.source };
    const [standing] = await ctx.tx.select({ id: measurementLimits.id, version: measurementLimits.version }).from(measurementLimits).where(at).for("update");
    if ((standing?.version ?? 0) !== input.version) return changedMeanwhile("This limit");
    if (!standing) {
      const id = randomUUID();
      await ctx.tx.insert(measurementLimits).values({ shopId: ctx.shop.id, id, family: input.family, kind: input.kind, side: input.side, ...values });
      return ok({ id, version: 1 });
    }
    await ctx.tx.update(measurementLimits).set({ ...values, version: sql`${measurementLimits.version} + 1` }).where(at);
    return ok({ id: standing.id, version: standing.version + 1 });
  },
  subject: (_, value) => ({ kind: "measurement-limit", id: value.id }),
});

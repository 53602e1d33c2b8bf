import "server-only";
import { and, asc, desc, eq } from "drizzle-orm";
import { engineFamilies, epoxyFills, heads, measurementLimits, measurements, people, workOrders, workPieces } from "@/db/schema";
import { ableTo, inShop, mustBeAble, NotFound, personIdOf, type ShopContext } from "@/modules/access/context";
import type { PortSide } from "../domain/comparison-reasons";
import { DERIVED_KINDS, measureKind } from "../domain/measure-kinds";
import { toBase, type MeasureLimit } from "../domain/measure-value";
import { typedNumber } from "../domain/typed-number";
import type { ValveOfFamily } from "../domain/valve-list";

export interface MeasureCell { cylinder: number; side: "" | PortSide; position: string; kind: string; stage: "before" | "after"; revision: number; valueText: string; unit: string; base: number; instrument: string; by: string | null; at: string }
export interface LimitView extends MeasureLimit { kind: string; side: "" | PortSide; version: number }
export interface EpoxyLine { port: string; state: "curing" | "cured"; readyAt: string; mixedAt: string }
export interface MeasurementSheet {
  head: { id: string; mark: string; family: string; cylinders: number; boreMm: number | null; strokeMm: number | null; seatMaterial: string; camLiftIntakeUm: number | null; camLiftExhaustUm: number | null; version: number; workDone: string[]; notes: string };
  pieceId: string | null; orderId: string | null; orderNumber: string | null;
  valves: { side: PortSide; position: ValveOfFamily["position"] }[];
  /** The family has no valve list, so one valve a side is shown. */
  valvesGuessed: boolean;
  cells: MeasureCell[]; limits: LimitView[]; epoxy: EpoxyLine[];
  canRecord: boolean; canSetUp: boolean; canFind: boolean;
  /** Whose typed lines are kept on this device. */
  viewerId: string;
}

function limitView(l: typeof measurementLimits.$inferSelect): LimitView {
  const dimension = measureKind(l.kind)?.dimension ?? DERIVED_KINDS.find((d) => d.key === l.kind)?.dimension ?? "length";
  const base = (text: string | null): number | null => {
    const typed = text === null ? null : typedNumber(text);
    const made = typed?.ok ? toBase(typed.value, l.unit, dimension) : null;
    return made?.ok ? made.value : null;
  };
  return { kind: l.kind, side: l.side as LimitView["side"], min: base(l.minText), max: base(l.maxText), minText: l.minText ?? "", maxText: l.maxText ?? "", unit: l.unit, source: l.sourceText, version: l.version };
}

/** The measurement sheet of one head, newest revision of each line. @throws NotFound */
export async function measurementSheet(ctx: ShopContext, headId: string): Promise<MeasurementSheet> {
  mustBeAble(ctx, "flow.see");
  const s = ctx.shop.id;
  return inShop(ctx, async (tx) => {
    const [row] = await tx.select({ h: heads, orderId: workOrders.id, orderNumber: workOrders.number }).from(heads)
      .leftJoin(workPieces, and(eq(workPieces.shopId, heads.shopId), eq(workPieces.id, heads.pieceId)))
      .leftJoin(workOrders, and(eq(workOrders.shopId, workPieces.shopId), eq(workOrders.id, workPieces.workOrderId)))
      .where(and(eq(heads.shopId, s), eq(heads.id, headId)));
    if (!row) throw new NotFound("head");
    const { h } = row;
    const [family] = await tx.select({ valves: engineFamilies.valves, camLiftIntakeUm: engineFamilies.camLiftIntakeUm, camLiftExhaustUm: engineFamilies.camLiftExhaustUm, boreMm: engineFamilies.boreMm, strokeMm: engineFamilies.strokeMm }).from(engineFamilies).where(and(eq(engineFamilies.shopId, s), eq(engineFamilies.name, h.family)));
    const listed = ((family?.valves ?? []) as ValveOfFamily[]).map(({ side, position }) => ({ side, position }));
    const rows = await tx.selectDistinctOn([measurements.cylinder, measurements.side, measurements.position, measurements.kind, measurements.stage], { m: measurements, by: people.shortName }).from(measurements)
      .leftJoin(people, and(eq(people.shopId, measurements.shopId), eq(people.id, measurements.personId)))
      .where(and(eq(measurements.shopId, s), eq(measurements.headId, headId)))
      .orderBy(measurements.cylinder, measurements.side, measurements.position, measurements.kind, measurements.stage, desc(measurements.revision));
    const limits = await tx.select().from(measurementLimits).where(and(eq(measurementLimits.shopId, s), eq(measurementLimits.family, h.family)));
    const fills = h.pieceId === null ? [] : await tx.select({ port: epoxyFills.port, mixedAt: epoxyFills.mixedAt, readyAt: epoxyFills.readyAt }).from(epoxyFills)
      .where(and(eq(epoxyFills.shopId, s), eq(epoxyFills.pieceId, h.pieceId))).orderBy(asc(epoxyFills.mixedAt));
    return {
      head: {
        id: h.id, mark: h.mark, family: h.family, cylinders: h.cylinders, seatMaterial: h.seatMaterial,
        // What the head itself does not say, its family does.
        boreMm: h.boreMm ?? family?.boreMm ?? null, strokeMm: h.strokeMm ?? family?.strokeMm ?? null,
        camLiftIntakeUm: h.camLiftIntakeUm ?? family?.camLiftIntakeUm ?? null, camLiftExhaustUm: h.camLiftExhaustUm ?? family?.camLiftExhaustUm ?? null,
        version: h.version, workDone: h.workDone, notes: h.notes,
      },
      pieceId: h.pieceId, orderId: row.orderId, orderNumber: row.orderNumber,
      valves: listed.length > 0 ? listed : [{ side: "intake", position: "single" }, { side: "exhaust", position: "single" }], valvesGuessed: listed.length === 0,
      cells: rows.map(({ m, by }) => ({
        cylinder: m.cylinder, side: m.side as MeasureCell["side"], position: m.position, kind: m.kind, stage: m.stage as MeasureCell["stage"], revision: m.revision, valueText: m.valueText, unit: m.unit, base: m.valueSi,
        instrument: m.instrument, by, at: m.at.toISOString(),
      })),
      limits: limits.map(limitView),
      // The cure clock runs from mixing; temperatures are the bench's to judge.
      epoxy: fills.map((f) => ({ port: f.port, mixedAt: f.mixedAt.toISOString(), readyAt: f.readyAt.toISOString(), state: f.readyAt > ctx.now ? "curing" as const : "cured" as const })),
      canRecord: ableTo(ctx, "flow.record"), canSetUp: ableTo(ctx, "flow.set-up"), canFind: ableTo(ctx, "finding.record") && row.orderId !== null,
      viewerId: personIdOf(ctx) ?? ctx.actor.id,
    };
  });
}

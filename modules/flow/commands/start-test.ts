import "server-only";
import { randomUUID } from "node:crypto";
import { and, eq, isNull, sql } from "drizzle-orm";
import { benches, camshafts, fixtures, flowTests, heads, liftDevices, people } from "@/db/schema";
import { defineCommand } from "@/modules/access/command";
import { personIdOf, type TxContext } from "@/modules/access/context";
import { ok, refuse, type Refused, type Result } from "@/modules/kernel/result";
import type { z } from "@/modules/kernel/zod";
import { liftsQuestion } from "../domain/entry-questions";
import { liftLadder, parseLiftUm, type LiftUnit } from "../domain/lift-ladder";
import { refuseRoom, roomDensity } from "../domain/room-air";
import { SET_POINT_SHARE_MAX } from "../domain/test-pressure";
import { typedNumber } from "../domain/typed-number";
import { startSheetInput, startTestInput } from "../input";
import { latestCheck } from "./gear";

export type StartTest = z.output<typeof startTestInput>;

/** Columns of the conditions that may be typed and changed while a test is a draft. */
export function conditionColumns(input: Pick<StartTest, "fixtureId" | "liftDeviceId" | "camshaftId" | "nominal" | "camLift" | "entry" | "valvesOpen" | "valve" | "seatNote" | "plugClosed" | "testSprings" | "warmUpMinutes" | "roomTemperature" | "roomPressure" | "roomHumidity" | "leak" | "leakPressure" | "leakScalingAgreed" | "notes">, unit: LiftUnit) {
  const cam = input.camLift === "" ? null : parseLiftUm(input.camLift, unit);
  if (cam && !cam.ok) return refuse(cam.refusal.code, cam.refusal.message, { field: "camLift" });
  const room = { roomTemperatureText: input.roomTemperature, roomPressureText: input.roomPressure, roomHumidityText: input.roomHumidity };
  const unread = refuseRoom(room);
  if (unread) return unread;
  const number = (text: string): number | null => { const n = typedNumber(text); return text !== "" && n.ok ? n.value : null; };
  const leak = number(input.leak);
  const leakAt = number(input.leakPressure) ?? input.nominal;
  if (leak !== null && leak < 0) return refuse("READING_OUT_OF_RANGE", "A leak cannot be below zero.", { field: "leak" });
  if (leak !== null && leak > 0 && (leakAt <= 0 || (Math.abs(leakAt / input.nominal - 1) > SET_POINT_SHARE_MAX + 1e-9 && !input.leakScalingAgreed))) {
    return refuse("LEAK_PRESSURE_MISMATCH", `Read the leak at ${input.nominal} in H₂O, or agree to have it scaled.`, { field: "leakPressure" });
  }
  return ok({
    fixtureId: input.fixtureId, nominalPressureInH2O: input.nominal, camLiftUm: cam?.value ?? null, entry: input.entry, valvesOpen: input.valvesOpen || "all", valveMm: number(input.valve),
    seatNote: input.seatNote, plugClosed: input.plugClosed, testSprings: input.testSprings, warmUpMinutes: input.warmUpMinutes ?? null, ...room,
    liftDeviceId: input.liftDeviceId || null, camshaftId: input.camshaftId || null, leakText: input.leak, leakPressureText: input.leakPressure, leakScalingAgreed: input.leakScalingAgreed, notes: input.notes,
  });
}

/**
 * The gear a test names is the shop's own, and a bench that counts the air as it is has its air noted. Answers the cam lift of
 * the camshaft, micrometres, where one is chosen. Errors: NOT_FOUND, CAM_OF_OTHER_SIDE, DENSITY_REQUIRED.
 */
export async function gearHere(ctx: TxContext, input: Pick<StartTest, "fixtureId" | "liftDeviceId" | "camshaftId" | "roomTemperature" | "roomPressure" | "roomHumidity">, side: string, benchKind: string): Promise<Result<{ camLiftUm: number | null }>> {
  const { tx, shop } = ctx;
  const fixture = await tx.select({ id: fixtures.id }).from(fixtures).where(and(eq(fixtures.shopId, shop.id), eq(fixtures.id, input.fixtureId)));
  if (fixture.length === 0) return refuse("NOT_FOUND", "This fixture is not here.", { field: "fixtureId" });
  const device = input.liftDeviceId === "" ? [true] : await tx.select({ id: liftDevices.id }).from(liftDevices).where(and(eq(liftDevices.shopId, shop.id), eq(liftDevices.id, input.liftDeviceId)));
  if (device.length === 0) return refuse("NOT_FOUND", "This lift device is not here.", { field: "liftDeviceId" });
  if (benchKind === "absolute_meter") {
    const air = roomDensity({ roomTemperatureText: input.roomTemperature, roomPressureText: input.roomPressure, roomHumidityText: input.roomHumidity });
    if (!air.ok) return air;
  }
  if (input.camshaftId === "") return ok({ camLiftUm: null });
  const [cam] = await tx.select({ side: camshafts.side, maxLiftUm: camshafts.maxLiftUm }).from(camshafts).where(and(eq(camshafts.shopId, shop.id), eq(camshafts.id, input.camshaftId)));
  if (!cam) return refuse("NOT_FOUND", "This camshaft is not here.", { field: "camshaftId" });
  return cam.side === side ? ok({ camLiftUm: cam.maxLiftUm }) : refuse("CAM_OF_OTHER_SIDE", `This camshaft is one for the ${cam.side}.`, { field: "camshaftId" });
}

/** Lifts as typed, in micrometres; a doubtful list needs a reason. */
export function plannedLifts(texts: readonly string[], unit: LiftUnit, reason: string): Result<{ liftUm: number; text: string }[]> {
  const lifts: { liftUm: number; text: string }[] = [];
  for (const [i, text] of texts.entries()) {
    const um = parseLiftUm(text, unit);
    if (!um.ok) return refuse(um.refusal.code, um.refusal.message, { field: `lifts.${i}` });
    lifts.push({ liftUm: um.value, text });
  }
  const question = liftsQuestion(lifts.map((l) => l.liftUm));
  if (question && reason.trim() === "") return refuse(question.code, question.words, { field: "lifts" });
  return ok([...new Map(lifts.map((l) => [l.liftUm, l])).values()].sort((a, b) => a.liftUm - b.liftUm));
}

/** Opens one test as a draft, with the bench factor of the day. Inner: joins the caller's transaction. */
export async function openTest(ctx: TxContext, input: StartTest, more: { correctsTestId?: string; importedFrom?: string } = {}): Promise<Result<{ testId: string; runNo: number; version: number }>> {
  const { tx, shop } = ctx;
  const [head] = await tx.select().from(heads).where(and(eq(heads.shopId, shop.id), eq(heads.id, input.headId))).for("update");
  if (!head) return refuse("NOT_FOUND", "This head is not here.", { field: "headId" });
  if (input.cylinder > head.cylinders) return refuse("NO_SUCH_PORT", `This head has ${head.cylinders} cylinder${head.cylinders === 1 ? "" : "s"}.`, { field: "cylinder" });
  const [bench] = await tx.select().from(benches).where(and(eq(benches.shopId, shop.id), eq(benches.id, input.benchId)));
  if (!bench) return refuse("NOT_FOUND", "This bench is not here.", { field: "benchId" });
  const gear = await gearHere(ctx, input, input.side, bench.kind);
  if (!gear.ok) return gear;
  const operatorId = input.operatorId ?? personIdOf(ctx);
  if (!operatorId) return refuse("OPERATOR_REQUIRED", "Say who stands at the bench.", { field: "operatorId" });
  const known = await tx.select({ id: people.id }).from(people).where(and(eq(people.shopId, shop.id), eq(people.id, operatorId), isNull(people.leftAt)));
  if (known.length === 0) return refuse("NOT_FOUND", "Nobody of that id works here.", { field: "operatorId" });
  const lifts = plannedLifts(input.lifts, input.liftUnit, input.liftsReason);
  if (!lifts.ok) return lifts;
  const columns = conditionColumns(input, input.liftUnit);
  if (!columns.ok) return columns;
  const sameSide = and(eq(flowTests.shopId, shop.id), eq(flowTests.headId, head.id), eq(flowTests.cylinder, input.cylinder), eq(flowTests.side, input.side));
  const open = await tx.select({ id: flowTests.id }).from(flowTests).where(and(sameSide, eq(flowTests.state, "draft")));
  if (open.length > 0) return refuse("TEST_OPEN", `A test of this ${input.side} port is still open. Finish or void it first.`, { field: "side" });
  const [{ n } = { n: 0 }] = await tx.select({ n: sql<number>`count(*)::int` }).from(flowTests).where(and(sameSide, eq(flowTests.purpose, input.purpose)));
  const check = await latestCheck(ctx, bench.id);
  const testId = randomUUID();
  const camLiftUm = columns.value.camLiftUm ?? gear.value.camLiftUm ?? (input.side === "intake" ? head.camLiftIntakeUm : head.camLiftExhaustUm);
  await tx.insert(flowTests).values({
    ...columns.value, camLiftUm, shopId: shop.id, id: testId, headId: head.id, cylinder: input.cylinder, side: input.side, purpose: input.purpose, runNo: n + 1, benchId: bench.id,
    benchFactor: check?.factor ?? 1, benchCheckedAt: check?.at ?? null, lifts: lifts.value, liftUnit: input.liftUnit, operatorId, startedAt: ctx.now,
    notes: [columns.value.notes, input.liftsReason && `Lifts: ${input.liftsReason}`].filter(Boolean).join("\n"),
    correctsTestId: more.correctsTestId ?? null, importedFrom: more.importedFrom ?? null,
  });
  return ok({ testId, runNo: n + 1, version: 1 });
}

/** A refusal of one side's own field, at its place in the form of both sides. */
export const ofSide = (side: "intake" | "exhaust", refused: Refused): Refused =>
  (refused.refusal.field === "camLift" || refused.refusal.field === "camshaftId" ? refuse(refused.refusal.code, refused.refusal.message, { field: `${side}.${refused.refusal.field}` }) : refused);

export const startTest = defineCommand({
  name: "flow.start-test",
  act: "flow.record",
  input: startTestInput,
  run: (ctx, input) => openTest(ctx, input),
  subject: (_, value) => ({ kind: "flow-test", id: value.testId }),
});

/** Both sides of one port pair at once, on a ladder made of a step and the cam lift. */
export const startSheet = defineCommand({
  name: "flow.start-sheet",
  act: "flow.record",
  input: startSheetInput,
  async run(ctx, { step, camLiftForLadder, intake, exhaust, ...session }) {
    const ladder = liftLadder({ step, camLift: camLiftForLadder, unit: session.liftUnit });
    if (!ladder.ok) return refuse(ladder.refusal.code, ladder.refusal.message, { field: ladder.refusal.field === "camLift" ? "camLiftForLadder" : "step" });
    const lifts = ladder.value.rungs.map((r) => r.text);
    const testIds: string[] = [];
    for (const [side, fields] of [["intake", intake], ["exhaust", exhaust]] as const) {
      if (!fields) continue;
      const opened = await openTest(ctx, { ...session, ...fields, side, lifts, liftsReason: "" });
      if (!opened.ok) return ofSide(side, opened);
      testIds.push(opened.value.testId);
    }
    return ok({ headId: session.headId, cylinder: session.cylinder, testIds });
  },
  subject: (input) => ({ kind: "head", id: input.headId }),
});

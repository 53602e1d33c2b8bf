import { parseDecimal } from "@/modules/kernel/money";
import { ok, type Result } from "@/modules/kernel/result";
import { refuseFlow } from "./flow-refusal";

export type LiftUnit = "in" | "mm";

/** One sheet holds so many lifts. Our choice. */
export const LIFTS_MAX = 24;
/** Valve lift above this is a slip of the keys, micrometres (50 mm). Our choice. */
export const LIFT_UM_MAX = 50_000;

/** Micrometres in one unit: 1 in = 25.4 mm by definition. */
const UM_PER_UNIT: Readonly<Record<LiftUnit, bigint>> = { in: 25_400n, mm: 1_000n };

interface Exact {
  readonly units: bigint;
  readonly scale: number;
  readonly unit: LiftUnit;
}

/** Exact decimal of a lift as typed; a unit written behind the number wins over the field's unit. */
function exactLift(text: string, fieldUnit: LiftUnit): Exact | null {
  const m = /^([0-9]*[.,]?[0-9]+|[0-9]+[.,])\s*(in|mm|"|″)?$/i.exec(text.trim());
  if (!m) return null;
  const number = (m[1] ?? "").replace(",", ".").replace(/\.$/, "").replace(/^\./, "0.");
  const parsed = parseDecimal(number);
  const suffix = m[2]?.toLowerCase();
  const unit = suffix === undefined ? fieldUnit : suffix === "mm" ? "mm" : "in";
  return parsed ? { ...parsed, unit } : null;
}

/** Whole micrometres of an exact lift, half up. */
function umOf(lift: Exact): number {
  const numerator = lift.units * UM_PER_UNIT[lift.unit];
  const denominator = 10n ** BigInt(lift.scale);
  return Number((numerator * 2n + denominator) / (denominator * 2n));
}

/**
 * A lift as typed (`0.050`, `.050`, `1,25`, `0.34 in`, `8.6 mm`, `0.34"`) in whole micrometres; 0 to 50 mm.
 * Errors: LIFT_NOT_READABLE.
 */
export function parseLiftUm(text: string, unit: LiftUnit): Result<number> {
  const exact = exactLift(text, unit);
  if (!exact) return refuseFlow("LIFT_NOT_READABLE", "lift");
  const um = umOf(exact);
  return um <= LIFT_UM_MAX ? ok(um) : refuseFlow("LIFT_NOT_READABLE", "lift", { maxUm: LIFT_UM_MAX });
}

/** A lift for people, without a place's decimal sign: 1270 -> `0.050` in, `1.27` mm. */
export const liftText = (liftUm: number, unit: LiftUnit): string =>
  unit === "in" ? (liftUm / 25_400).toFixed(3) : (liftUm / 1000).toFixed(2);

/**
 * A lift typed in one unit, as it would be typed in the other: `.050` in -> `1.27` mm, `1` mm -> `0.0394` in. A text that names its own
 * unit, or is no lift, stays as it was typed.
 */
export function liftInOtherUnit(text: string, from: LiftUnit, to: LiftUnit): string {
  const lift = exactLift(text, from);
  if (from === to || !lift || /[a-z"″]/i.test(text)) return text;
  const um = umOf(lift);
  if (to === "mm") return String(um / 1000);
  const inches = (um / 25_400).toFixed(4);
  return inches.endsWith("0") ? inches.slice(0, -1) : inches;
}

export interface LadderRung {
  readonly liftUm: number;
  /** In the unit and with the decimals of the step. */
  readonly text: string;
}
export interface LiftLadder {
  readonly unit: LiftUnit;
  readonly camLiftUm: number;
  readonly rungs: readonly LadderRung[];
}

/**
 * Lifts to test: the step and its multiples, until `pastCam` of them lie above cam lift.
 * Multiples are made of the typed decimals and only then turned to micrometres, so no rounding adds up.
 * @param pastCam at least 1: a point past cam lift shows whether the head would use a bigger cam (common practice, no source).
 * Errors: LIFT_NOT_READABLE (field step or camLift), TOO_MANY_LIFTS (over 24).
 */
export function liftLadder(input: { step: string; camLift: string; unit: LiftUnit; pastCam?: number }): Result<LiftLadder> {
  const { unit, pastCam = 1 } = input;
  const step = exactLift(input.step, unit);
  if (!step || umOf(step) <= 0) return refuseFlow("LIFT_NOT_READABLE", "step");
  const cam = exactLift(input.camLift, unit);
  const camLiftUm = cam ? umOf(cam) : 0;
  if (!cam || camLiftUm <= 0 || camLiftUm > LIFT_UM_MAX) return refuseFlow("LIFT_NOT_READABLE", "camLift");
  const rungs: LadderRung[] = [];
  let past = 0;
  for (let k = 1n; past < Math.max(1, Math.floor(pastCam)); k += 1n) {
    if (rungs.length >= LIFTS_MAX) return refuseFlow("TOO_MANY_LIFTS", "step", { max: LIFTS_MAX });
    const units = step.units * k;
    const liftUm = umOf({ ...step, units });
    // Compared exactly: micrometres may round a rung and the cam onto each other.
    const isPast = units * UM_PER_UNIT[step.unit] * 10n ** BigInt(cam.scale) > cam.units * UM_PER_UNIT[cam.unit] * 10n ** BigInt(step.scale);
    if (isPast) past += 1;
    rungs.push({ liftUm, text: decimalText(units, step.scale) });
  }
  return ok({ unit: step.unit, camLiftUm, rungs });
}

function decimalText(units: bigint, scale: number): string {
  const digits = units.toString().padStart(scale + 1, "0");
  return scale === 0 ? digits : `${digits.slice(0, -scale)}.${digits.slice(-scale)}`;
}

import { ok, refuse, type Result } from "@/modules/kernel/result";
import { correctToReferenceDensity } from "./density-reference";
import type { FlowFlag } from "./flow-flags";
import { refuseFlow } from "./flow-refusal";
import { subtractLeak } from "./leak";
import type { BenchRange, BenchScale, HeldUnit, ValueUnit, WaterUnit } from "./raw-test";
import { flowFromDirect, flowFromOrificeHead, flowFromRangePercent, type FlaggedFlow } from "./reading-to-flow";
import { typedKelvin } from "./room-air";
import { sanityFlagsOfReading } from "./sanity-flags";
import type { SanityLimits } from "./sanity-limits";
import { correctToPressure } from "./test-pressure";
import { typedNumber } from "./typed-number";
import { convertUnit } from "./units";

/** What a raw reading is turned into flow by. */
export interface ReadingRules {
  readonly scale: BenchScale;
  readonly ranges: readonly BenchRange[];
  readonly waterUnit: WaterUnit;
  readonly benchFactor: number;
  readonly nominalInH2O: number;
  /** Density of the room's air, kg/m3, on a bench that counts the air as it is; null on one whose weather cancels. */
  readonly densityKgM3: number | null;
  /** Leak of the closed head as the bench showed it, cfm, and the pressure it was read at; null = not measured. */
  readonly leak: { readonly indicatedCfm: number; readonly atInH2O: number; /** It may be scaled to a reading held at another pressure. */ readonly scalingAgreed?: boolean } | null;
  /** Left out: the product's. */
  readonly limits?: SanityLimits | undefined;
}
export interface TypedReading {
  readonly valueText: string;
  readonly valueUnit: ValueUnit;
  readonly rangeLabel: string | null;
  readonly pressureText: string;
  readonly pressureUnit: HeldUnit;
  readonly portTemperatureText?: string;
  readonly orificeTemperatureText?: string;
}

/** Unit of a bare number on each scale. */
export const SCALE_UNIT: Readonly<Record<BenchScale, ValueUnit>> = { direct: "cfm", percent_linear: "percent", orifice_head: "head" };

/** Held pressure in inches of water of the bench's own definition. Errors: NUMBER_NOT_FINITE, PRESSURE_NOT_POSITIVE. */
export function heldInH2O(text: string, unit: HeldUnit, waterUnit: WaterUnit): Result<number> {
  const typed = typedNumber(text, "pressure");
  if (!typed.ok) return typed;
  if (typed.value <= 0) return refuseFlow("PRESSURE_NOT_POSITIVE", "pressure");
  return unit === "inH2O" ? typed : convertUnit(typed.value, unit, `inH2O_${waterUnit}`);
}

function onScale(rules: ReadingRules, typed: TypedReading): Result<FlaggedFlow & { percent?: number }> {
  const value = typedNumber(typed.valueText);
  if (!value.ok) return value;
  const { benchFactor, limits } = rules;
  if (typed.valueUnit === "percent" || typed.valueUnit === "head") {
    const range = rules.ranges.find((r) => r.label === typed.rangeLabel) ?? (rules.ranges.length === 1 ? rules.ranges[0] : undefined);
    if (!range) return refuse("READING_OUT_OF_RANGE", "Choose the range it was read on.", { field: "range" });
    if (typed.valueUnit === "percent") return flowFromRangePercent({ rangeCfm: range.fullScaleCfm, percent: value.value, benchFactor, limits });
    if (range.fullScaleHead === undefined) return refuse("READING_OUT_OF_RANGE", "This range has no head at full scale. Choose another, or complete the bench's ranges.", { field: "range" });
    return flowFromOrificeHead({ rangeCfm: range.fullScaleCfm, head: value.value, fullScaleHead: range.fullScaleHead, benchFactor, limits });
  }
  const cfm = typed.valueUnit === "cfm" ? value : convertUnit(value.value, typed.valueUnit, "ft3/min");
  return cfm.ok ? flowFromDirect({ valueCfm: cfm.value, benchFactor }) : cfm;
}

/**
 * What the air makes of one cfm the bench shows: to reference air on a bench that counts the air as it is; for the warmth
 * between port and orifice on the others, where both were measured. Errors: those of the parts, TEMPERATURE_PAIR.
 */
function airFactor(rules: ReadingRules, typed: TypedReading): Result<FlaggedFlow> {
  if (rules.densityKgM3 !== null) return correctToReferenceDensity({ method: "absolute_meter", flowCfm: 1, densityKgM3: rules.densityKgM3 });
  const [port = "", orifice = ""] = [typed.portTemperatureText?.trim(), typed.orificeTemperatureText?.trim()];
  if (port === "" && orifice === "") return ok({ flowCfm: 1, flags: [] });
  if (port === "" || orifice === "") return refuse("TEMPERATURE_PAIR", "Give the air at the port and at the orifice, or neither.", { field: port === "" ? "portTemperature" : "orificeTemperature" });
  const portAir = typedKelvin(port, "portTemperature");
  if (!portAir.ok) return portAir;
  const orificeAir = typedKelvin(orifice, "orificeTemperature");
  if (!orificeAir.ok) return orificeAir;
  return correctToReferenceDensity({ method: "series_orifice", flowCfm: 1, portAirK: portAir.value, orificeAirK: orificeAir.value });
}

/**
 * Raw reading to the flow it stands for, cfm at the nominal pressure: scale and bench factor, then for the air, then less the
 * leak at the held pressure, then to the nominal pressure. A leak read at another pressure (more than 2 % off) is scaled
 * and flagged where that was agreed, and refused where not.
 * Source: each step names its own. Errors: those of the steps; the raw text stays whatever comes out.
 */
export function computedReading(rules: ReadingRules, typed: TypedReading): Result<FlaggedFlow> {
  const held = heldInH2O(typed.pressureText, typed.pressureUnit, rules.waterUnit);
  if (!held.ok) return held;
  const raw = onScale(rules, typed);
  if (!raw.ok) return raw;
  const air = airFactor(rules, typed);
  if (!air.ok) return air;
  const flags: FlowFlag[] = [...raw.value.flags, ...air.value.flags];
  let flowCfm = raw.value.flowCfm * air.value.flowCfm;
  if (rules.leak && rules.leak.indicatedCfm > 0) {
    const net = subtractLeak({
      measuredCfm: flowCfm, leakCfm: rules.leak.indicatedCfm * rules.benchFactor * (rules.densityKgM3 === null ? 1 : air.value.flowCfm), measuredAtInH2O: held.value, leakAtInH2O: rules.leak.atInH2O, allowScaling: rules.leak.scalingAgreed === true, limits: rules.limits,
    });
    if (!net.ok) return net;
    flags.push(...net.value.flags);
    flowCfm = net.value.flowCfm;
  }
  const stated = correctToPressure({ flowCfm, fromInH2O: held.value, toInH2O: rules.nominalInH2O });
  if (!stated.ok) return stated;
  const doubts = sanityFlagsOfReading({ heldInH2O: held.value, nominalInH2O: rules.nominalInH2O }, rules.limits);
  if (!doubts.ok) return doubts;
  return ok({ flowCfm: stated.value.flowCfm, flags: [...new Set([...flags, ...stated.value.flags, ...doubts.value])] });
}

import { ok, type Result } from "@/modules/kernel/result";
import { refuseFlow, refuseNotFinite } from "./flow-refusal";
import { knotOfTable, type FlowTable } from "./interpolate-flow";

/**
 * Standard uncertainty of flow from holding the pressure: `(Q/2) u(dp)/dp`, cfm.
 * Source: JCGM 100:2008 (GUM) 5.1.2 with Q going as sqrt(dp). Errors: PRESSURE_NOT_POSITIVE, READING_OUT_OF_RANGE.
 */
export function pressureSettingUncertainty(input: { flowCfm: number; dpInH2O: number; uDpInH2O: number }): Result<number> {
  const bad = refuseNotFinite(input);
  if (bad) return bad;
  if (input.dpInH2O <= 0) return refuseFlow("PRESSURE_NOT_POSITIVE", "dpInH2O");
  if (input.uDpInH2O < 0) return refuseFlow("READING_OUT_OF_RANGE", "uDpInH2O", { min: 0 });
  return ok((Math.abs(input.flowCfm) / 2) * (input.uDpInH2O / input.dpInH2O));
}

/**
 * Standard uncertainty of flow from setting the lift: slope of the monotone curve times `u(L)`, cfm.
 * @param uLift same unit as the lifts, >= 0. Source: GUM 5.1.2. Errors: as `interpolateFlow`, READING_OUT_OF_RANGE.
 */
export function liftSettingUncertainty(input: { table: FlowTable; at: number; uLift: number; addZero?: boolean }): Result<number> {
  const { table, at, uLift, addZero = true } = input;
  const bad = refuseNotFinite({ uLift });
  if (bad) return bad;
  if (uLift < 0) return refuseFlow("READING_OUT_OF_RANGE", "uLift", { min: 0 });
  const knot = knotOfTable(table, at, addZero);
  return knot.ok ? ok(Math.abs(knot.value.slope) * uLift) : knot;
}

/** Standard uncertainty of a display's resolution: `step/sqrt(12)`. Source: GUM 4.3.7, F.2.2.1. @param step >= 0. */
export const resolutionUncertainty = (step: number): number => step / Math.sqrt(12);

/** Independent standard uncertainties together, root of the sum of squares. Source: GUM 5.1.2. */
export const combinedUncertainty = (parts: readonly number[]): number => Math.hypot(...parts);

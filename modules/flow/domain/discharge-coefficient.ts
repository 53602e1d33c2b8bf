import { ok, type Result } from "@/modules/kernel/result";
import type { FlowFlag } from "./flow-flags";
import { refuseFlow, refuseNotFinite } from "./flow-refusal";
import { GAMMA_AIR, idealMassFlow } from "./ideal-mass-flow";
import { SANITY_LIMITS, type SanityLimits } from "./sanity-limits";
import { M3S_PER_CFM, PA_PER_INH2O } from "./units";

/** The area a coefficient refers to is always named with it. On `head` it is called a flow coefficient. */
export type ReferenceArea = "curtain" | "seat" | "head" | "throat";

/** Flags of a coefficient; the usual band is known for the curtain area only. */
export const coefficientFlags = (cd: number, referenceArea: ReferenceArea, limits: SanityLimits = SANITY_LIMITS): FlowFlag[] =>
  cd > 1 ? ["CD_ABOVE_ONE"] : referenceArea === "curtain" && (cd < limits.cdLow || cd > limits.cdHigh) ? ["CD_UNUSUAL"] : [];

export type DischargeInput = {
  readonly flowCfm: number;
  readonly dpInH2O: number;
  /** Density of the air before the restriction, at which the flow is stated, kg/m3. */
  readonly densityKgM3: number;
  readonly referenceAreaMm2: number;
  readonly referenceArea?: ReferenceArea;
  readonly limits?: SanityLimits | undefined;
} & (
  | { readonly model: "incompressible" }
  /** p0Pa: upstream stagnation pressure; for the exhaust direction room + test pressure. */
  | { readonly model: "compressible"; readonly p0Pa: number; readonly t0K: number; readonly gamma?: number }
);

/**
 * Discharge coefficient. Incompressible `Q/(A sqrt(2 dp/rho))`; compressible `Q rho/m_ideal`, with R taken from the
 * moist air itself, p0/(rho T0). The two differ by some 4 % at 28 inH2O, so the model is always named.
 * Source: Heywood (1988) section 6.3.2, eqs. (6.10), (6.11). Errors: GEOMETRY_INVALID, PRESSURE_NOT_POSITIVE, DENSITY_REQUIRED.
 */
export function dischargeCoefficient(input: DischargeInput): Result<{
  cd: number;
  model: DischargeInput["model"];
  referenceArea: ReferenceArea;
  flags: readonly FlowFlag[];
}> {
  const { flowCfm, dpInH2O, densityKgM3, referenceAreaMm2, referenceArea = "curtain", limits } = input;
  const bad = refuseNotFinite({ flowCfm, dpInH2O, densityKgM3, referenceAreaMm2 });
  if (bad) return bad;
  if (referenceAreaMm2 <= 0) return refuseFlow("GEOMETRY_INVALID", "referenceAreaMm2");
  if (dpInH2O <= 0) return refuseFlow("PRESSURE_NOT_POSITIVE", "dpInH2O");
  if (densityKgM3 <= 0) return refuseFlow("DENSITY_REQUIRED", "densityKgM3");
  if (flowCfm < 0) return refuseFlow("READING_OUT_OF_RANGE", "flowCfm", { min: 0 });
  const dpPa = dpInH2O * PA_PER_INH2O;
  const massFlowKgS = flowCfm * M3S_PER_CFM * densityKgM3;
  if (input.model === "incompressible") {
    const cd = massFlowKgS / (referenceAreaMm2 * 1e-6 * Math.sqrt(2 * dpPa * densityKgM3));
    return ok({ cd, model: input.model, referenceArea, flags: coefficientFlags(cd, referenceArea, limits) });
  }
  const { p0Pa, t0K, gamma = GAMMA_AIR } = input;
  const ideal = idealMassFlow({ areaMm2: referenceAreaMm2, p0Pa, t0K, dpPa, gamma, gasConstant: p0Pa / (densityKgM3 * t0K) });
  if (!ideal.ok) return ideal;
  const cd = massFlowKgS / ideal.value.massFlowKgS;
  return ok({ cd, model: input.model, referenceArea, flags: [...coefficientFlags(cd, referenceArea, limits), ...ideal.value.flags] });
}

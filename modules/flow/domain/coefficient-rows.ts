import { moistAirDensity } from "./air-density";
import type { PortSide } from "./comparison-reasons";
import { curtainArea } from "./curtain-area";
import { dischargeCoefficient } from "./discharge-coefficient";
import type { FlowFlag } from "./flow-flags";
import type { SanityLimits } from "./sanity-limits";
import { kelvinOfCelsius, M_PER_FT, PA_PER_INH2O } from "./units";
import type { LiftReading } from "./repeats";
import { bernoulliSpeedMS, meanVelocity } from "./velocity";

/** Air the figures are stated for where the room is not recorded as numbers: dry, 20 °C, 101.325 kPa. */
export const STATED_AIR = { temperatureC: 20, pressurePa: 101_325, relativeHumidity: 0 } as const;

export interface CoefficientRow {
  readonly liftUm: number;
  readonly flowCfm: number;
  /** Valve curtain, all open valves, mm2. */
  readonly curtainMm2: number;
  readonly liftOverDiameter: number;
  /** Compressible, on curtain area. */
  readonly cd: number;
  /** Mean speed through the curtain, m/s and ft/s. */
  readonly speedMS: number;
  readonly speedFtS: number;
  readonly flags: readonly FlowFlag[];
}
export interface CoefficientTable {
  readonly rows: readonly CoefficientRow[];
  /** Highest mean speed the test pressure can make. */
  readonly idealMS: number;
  readonly idealFtS: number;
}

/**
 * Discharge coefficient on curtain area and mean curtain speed at each lift above zero; null when a size is missing or wrong.
 * Intake draws room air; exhaust air stands at room plus test pressure. Source: as `dischargeCoefficient`, `curtainArea`, `meanVelocity`.
 * @param valveDiametersMm the open valves of the side. @param atInH2O pressure the flows are stated at.
 */
export function coefficientTable(input: { readings: readonly LiftReading[]; side: PortSide; valveDiametersMm: readonly number[]; atInH2O: number; limits?: SanityLimits | undefined }): CoefficientTable | null {
  const { readings, side, valveDiametersMm, atInH2O, limits } = input;
  const density = moistAirDensity(STATED_AIR);
  if (!density.ok || !(atInH2O > 0)) return null;
  const { densityKgM3 } = density.value;
  const dpPa = atInH2O * PA_PER_INH2O;
  const p0Pa = side === "exhaust" ? STATED_AIR.pressurePa + dpPa : STATED_AIR.pressurePa;
  const rows: CoefficientRow[] = [];
  for (const r of readings) {
    if (r.liftUm <= 0 || r.flowCfm <= 0) continue;
    const area = curtainArea({ valveDiametersMm, liftMm: r.liftUm / 1000 });
    if (!area.ok) return null;
    const cd = dischargeCoefficient({
      flowCfm: r.flowCfm, dpInH2O: atInH2O, densityKgM3, referenceAreaMm2: area.value.curtainAreaMm2, referenceArea: "curtain", model: "compressible", p0Pa, t0K: kelvinOfCelsius(STATED_AIR.temperatureC), limits,
    });
    const speed = meanVelocity({ flowCfm: r.flowCfm, areaMm2: area.value.curtainAreaMm2 });
    if (!cd.ok || !speed.ok) return null;
    rows.push({ ...r, curtainMm2: area.value.curtainAreaMm2, liftOverDiameter: area.value.liftOverDiameter, cd: cd.value.cd, speedMS: speed.value.velocityMS, speedFtS: speed.value.velocityFtS, flags: cd.value.flags });
  }
  const idealMS = bernoulliSpeedMS(dpPa, densityKgM3);
  return { rows, idealMS, idealFtS: idealMS / M_PER_FT };
}

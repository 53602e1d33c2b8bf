import { ok, type Result } from "@/modules/kernel/result";
import { refuseFlow, refuseNotFinite } from "./flow-refusal";

/**
 * Factors to SI. Source: NIST SP 811 (2008) Appendix B.8; exact products by definition where they exist
 * (1 in = 25.4 mm, 1 ft = 0.3048 m, 1 lbf = 0.45359237 kg x 9.80665 m/s2).
 */
export const M3S_PER_CFM = 0.3048 ** 3 / 60;
/** Pascals in an inch of water, conventional: 9.80665 x 25.4. */
export const PA_PER_INH2O = 9.80665 * 25.4;
export const MM_PER_IN = 25.4;
export const M_PER_FT = 0.3048;
const N_PER_LBF = 0.45359237 * 9.80665;

const UNITS = {
  inH2O_conventional: { kind: "pressure", toSi: PA_PER_INH2O },
  "inH2O_39.2F": { kind: "pressure", toSi: 249.082 },
  inH2O_60F: { kind: "pressure", toSi: 248.84 },
  inHg_conventional: { kind: "pressure", toSi: 3386.389 },
  mmHg_conventional: { kind: "pressure", toSi: 133.3224 },
  Pa: { kind: "pressure", toSi: 1 },
  hPa: { kind: "pressure", toSi: 100 },
  kPa: { kind: "pressure", toSi: 1000 },
  psi: { kind: "pressure", toSi: N_PER_LBF / 0.0254 ** 2 },
  "ft3/min": { kind: "volume flow", toSi: M3S_PER_CFM },
  "L/s": { kind: "volume flow", toSi: 1e-3 },
  "m3/h": { kind: "volume flow", toSi: 1 / 3600 },
  "m3/s": { kind: "volume flow", toSi: 1 },
  "kg/h": { kind: "mass flow", toSi: 1 / 3600 },
  mm: { kind: "length", toSi: 1e-3 },
  in: { kind: "length", toSi: 0.0254 },
  mm2: { kind: "area", toSi: 1e-6 },
  in2: { kind: "area", toSi: 0.0254 ** 2 },
  "lbf/in": { kind: "stiffness", toSi: N_PER_LBF / 0.0254 },
  "N/mm": { kind: "stiffness", toSi: 1000 },
  lbf: { kind: "force", toSi: N_PER_LBF },
  N: { kind: "force", toSi: 1 },
  cc: { kind: "volume", toSi: 1e-6 },
  in3: { kind: "volume", toSi: 0.0254 ** 3 },
} as const;

export type UnitName = keyof typeof UNITS;
export const UNIT_NAMES = Object.keys(UNITS) as UnitName[];
export const unitKind = (unit: UnitName): string => UNITS[unit].kind;

/**
 * A value in another unit of the same kind. Volume flow and mass flow convert into each other at a density.
 * @param densityKgM3 density of the air that flows, kg/m3, > 0; needed only between volume and mass flow.
 * Errors: UNIT_KIND_MISMATCH, DENSITY_REQUIRED, NUMBER_NOT_FINITE.
 */
export function convertUnit(value: number, from: UnitName, to: UnitName, densityKgM3?: number): Result<number> {
  const bad = refuseNotFinite({ value, densityKgM3 });
  if (bad) return bad;
  const a = UNITS[from];
  const b = UNITS[to];
  if (a.kind === b.kind) return ok((value * a.toSi) / b.toSi);
  const flows: readonly string[] = ["volume flow", "mass flow"];
  if (!flows.includes(a.kind) || !flows.includes(b.kind)) return refuseFlow("UNIT_KIND_MISMATCH", "to", { from, to });
  if (densityKgM3 === undefined || densityKgM3 <= 0) return refuseFlow("DENSITY_REQUIRED", "densityKgM3");
  const perDensity = a.kind === "volume flow" ? densityKgM3 : 1 / densityKgM3;
  return ok((value * a.toSi * perDensity) / b.toSi);
}

/** Degrees Fahrenheit to Celsius. Source: NIST SP 811 B.8. */
export const celsiusOfFahrenheit = (temperatureF: number): number => (temperatureF - 32) / 1.8;
/** Celsius to kelvin. */
export const kelvinOfCelsius = (temperatureC: number): number => temperatureC + 273.15;

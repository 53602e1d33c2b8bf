import { M3S_PER_CFM, PA_PER_INH2O } from "./units";

/** What the upright axis of a curve shows. */
export interface CurveMeasure {
  readonly axis: string;
  /** Behind a figure; empty for a pure number. */
  readonly unit: string;
  readonly digits: number;
  /** Begins the curve's words: `Flow in CFM`. */
  readonly what: string;
  /** A shut valve shows nothing, so (0, 0) shapes the curve's beginning. */
  readonly fromZero: boolean;
}
/** `read`: CFM, inches of water and the test's own unit of lift. `us`: the same with inches. `si`: L/s, kPa, mm. */
export type Units = "read" | "us" | "si";

/** Source: NIST SP 811, from the definition of the foot. */
export const LITRES_S_PER_CFM = M3S_PER_CFM * 1000;
export const KPA_PER_INH2O = PA_PER_INH2O / 1000;

/** `28 in H₂O`, `6.97 kPa`. */
export const pressureText = (inH2O: number, units: Units, decimalText: (value: number, digits: number) => string): string => (units === "si" ? `${decimalText(inH2O * KPA_PER_INH2O, 2)} kPa` : `${inH2O} in H₂O`);

/** An axis title as it is engraved: capitals, but not for symbols that mean something by their case. */
export const engravedAxis = (axis: string): string => (/kPa|L\/s|\bm\/s|Cd/.test(axis) ? axis : axis.toUpperCase());

export function flowMeasure(units: Units, at: string): CurveMeasure {
  const unit = units === "si" ? "L/s" : "CFM";
  return { axis: `${unit} at ${at}`, unit, digits: 1, what: `Flow in ${unit}`, fromZero: true };
}
export const CD_MEASURE: CurveMeasure = { axis: "Cd on curtain area", unit: "", digits: 3, what: "Discharge coefficient on curtain area", fromZero: false };
export function speedMeasure(units: Units): CurveMeasure {
  const unit = units === "si" ? "m/s" : "ft/s";
  return { axis: `${unit} in the curtain`, unit, digits: 0, what: `Mean speed through the curtain in ${unit}`, fromZero: false };
}

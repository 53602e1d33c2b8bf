import { refuse, type Refused } from "@/modules/kernel/result";

/** Every way a flow or head calculation refuses. A refused calculation gives no number. */
export const FLOW_REFUSALS = {
  UNIT_KIND_MISMATCH: "These two units measure different things. Choose units of the same kind.",
  DENSITY_REQUIRED: "A mass flow needs the air density. Enter the density in kg/m3.",
  READING_OUT_OF_RANGE: "The reading is outside the scale. Enter a value the scale can show.",
  PRESSURE_NOT_POSITIVE: "The pressure must be greater than zero.",
  PRESSURE_MISMATCH: "The two flows were read at different pressures. Bring both to one pressure first.",
  LEAK_EXCEEDS_FLOW: "The leak is as large as the reading. Seal the fixture and read again.",
  LEAK_PRESSURE_MISMATCH: "The leak was read at another pressure. Read it at the test pressure, or agree to have it scaled.",
  HUMIDITY_NOT_FRACTION: "Relative humidity must be between 0 and 1 (50 % is 0.5).",
  PRESSURE_RATIO_BELOW_0_75: "The pressure behind the orifice is below 0.75 of that before it. The formula does not hold there.",
  OUTSIDE_ISO_5167_LIMITS: "Orifice, pipe or Reynolds number is outside the limits of ISO 5167-2.",
  GEOMETRY_INVALID: "The dimensions cannot belong together. Check each one.",
  OUTSIDE_TESTED_LIFT: "That lift was not tested. Choose a lift between the first and the last reading.",
  LIFTS_NOT_INCREASING: "Each lift must be higher than the one before it, and none may be entered twice.",
  TOO_FEW_POINTS: "Not enough readings. Enter at least as many as the calculation needs.",
  NUMBER_NOT_FINITE: "This is not a number. Enter digits, with a point or a comma for decimals.",
  TIME_NOT_IN_ORDER: "The times are not in order. Check the date and the hour.",
  LIFT_NOT_READABLE: "This is not a lift. Enter a number such as 0.050 or .050 in inches, or 1.25 in millimetres.",
  TOO_MANY_LIFTS: "That step gives more lifts than one sheet holds. Choose a larger step.",
} as const;

export type FlowRefusalCode = keyof typeof FLOW_REFUSALS;

/** A refusal with its closed code, the words for it, and the input it belongs to. */
export const refuseFlow = (
  code: FlowRefusalCode,
  field?: string,
  data?: Readonly<Record<string, string | number | boolean | null>>,
): Refused => refuse(code, FLOW_REFUSALS[code], { ...(field === undefined ? {} : { field }), ...(data === undefined ? {} : { data }) });

/** Refuses the first input that is not a finite number; lists are looked through. `undefined` inputs are skipped. */
export function refuseNotFinite(inputs: Readonly<Record<string, number | readonly number[] | undefined>>): Refused | null {
  for (const [field, value] of Object.entries(inputs)) {
    if (value === undefined) continue;
    const bad = typeof value === "number" ? !Number.isFinite(value) : !value.every((v) => Number.isFinite(v));
    if (bad) return refuseFlow("NUMBER_NOT_FINITE", field);
  }
  return null;
}

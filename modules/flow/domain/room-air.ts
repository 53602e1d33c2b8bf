import { ok, refuse, type Result } from "@/modules/kernel/result";
import { moistAirDensity } from "./air-density";
import type { FlowFlag } from "./flow-flags";
import { refuseFlow } from "./flow-refusal";
import { typedNumber } from "./typed-number";
import { celsiusOfFahrenheit, convertUnit, kelvinOfCelsius, type UnitName } from "./units";

/** Air of the room as it was typed: each with its unit; empty = not noted. */
export interface RoomTexts {
  readonly roomTemperatureText: string;
  readonly roomPressureText: string;
  readonly roomHumidityText: string;
}

const BAROMETER: Readonly<Record<string, UnitName>> = { inhg: "inHg_conventional", mmhg: "mmHg_conventional", torr: "mmHg_conventional", hpa: "hPa", mbar: "hPa", kpa: "kPa", pa: "Pa", psi: "psi" };

function numberAndUnit(text: string): { number: Result<number>; unit: string } {
  const m = /^([+\-−]?[\d.,]+)\s*(.*)$/.exec(text.trim());
  return { number: typedNumber(m?.[1] ?? ""), unit: (m?.[2] ?? "").trim() };
}

/**
 * A temperature as typed, kelvin: `71 °F`, `71 F`, `21,5 °C`, `294 K`. Without its unit it is refused: 20 may be either.
 * Source: NIST SP 811 B.8. Errors: UNIT_KIND_MISMATCH, READING_OUT_OF_RANGE (at or below absolute zero).
 */
export function typedKelvin(text: string, field = "roomTemperature"): Result<number> {
  const { number, unit } = numberAndUnit(text);
  const name = unit.replace(/^(°|deg\.?|degrees)\s*/i, "").toUpperCase();
  if (!number.ok || !["F", "C", "K"].includes(name)) return refuse("UNIT_KIND_MISMATCH", "Write the temperature with its unit, such as 71 °F or 21.5 °C.", { field });
  const kelvin = name === "K" ? number.value : kelvinOfCelsius(name === "F" ? celsiusOfFahrenheit(number.value) : number.value);
  return kelvin > 0 ? ok(kelvin) : refuseFlow("READING_OUT_OF_RANGE", field);
}

/**
 * A barometer reading as typed, pascals: `29.86 inHg`, `1011 hPa`, `758 mmHg`. It is the station's pressure, never that of a
 * forecast reduced to sea level. Source: NIST SP 811 B.8. Errors: UNIT_KIND_MISMATCH, PRESSURE_NOT_POSITIVE.
 */
export function typedPascal(text: string, field = "roomPressure"): Result<number> {
  const { number, unit } = numberAndUnit(text);
  const name = BAROMETER[unit.toLowerCase()];
  if (!number.ok || !name) return refuse("UNIT_KIND_MISMATCH", "Write the barometer with its unit, such as 29.86 inHg or 1011 hPa.", { field });
  return number.value > 0 ? convertUnit(number.value, name, "Pa") : refuseFlow("PRESSURE_NOT_POSITIVE", field);
}

/** Relative humidity as typed, 0 to 1: `45 %`, `45`, `0.45`. Above 1 it is percent. Errors: HUMIDITY_NOT_FRACTION. */
export function typedHumidity(text: string, field = "roomHumidity"): Result<number> {
  const { number, unit } = numberAndUnit(text);
  if (!number.ok || !["", "%"].includes(unit)) return refuse("HUMIDITY_NOT_FRACTION", "Write the humidity in percent, such as 45 %.", { field });
  const fraction = unit === "%" || number.value > 1 ? number.value / 100 : number.value;
  return fraction >= 0 && fraction <= 1 ? ok(fraction) : refuse("HUMIDITY_NOT_FRACTION", "Humidity lies between 0 and 100 %.", { field });
}

/** What was typed of the room and cannot be read; null when all of it can, or nothing was typed. */
export function refuseRoom(room: RoomTexts): Extract<Result<number>, { ok: false }> | null {
  const read = [
    room.roomTemperatureText.trim() === "" ? null : typedKelvin(room.roomTemperatureText),
    room.roomPressureText.trim() === "" ? null : typedPascal(room.roomPressureText),
    room.roomHumidityText.trim() === "" ? null : typedHumidity(room.roomHumidityText),
  ];
  for (const one of read) if (one && !one.ok) return one;
  return null;
}

/**
 * Density of the room's air, kg/m3. Humidity not noted counts as dry (a humid room at 20 °C is at most 0.9 % lighter, which is
 * 0.45 % in flow). Source: `moistAirDensity`. Errors: DENSITY_REQUIRED when temperature or barometer is not noted; those of the parts.
 */
export function roomDensity(room: RoomTexts): Result<{ densityKgM3: number; flags: readonly FlowFlag[] }> {
  for (const [text, field] of [[room.roomTemperatureText, "roomTemperature"], [room.roomPressureText, "roomPressure"]] as const) {
    if (text.trim() === "") return refuse("DENSITY_REQUIRED", "This bench counts the air as it is: note room temperature and barometer, each with its unit.", { field });
  }
  const kelvin = typedKelvin(room.roomTemperatureText);
  if (!kelvin.ok) return kelvin;
  const pascal = typedPascal(room.roomPressureText);
  if (!pascal.ok) return pascal;
  const humidity = room.roomHumidityText.trim() === "" ? ok(0) : typedHumidity(room.roomHumidityText);
  if (!humidity.ok) return humidity;
  return moistAirDensity({ temperatureC: kelvin.value - kelvinOfCelsius(0), pressurePa: pascal.value, relativeHumidity: humidity.value });
}

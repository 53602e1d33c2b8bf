import { describe, expect, it } from "vitest";
import { computedReading, type ReadingRules } from "./computed-reading";
import { refuseRoom, roomDensity, typedHumidity, typedKelvin, typedPascal } from "./room-air";

const value = <T>(r: { ok: true; value: T } | { ok: false; refusal: { message: string } }): T => { if (!r.ok) throw new Error(r.refusal.message); return r.value; };
const code = (r: { ok: boolean; refusal?: { code: string } }) => (r.ok ? "no refusal" : r.refusal?.code);
const room = (roomTemperatureText: string, roomPressureText: string, roomHumidityText = "") => ({ roomTemperatureText, roomPressureText, roomHumidityText });

describe("air of the room as typed", () => {
  // NIST SP 811 (2008) B.8: T/K = (t/°F + 459.67)/1.8; inHg (conventional) 3386.389 Pa; mmHg 133.3224 Pa.
  it.each([["71 °F", (71 + 459.67) / 1.8], ["71F", (71 + 459.67) / 1.8], ["21,5 °C", 294.65], ["21.5 deg C", 294.65], ["294 K", 294], ["-5 C", 268.15]])("%s is %f K", (text, kelvin) => {
    expect(value(typedKelvin(text))).toBeCloseTo(kelvin, 9);
  });
  it.each([["29.86 inHg", 29.86 * 3386.389], ["1011 hPa", 101_100], ["1011 mbar", 101_100], ["758 mmHg", 758 * 133.3224], ["101.1 kPa", 101_100]])("%s in pascals", (text, pascal) => {
    expect(value(typedPascal(text))).toBeCloseTo(pascal, 6);
  });
  it.each([["45 %", 0.45], ["45", 0.45], ["0.45", 0.45], ["100 %", 1], ["0", 0]])("humidity %s", (text, fraction) => expect(value(typedHumidity(text))).toBeCloseTo(fraction, 12));
  it.each([
    [() => typedKelvin("71"), "UNIT_KIND_MISMATCH"], [() => typedKelvin("banana"), "UNIT_KIND_MISMATCH"], [() => typedKelvin("-500 F"), "READING_OUT_OF_RANGE"],
    [() => typedPascal("99999"), "UNIT_KIND_MISMATCH"], [() => typedPascal("-1 hPa"), "PRESSURE_NOT_POSITIVE"], [() => typedHumidity("120 %"), "HUMIDITY_NOT_FRACTION"], [() => typedHumidity("wet"), "HUMIDITY_NOT_FRACTION"],
  ])("refuses %s", (run, expected) => expect(code(run())).toBe(expected));

  it("refuses the first part that cannot be read, at its field, and nothing when nothing was typed", () => {
    expect(refuseRoom(room("banana", "99999"))?.refusal.field).toBe("roomTemperature");
    expect(refuseRoom(room("71 °F", "99999"))?.refusal.field).toBe("roomPressure");
    expect(refuseRoom(room("", ""))).toBeNull();
  });
  // CIPM-2007 test value printed in a mass-metrology handbook appendix: 10 °C, 730 mmHg, 40 % -> 1.19569 kg/m3.
  it("gives the printed density of moist air", () => expect(value(roomDensity(room("10 °C", "730 mmHg", "40 %"))).densityKgM3).toBeCloseTo(1.19569, 4));
  it("needs temperature and barometer", () => {
    expect(code(roomDensity(room("", "1011 hPa")))).toBe("DENSITY_REQUIRED");
    expect(code(roomDensity(room("20 °C", "")))).toBe("DENSITY_REQUIRED");
  });
});

describe("what the air makes of a reading", () => {
  const rules: ReadingRules = { scale: "direct", ranges: [], waterUnit: "conventional", benchFactor: 1, nominalInH2O: 28, densityKgM3: null, leak: null };
  const typed = { valueText: "140", valueUnit: "cfm", rangeLabel: null, pressureText: "28", pressureUnit: "inH2O" } as const;
  const flow = (r: Partial<ReadingRules>, t: object = {}) => value(computedReading({ ...rules, ...r }, { ...typed, ...t })).flowCfm;

  // Worked from Q_ref = Q sqrt(rho/rho_ref), rho_ref 1.2041 (dry air, 20 °C, 101.325 kPa): 140 x sqrt(1.12/1.2041).
  it("brings a bench that counts the air as it is to reference air", () => expect(flow({ densityKgM3: 1.12 })).toBeCloseTo(135.022, 3));
  it("takes the leak off in the same air", () => expect(flow({ densityKgM3: 1.12, leak: { indicatedCfm: 10, atInH2O: 28 } })).toBeCloseTo((130 * 135.022) / 140, 2));
  it("leaves a bench alone whose weather cancels", () => expect(flow({})).toBe(140));
  // Worked: sqrt(318.15/296.15) = 1.03648; a 20 K warmer orifice reads high.
  it("corrects for air warmed between port and orifice, and flags it", () => {
    const made = value(computedReading(rules, { ...typed, valueText: "100", portTemperatureText: "318.15 K", orificeTemperatureText: "296.15 K" }));
    expect(made.flowCfm).toBeCloseTo(103.648, 3);
    expect(made.flags).toContain("TEMPERATURE_CORRECTED");
    expect(flow({}, { valueText: "100", portTemperatureText: "293.15 K", orificeTemperatureText: "313.15 K" })).toBeCloseTo(96.754, 3);
  });
  it("wants both temperatures or neither", () => expect(code(computedReading(rules, { ...typed, portTemperatureText: "71 °F" }))).toBe("TEMPERATURE_PAIR"));
});

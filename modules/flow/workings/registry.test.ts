import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { FLOW_REFUSALS } from "../domain/flow-refusal";
import { POWER_ESTIMATE_WORDS } from "../domain/power-estimate";
import { entryText, figureText } from "./answer-text";
import type { Field } from "./field";
import { flagWords } from "./flag-words";
import { inputSchemas, workingsListing } from "./listing";
import { runWorking, WORKING_GROUPS, workingOf, WORKINGS } from "./registry";
import { addressOf, exampleTyped, typedOfAddress, workTyped } from "./typed-inputs";
import { keyOfField } from "./working";

/** The functions the product owes, by the names that people and programs call them. */
const OWED = `convert_unit flow_from_range_percent flow_from_orifice_head convert_test_pressure compressible_pressure_ratio moist_air_density speed_of_sound
density_reference_correction subtract_leak orifice_mass_flow orifice_coefficient orifice_expansibility calibration_factor curtain_area seat_flow_area section_area throat_ratio
ideal_mass_flow discharge_coefficient ideal_velocity mean_velocity interpolate_flow mean_flow_over_lift mean_flow_over_cam gain_table crossovers gain_at_cam_lift exhaust_intake_ratio
compare_with_noise pressure_setting_uncertainty lift_setting_uncertainty t_factor inlet_mach_index power_bracket power_rule_of_thumb weather_power_factor sanity_flags comparability
swept_volume compression_ratio chamber_for_ratio spring lash_shim lash_after_seat_cut valve_to_piston retainer_to_seal seat_runout epoxy_state`.split(/\s+/);
/** Ours beyond those: parts of the same rules. */
const MORE = ["flow_from_direct", "synthetic_cam", "milling_change", "chamber_from_fills", "nested_springs", "stem_clearance"];
/** Codes a working may refuse with besides those of the domain. */
const OWN_CODES = ["INPUT_NOT_ACCEPTED", "INPUT_MISSING", "INPUT_TWICE", "ANSWER_NOT_FINITE"];

const SHOP = { zone: "America/Denver", estimatesOn: true };
const each = WORKINGS.map((w) => [w.name, w] as const);

describe("the list of functions", () => {
  it("has every function that is owed exactly once, and says which are more", () => {
    expect(OWED).toHaveLength(48);
    expect(WORKINGS.map((w) => w.name).sort()).toEqual([...OWED, ...MORE].sort());
    expect(new Set(WORKING_GROUPS.map((g) => g.key)).size).toBe(WORKING_GROUPS.length);
  });
  it.each(each)("%s says what it is for, where it comes from, and what stands in each well", (_, w) => {
    expect(w.purpose).toMatch(/^[A-Z].*\.$/);
    expect(w.source).toMatch(/\.$/);
    const keys = w.outputs.map((o) => o.key);
    expect(new Set(keys).size).toBe(keys.length);
    for (const o of w.outputs) if (o.kind === "number" || o.kind === "numbers") expect(o.decimals ?? o.figures, o.key).toBeTypeOf("number");
    const look = (fields: Record<string, Field>): void => { for (const [key, f] of Object.entries(fields)) { expect(f.label, key).not.toBe(""); if (f.fields) look(f.fields); else expect(f.example, key).not.toBe(""); } };
    look(w.fields);
    for (const set of w.either.flatMap((e) => e.of)) expect(set.filter((key) => w.fields[key]?.optional !== true), "a choice between inputs").toEqual([]);
  });
  it("says that power is no promise, and defers to the manual where engines break", () => {
    for (const name of ["power_bracket", "power_rule_of_thumb", "inlet_mach_index"]) expect(workingOf(name)).toMatchObject({ caution: POWER_ESTIMATE_WORDS, isEstimate: true });
    for (const name of ["lash_shim", "lash_after_seat_cut", "valve_to_piston", "retainer_to_seal", "seat_runout", "stem_clearance", "spring", "nested_springs"]) expect(workingOf(name)?.caution).toMatch(/Defer to the service manual/);
    expect(workingOf("weather_power_factor")?.caution).toMatch(/never for flow/);
  });
  it("is listed for programs, with a schema for each", () => {
    expect(workingsListing({ estimatesOn: false }).flatMap((g) => g.functions).filter((f) => !f.switchedOn).map((f) => f.name)).toEqual(["inlet_mach_index", "power_bracket", "power_rule_of_thumb"]);
    expect(inputSchemas()).toHaveLength(WORKINGS.length);
    for (const schema of inputSchemas()) expect(schema).toMatchObject({ type: "object", additionalProperties: false });
  });
});

describe("worked examples", () => {
  it.each(each)("%s computes its own, as typed on a screen, and every figure is described", (_, w) => {
    const worked = workTyped(w, exampleTyped(w, SHOP.zone), SHOP);
    if (worked.state !== "answered") throw new Error(JSON.stringify(worked));
    const described = new Map(w.outputs.map((o) => [o.key, o]));
    for (const [key, value] of Object.entries(worked.answer.values)) {
      const output = described.get(key);
      expect(output, key).toBeDefined();
      if (output && ["number", "string", "boolean"].includes(typeof value)) expect(entryText(output, value as string, "en-US")).not.toMatch(/NaN|undefined|_/);
    }
    for (const o of w.outputs) if (!o.sometimes) expect(worked.answer.values, o.key).toHaveProperty(o.key);
    for (const flag of worked.answer.flags) expect(flagWords(flag)).not.toBe(flag);
  });
  it.each(each)("%s survives being sent in an address", (_, w) => {
    const typed = exampleTyped(w, SHOP.zone);
    const sent = new URLSearchParams(addressOf(w.name, typed).slice(1));
    expect(sent.get("f")).toBe(w.name);
    expect(typedOfAddress(w, sent)).toEqual(typed);
  });
});

/** A value for a field: mostly near its example, sometimes far off, sometimes left out. */
function anyOf(field: Field): fc.Arbitrary<unknown> {
  const near = Number(field.example.split(/\s+/)[0]?.replace(/^\./, "0.")) || 1;
  const number = fc.oneof(fc.double({ min: near / 3, max: near * 3, noNaN: true }), fc.constantFrom(0, near, -near), fc.double({ min: -1e9, max: 1e9, noNaN: true }));
  const numbers = fc.array(number, { minLength: 1, maxLength: 8 }).chain((list) => fc.constantFrom(list, [...list].sort((a, b) => a - b)));
  const one = (): fc.Arbitrary<unknown> => {
    switch (field.kind) {
      case "number": return number;
      case "numbers": return numbers;
      case "one_or_more": return fc.oneof(number, numbers);
      case "choice": return fc.constantFrom(...(field.options ?? []).map((o) => o.value));
      case "yes": return fc.boolean();
      case "words": return fc.array(fc.constantFrom("left", "right"), { minLength: 1, maxLength: 2 });
      case "word": return fc.constantFrom("A", "B");
      case "instant": return fc.constantFrom("2026-02-03T09:00:00Z", "2026-02-03T09:30:00Z", "2026-02-05T09:00:00-07:00");
      case "record": return fc.record(Object.fromEntries(Object.entries(field.fields ?? {}).map(([key, f]) => [key, anyOf(f)])), { requiredKeys: [] });
    }
  };
  return one();
}

describe("whatever is sent", () => {
  it.each(each)("%s answers with finite described figures, or refuses by a known code, a known input and no number", (_, w) => {
    const needed = Object.keys(w.fields).filter((key) => w.fields[key]?.optional === false);
    const inputs = fc.oneof(
      fc.record(Object.fromEntries(Object.entries(w.fields).map(([key, f]) => [key, anyOf(f)])), { requiredKeys: needed }),
      fc.record(Object.fromEntries(w.worked.flatMap((key) => { const f = w.fields[key]; return f ? [[key, anyOf(f)]] : []; })) as Record<string, fc.Arbitrary<unknown>>),
    );
    const keys = new Set(w.outputs.map((o) => o.key));
    fc.assert(fc.property(inputs, (sent) => {
      const made = w.run(sent);
      if (made.ok) {
        expect(JSON.parse(JSON.stringify(made.value.values))).toEqual(made.value.values);
        for (const key of Object.keys(made.value.values)) expect(keys).toContain(key);
        for (const flag of made.value.flags) expect(flagWords(flag)).not.toBe(flag);
      } else {
        expect([...Object.keys(FLOW_REFUSALS), ...OWN_CODES]).toContain(made.refusal.code);
        expect(made.refusal.message.length).toBeGreaterThan(10);
        expect(made).not.toHaveProperty("value");
        if (made.refusal.field !== undefined) expect(Object.keys(w.fields)).toContain(made.refusal.field.split(".")[0]);
        // Words that only say that a size is wrong must say which one.
        if (["GEOMETRY_INVALID", "READING_OUT_OF_RANGE", "PRESSURE_NOT_POSITIVE"].includes(made.refusal.code)) expect(made.refusal.field, JSON.stringify(sent)).toBeDefined();
      }
    }), { numRuns: 150 });
  });
  it.each(each)("%s takes no input it does not know, no text for a number, and nothing at all", (_, w) => {
    expect(w.run({ sizes: 1 })).toMatchObject({ ok: false, refusal: { code: "INPUT_NOT_ACCEPTED" } });
    for (const sent of [null, 3, [], "x"]) expect(w.run(sent)).toMatchObject({ ok: false, refusal: { code: "INPUT_NOT_ACCEPTED" } });
    for (const [key, f] of Object.entries(w.fields)) if (f.kind === "number") expect(w.run({ [key]: "1" })).toMatchObject({ ok: false, refusal: { code: "INPUT_NOT_ACCEPTED" } });
  });
});

describe("inputs", () => {
  const run = (name: string, inputs: object) => workingOf(name)?.run(inputs);
  it("that say one thing in two ways are refused, and so is half of one way", () => {
    const seat = { valve_diameter_mm: 31, seat_angle_deg: 45, port_diameter_mm: 27, stem_diameter_mm: 5.5, lift_mm: 5 };
    expect(run("seat_flow_area", { ...seat, seat_radial_width_mm: 1, seat_face_width_mm: 1.4 })).toMatchObject({ ok: false, refusal: { code: "INPUT_TWICE" } });
    expect(run("seat_flow_area", seat)).toMatchObject({ ok: false, refusal: { code: "INPUT_MISSING" } });
    expect(run("lash_after_seat_cut", { clearance_before_mm: 0.14, removed_normal_mm: 0.085 })).toMatchObject({ ok: false, refusal: { code: "INPUT_MISSING", field: "seat_angle_deg" } });
    expect(run("spring", { rate: 8, seat_load_N: 200, free_length: 2.75, wire_diameter: 0.0625, total_coils: 14.36, units: "lbf,in" })).toMatchObject({ ok: false, refusal: { code: "INPUT_TWICE", field: "seat_load_N" } });
    expect(run("sanity_flags", { lifts_mm: [1, 2], flows_cfm: [1, 2], percent: 50 })).toMatchObject({ ok: false, refusal: { code: "INPUT_TWICE" } });
    expect(run("sanity_flags", {})).toMatchObject({ ok: false, refusal: { code: "INPUT_MISSING" } });
  });
  it("are named in a refusal as they were given", () => {
    expect(run("gain_table", { lifts_in: [0.2, 0.1], before_cfm: [1, 2], after_cfm: [1, 2] })).toMatchObject({ ok: false, refusal: { code: "LIFTS_NOT_INCREASING", field: "lifts_in" } });
    expect(run("gain_table", { lifts_mm: [2, 1], before_cfm: [1, 2], after_cfm: [1, 2] })).toMatchObject({ ok: false, refusal: { field: "lifts_mm" } });
    expect(run("mean_velocity", { flow_cfm: 100, area_in2: -1 })).toMatchObject({ ok: false, refusal: { code: "GEOMETRY_INVALID", field: "area_in2" } });
    expect(run("seat_flow_area", { valve_diameter_mm: 31, seat_face_width_mm: 40, seat_angle_deg: 45, port_diameter_mm: 27, stem_diameter_mm: 5.5, lift_mm: 5 })).toMatchObject({ ok: false, refusal: { field: "seat_face_width_mm" } });
    expect(run("lash_after_seat_cut", { clearance_before_mm: 0.14, removed_normal_mm: -1, seat_angle_deg: 45 })).toMatchObject({ ok: false, refusal: { field: "removed_normal_mm" } });
  });
  it("in inches give what the same lifts in millimetres give", () => {
    const flows = { flows_cfm: [24.6, 48.9, 88, 120] };
    const inches = [0.05, 0.1, 0.2, 0.3];
    const a = run("interpolate_flow", { lifts_in: inches, ...flows, at_in: [0.125, 0.3] });
    const b = run("interpolate_flow", { lifts_mm: inches.map((l) => l * 25.4), ...flows, at_mm: [0.125 * 25.4, 0.3 * 25.4] });
    if (!a?.ok || !b?.ok) throw new Error("refused");
    (a.value.values.flow_cfm as number[]).forEach((v, i) => expect(v).toBeCloseTo((b.value.values.flow_cfm as number[])[i] ?? Number.NaN, 9));
  });
  it("work out a rate from the wire, and what the spring does with it", () => {
    // Shigley ch. 10: k = G d^4/(8 D^3 Na), here 79000 x 3.8^4/(8 x 24^3 x 4.5) by hand.
    const made = run("spring", { wire_mm: 3.8, mean_diameter_mm: 24, active_coils: 4.5, G_MPa: 79000, free_length_mm: 40, installed_height_mm: 35, lift_mm: 8, solid_height_mm: 24, minimum_mm: 4 });
    if (!made?.ok) throw new Error("refused");
    expect(made.value.values.rate_N_mm).toBeCloseTo(33.1, 1);
    expect(made.value.values.seat_load_N).toBeCloseTo(5 * 33.1, 0);
    expect(made.value).toMatchObject({ values: { coil_bind_clearance_mm: 3 }, flags: ["COIL_BIND_CLEARANCE_LOW"] });
  });
  it("of nested springs add up, and the smallest clearance governs", () => {
    expect(run("nested_springs", { rates_N_mm: [40, 18], coil_bind_clearances_mm: [2.1, 1.6] })).toMatchObject({ ok: true, value: { values: { rate_N_mm: 58, coil_bind_clearance_mm: 1.6 }, flags: [] } });
    expect(run("nested_springs", { rates_N_mm: [40, 18], seat_loads_N: [200] })).toMatchObject({ ok: false, refusal: { field: "seat_loads_N" } });
  });
});

describe("estimates", () => {
  it("say so where the owner did not switch them on, and give no number", () => {
    for (const w of WORKINGS.filter((x) => x.isEstimate)) {
      const off = runWorking(w, {}, { estimatesOn: false });
      expect(off).toMatchObject({ ok: false, refusal: { code: "ESTIMATES_OFF" } });
      expect(JSON.stringify(off)).toContain(POWER_ESTIMATE_WORDS);
      expect(workTyped(w, exampleTyped(w, SHOP.zone), { ...SHOP, estimatesOn: false })).toMatchObject({ state: "refused", refusal: { code: "ESTIMATES_OFF" } });
    }
  });
});

describe("what is typed", () => {
  const typed = (name: string, texts: Record<string, string>) => { const w = workingOf(name); if (!w) throw new Error(name); return workTyped(w, texts, SHOP); };
  it("may have a comma or a point, and lists a space, a line or a semicolon between", () => {
    expect(typed("swept_volume", { bore_mm: "100,0", stroke_mm: "83" })).toMatchObject({ state: "answered" });
    const a = typed("calibration_factor", { reference_cfm: "30 60\n90", indicated_cfm: "29,6; 59,4; 88,9" });
    const b = typed("calibration_factor", { reference_cfm: "30, 60, 90", indicated_cfm: "29.6 59.4 88.9" });
    expect(a).toMatchObject({ state: "answered" });
    expect(a).toEqual(b);
  });
  it("is waited for in words, and refused beside its own well", () => {
    expect(typed("swept_volume", {})).toEqual({ state: "empty" });
    expect(typed("swept_volume", { bore_mm: "72" })).toEqual({ state: "waiting", words: "Still to type: Stroke, mm." });
    expect(typed("swept_volume", { bore_mm: "7x2", stroke_mm: "61.2" })).toMatchObject({ state: "refused", at: { bore_mm: FLOW_REFUSALS.NUMBER_NOT_FINITE } });
    expect(typed("calibration_factor", { reference_cfm: "30,60,90", indicated_cfm: "29.6" })).toMatchObject({ state: "refused", at: { reference_cfm: expect.stringContaining("Put a space") as string } });
    expect(typed("flow_from_range_percent", { range_cfm: "100", percent: "103" })).toMatchObject({ state: "refused", refusal: { code: "READING_OUT_OF_RANGE" }, at: { percent: FLOW_REFUSALS.READING_OUT_OF_RANGE } });
    expect(typed("lash_shim", { old_shim_mm: "1.85", measured_mm: "0.05" })).toMatchObject({ state: "waiting", words: expect.stringContaining("“Clearance wanted, mm”") as string });
    expect(typed("comparability", { "before.bench": "A", "after.room_C": "warm" })).toMatchObject({ state: "refused", at: { "after.room_C": FLOW_REFUSALS.NUMBER_NOT_FINITE } });
  });
  it("as a time is read in the shop's zone", () => {
    const at = { mixed_at: "2026-02-03T09:00", now: "2026-02-03T09:40", pot_life_min: "45", min_cure_h: "24" };
    expect(typed("epoxy_state", at)).toMatchObject({ state: "answered", answer: { values: { state: "mixed", may_grind: false } } });
    // The clocks of Denver jumped over this hour.
    expect(typed("epoxy_state", { ...at, now: "2026-03-08T02:30" })).toMatchObject({ state: "refused", at: { now: expect.any(String) as string } });
  });
});

describe("figures in words", () => {
  it("carry the digits that mean something", () => {
    const flow = { key: "f", label: "", unit: "", kind: "number", decimals: 1 } as const;
    expect(figureText(flow, 202.47173, "en-US")).toBe("202.5");
    expect(figureText(flow, -0.04, "en-US")).toBe("0.0");
    expect(figureText(flow, -2.26, "de-DE")).toBe("−2,3");
    const free = { key: "f", label: "", unit: "", kind: "number", figures: 4 } as const;
    expect([0.01120391, 0.1247295, 12345.678, 0].map((v) => figureText(free, v, "en-US"))).toEqual(["0.01120", "0.1247", "12,350", "0.000"]);
  });
  it("name the input that a refusal is about by our name for it", () => {
    expect(keyOfField({ dp_inH2O: {} as Field }, {}, "dpInH2O")).toBe("dp_inH2O");
    expect(keyOfField({}, {}, "dpInH2O")).toBeUndefined();
  });
});

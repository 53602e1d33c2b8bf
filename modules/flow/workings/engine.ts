import { inletMachIndex } from "../domain/mach-index";
import { powerBracket, POWER_ESTIMATE_WORDS, powerRuleOfThumb, weatherPowerFactor } from "../domain/power-estimate";
import { maybe, num } from "./field";
import { figure, said } from "./output";
import { named, working } from "./working";

const MEAN_FLOW = { ...num("Cam-mean flow of one cylinder", "CFM", "64.8"), hint: "From Mean flow over a cam." };
const LABEL = said("label", "This is an", { estimate: "estimate" });

/** Engine speed and power out of airflow: estimates only, each under the fixed words; and the weather factor of dynamometers. */
export const ENGINE_WORKINGS = [
  working({
    name: "inlet_mach_index", title: "Inlet Mach index", purpose: "How near the inlet is to choking at a speed, and the two speeds at which cylinders are known to fill worse.",
    fields: {
      mean_flow_cfm: MEAN_FLOW, dp_inH2O: num("Test pressure", "in H₂O", "28"), density_kg_m3: num("Density at the bench", "kg/m³", "1.1993"), bore_mm: num("Bore", "mm", "72"), stroke_mm: num("Stroke", "mm", "61.2"),
      speed_rpm: num("Engine speed", "r/min", "9000"), sound_speed_m_s: num("Speed of sound", "m/s", "343.2"),
    },
    outputs: [figure("Z", "Index Z", "", 2), figure("rpm_at_0_5", "Speed at Z = 0.5", "r/min", 0), figure("rpm_at_0_6", "Speed at Z = 0.6", "r/min", 0)],
    source: "Taylor (1985) vol. 1 ch. 6, from memory; the mean inlet Mach number of the JSME mechanical engineering dictionary.", caution: POWER_ESTIMATE_WORDS, isEstimate: true,
    compute: (v) => named(inletMachIndex({ meanFlowCfm: v.mean_flow_cfm, dpInH2O: v.dp_inH2O, densityKgM3: v.density_kg_m3, boreMm: v.bore_mm, strokeMm: v.stroke_mm, speedRpm: v.speed_rpm, soundSpeedMS: v.sound_speed_m_s }), (a) => ({ values: { Z: a.z, rpm_at_0_5: a.rpmAt0_5, rpm_at_0_6: a.rpmAt0_6 } })),
  }),
  working({
    name: "power_bracket", title: "Power bracket", purpose: "Three figures between which power from a cam-mean flow may lie.",
    fields: {
      mean_flow_cfm: MEAN_FLOW, dp_inH2O: num("Test pressure", "in H₂O", "28"), density_kg_m3: num("Density at the bench", "kg/m³", "1.1993"), engine_air_density_kg_m3: num("Density at the engine", "kg/m³", "1.2041"),
      sound_speed_m_s: num("Speed of sound", "m/s", "343.2"), cylinders: num("Cylinders", "", "1"),
    },
    outputs: [LABEL, figure("kW_low", "Low", "kW, estimate", 0), figure("kW_mid", "Middle", "kW, estimate", 0), figure("kW_high", "High", "kW, estimate", 0)],
    source: "Derived from Taylor's Z and the definitions of Heywood ch. 2 (from memory); the constants are our choice inside textbook ranges.", caution: POWER_ESTIMATE_WORDS, isEstimate: true,
    compute: (v) => named(powerBracket({ meanFlowCfm: v.mean_flow_cfm, dpInH2O: v.dp_inH2O, densityKgM3: v.density_kg_m3, engineAirDensityKgM3: v.engine_air_density_kg_m3, soundSpeedMS: v.sound_speed_m_s, cylinders: v.cylinders }), (a) => ({ values: { label: a.label, kW_low: a.lowKW, kW_mid: a.midKW, kW_high: a.highKW } })),
  }),
  working({
    name: "power_rule_of_thumb", title: "Rule of thumb for power", purpose: "The trade's figure per CFM of greatest intake flow at 28 in H₂O.",
    fields: { max_flow_cfm: num("Greatest intake flow of one cylinder", "CFM", "126.8"), dp_inH2O: num("Test pressure", "in H₂O", "28"), cylinders: num("Cylinders", "", "1"), coefficient_hp_per_cfm: maybe(num("Coefficient", "hp/CFM", "0.257"), "0.257 where left out.") },
    outputs: [LABEL, figure("hp", "Power", "hp, estimate", 0)],
    source: "Common practice, no published source; the coefficient from memory.", caution: POWER_ESTIMATE_WORDS, isEstimate: true, called: { hpPerCfm: "coefficient_hp_per_cfm" },
    compute: (v) => named(powerRuleOfThumb({ maxFlowCfm: v.max_flow_cfm, dpInH2O: v.dp_inH2O, cylinders: v.cylinders, hpPerCfm: v.coefficient_hp_per_cfm }), (a) => ({ values: { label: a.label, hp: a.hp }, flags: a.flags })),
  }),
  working({
    name: "weather_power_factor", title: "Weather factor of a dynamometer", purpose: "Brings a power reading of a dynamometer to standard weather.",
    fields: { dry_pressure_hPa: { ...num("Dry pressure", "hPa", "999.25"), hint: "Station pressure less the vapour's." }, temperature_C: num("Temperature", "°C", "30") },
    outputs: [figure("factor", "Factor", "", 3)],
    source: "SAE J1349 (June 1990); the usual range 0.93 to 1.07 from memory.", caution: "For dynamometer readings only, never for flow.",
    compute: (v) => named(weatherPowerFactor({ dryPressureHPa: v.dry_pressure_hPa, temperatureC: v.temperature_C }), (a) => ({ values: { factor: a.factor }, flags: a.flags })),
  }),
];

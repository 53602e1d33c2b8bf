import { moistAirDensity } from "../domain/air-density";
import { correctToReferenceDensity } from "../domain/density-reference";
import { speedOfSound } from "../domain/speed-of-sound";
import { convertUnit, UNIT_NAMES, type UnitName } from "../domain/units";
import { choice, maybe, num } from "./field";
import { figure, significant } from "./output";
import { named, working } from "./working";

const UNIT_LABELS: Readonly<Partial<Record<UnitName, string>>> = {
  inH2O_conventional: "in H₂O, conventional", "inH2O_39.2F": "in H₂O at 39.2 °F", inH2O_60F: "in H₂O at 60 °F", inHg_conventional: "in Hg", mmHg_conventional: "mm Hg", "ft3/min": "ft³/min (CFM)", "m3/h": "m³/h", "m3/s": "m³/s", in3: "in³", mm2: "mm²", in2: "in²",
};
const UNIT_WORDS = Object.fromEntries(UNIT_NAMES.map((u) => [u, UNIT_LABELS[u] ?? u])) as Readonly<Record<UnitName, string>>;

/** Units and air. */
export const AIR_WORKINGS = [
  working({
    name: "convert_unit", title: "Unit into unit", purpose: "A pressure, flow, length, force, rate or volume in another unit of its kind.",
    fields: {
      value: num("Value", "", "28"), from: choice("From", UNIT_WORDS, "inH2O_conventional"), to: choice("To", UNIT_WORDS, "kPa"),
      density_kg_m3: maybe(num("Air density", "kg/m³", "1.1993"), "Only between a volume flow and a mass flow."),
    },
    outputs: [significant("value", "Value", "", 6)],
    source: "NIST SP 811 (2008), Appendix B.8; in, ft and lbf exact by definition.",
    called: { densityKgM3: "density_kg_m3" },
    compute: (v) => named(convertUnit(v.value, v.from, v.to, v.density_kg_m3), (value) => ({ values: { value } })),
  }),
  working({
    name: "moist_air_density", title: "Density of moist air", purpose: "What the room's air weighs, for coefficients and absolute meters.",
    fields: {
      temperature_C: num("Temperature", "°C", "20"), pressure_Pa: { ...num("Station pressure", "Pa", "101325"), hint: "As the barometer shows it in the room, not the sea-level pressure of a forecast." },
      relative_humidity: { ...num("Relative humidity", "0 to 1", "0.5"), hint: "50 % is 0.5." },
    },
    outputs: [figure("density_kg_m3", "Density", "kg/m³", 4)],
    source: "CIPM-2007: Picard, Davis, Glaser, Fujii, Metrologia 45 (2008) 149-155; carbon dioxide 0.0004.",
    compute: (v) => named(moistAirDensity({ temperatureC: v.temperature_C, pressurePa: v.pressure_Pa, relativeHumidity: v.relative_humidity }), (a) => ({ values: { density_kg_m3: a.densityKgM3 }, flags: a.flags })),
  }),
  working({
    name: "speed_of_sound", title: "Speed of sound", purpose: "How fast sound runs in the air of the inlet.",
    fields: { temperature_C: num("Temperature", "°C", "15"), gamma: maybe(num("Ratio of specific heats", "", "1.4"), "1.4 where left out."), R: maybe(num("Gas constant", "J/(kg K)", "287.05287"), "That of dry air where left out.") },
    worked: ["temperature_C", "gamma", "R"],
    outputs: [figure("a_m_s", "Speed of sound", "m/s", 1)],
    source: "ISO 2533:1975 (from memory; 340.294 m/s at 15 °C).",
    called: { gasConstant: "R" },
    compute: (v) => named(speedOfSound({ temperatureC: v.temperature_C, gamma: v.gamma, gasConstant: v.R }), (a_m_s) => ({ values: { a_m_s } })),
  }),
  working({
    name: "density_reference_correction", title: "Flow in reference air", purpose: "What the flow would read in reference air, by the kind of bench; on an orifice bench the weather cancels by itself.",
    fields: {
      flow_cfm: num("Flow", "CFM", "140"), method: choice("Bench", { absolute_meter: "absolute meter (thermal, vane, actual volume)", series_orifice: "orifice in series with the port" }, "absolute_meter"),
      density_kg_m3: maybe(num("Air density", "kg/m³", "1.1200"), "Of the air that flows; an absolute meter needs it."), reference_density_kg_m3: maybe(num("Reference density", "kg/m³", "1.2041"), "1.2041 where left out: dry air at 20 °C and 101.325 kPa."),
      port_air_K: maybe(num("Air at the port", "K", "318.15"), "Orifice bench only, where it differs from that at calibration."), orifice_air_K: maybe(num("Air at the orifice", "K", "296.15"), "Orifice bench only."),
    },
    worked: ["flow_cfm", "method", "density_kg_m3", "reference_density_kg_m3"],
    either: [{ of: [["density_kg_m3"], ["port_air_K", "orifice_air_K"]], optional: true }],
    outputs: [figure("flow_cfm", "Flow", "CFM", 1)],
    source: "Bernoulli at constant pressure difference; for the orifice in series derived from equal mass flow. Power correction factors are never applied to flow.",
    compute: (v) => named(
      v.method === "absolute_meter"
        ? correctToReferenceDensity({ method: "absolute_meter", flowCfm: v.flow_cfm, densityKgM3: v.density_kg_m3, referenceDensityKgM3: v.reference_density_kg_m3 })
        : correctToReferenceDensity({ method: "series_orifice", flowCfm: v.flow_cfm, portAirK: v.port_air_K, orificeAirK: v.orifice_air_K }),
      (a) => ({ values: { flow_cfm: a.flowCfm }, flags: a.flags }),
    ),
  }),
];

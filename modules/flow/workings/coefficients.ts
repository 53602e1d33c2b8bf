import { dischargeCoefficient, type ReferenceArea } from "../domain/discharge-coefficient";
import { idealMassFlow } from "../domain/ideal-mass-flow";
import { idealVelocity, meanVelocity } from "../domain/velocity";
import { choice, maybe, num } from "./field";
import { figure, significant } from "./output";
import { missing, named, working } from "./working";

const GAMMA = maybe(num("Ratio of specific heats", "", "1.4"), "1.4 where left out.");
const REFERENCE_WORDS: Readonly<Record<ReferenceArea, string>> = { curtain: "curtain", seat: "seat", head: "valve head (then a flow coefficient)", throat: "throat" };

/** Coefficients and speeds. */
export const COEFFICIENT_WORKINGS = [
  working({
    name: "ideal_mass_flow", title: "Ideal mass flow", purpose: "The most air an area could pass from rest, choked where it must be.",
    fields: {
      area_mm2: num("Area", "mm²", "1000"), p0_Pa: num("Pressure before it", "Pa", "101325"), T0_K: num("Temperature before it", "K", "293.15"), dp_Pa: num("Pressure difference", "Pa", "6974.5"),
      gamma: GAMMA, R: maybe(num("Gas constant", "J/(kg K)", "287.05287"), "That of dry air where left out."),
    },
    outputs: [significant("mass_flow_kg_s", "Mass flow", "kg/s", 4)],
    source: "Heywood (1988) eqs. (6.10), (6.11) = App. C (C.8), (C.9), from memory; choked flow as in any course on compressible flow.",
    called: { gasConstant: "R" },
    compute: (v) => named(idealMassFlow({ areaMm2: v.area_mm2, p0Pa: v.p0_Pa, t0K: v.T0_K, dpPa: v.dp_Pa, gamma: v.gamma, gasConstant: v.R }), (a) => ({ values: { mass_flow_kg_s: a.massFlowKgS }, flags: a.flags })),
  }),
  working({
    name: "discharge_coefficient", title: "Discharge coefficient", purpose: "Flow against the ideal flow of a named area; the two models are some 4 % apart at 28 in H₂O, so the model is named too.",
    fields: {
      flow_cfm: num("Flow", "CFM", "170"), dp_inH2O: num("Test pressure", "in H₂O", "28"), density_kg_m3: num("Density before the valve", "kg/m³", "1.1993"), reference_area_mm2: num("Reference area", "mm²", "1558.23"),
      model: choice("Model", { compressible: "compressible", incompressible: "incompressible" }, "compressible"),
      reference_area: maybe(choice("The area is", REFERENCE_WORDS, "curtain"), "Curtain where left out; only for it is a usual band known."),
      p0_Pa: maybe(num("Pressure before the valve", "Pa", "101325"), "Compressible only; exhaust: room plus test pressure."), T0_K: maybe(num("Temperature before the valve", "K", "293.15"), "Compressible only."), gamma: maybe(num("Ratio of specific heats", "", "1.4"), "Compressible only; 1.4 where left out."),
    },
    worked: ["flow_cfm", "dp_inH2O", "density_kg_m3", "reference_area_mm2", "model", "p0_Pa", "T0_K"],
    outputs: [figure("Cd", "Discharge coefficient", "", 3)],
    source: "Heywood (1988) section 6.3.2, eqs. (6.10), (6.11), from memory; usual band 0.30 to 0.80 on curtain area from memory.",
    called: { gasConstant: "density_kg_m3", dpPa: "dp_inH2O" },
    compute: (v) => {
      const common = { flowCfm: v.flow_cfm, dpInH2O: v.dp_inH2O, densityKgM3: v.density_kg_m3, referenceAreaMm2: v.reference_area_mm2, referenceArea: v.reference_area };
      const cd = (r: ReturnType<typeof dischargeCoefficient>) => named(r, (a) => ({ values: { Cd: a.cd }, flags: a.flags }));
      if (v.model === "incompressible") return cd(dischargeCoefficient({ ...common, model: "incompressible" }));
      if (v.p0_Pa === undefined) return missing("p0_Pa", "The compressible model");
      if (v.T0_K === undefined) return missing("T0_K", "The compressible model");
      return cd(dischargeCoefficient({ ...common, model: "compressible", p0Pa: v.p0_Pa, t0K: v.T0_K, gamma: v.gamma }));
    },
  }),
  working({
    name: "ideal_velocity", title: "Speed the test pressure can make", purpose: "Highest mean speed at a test pressure, and the flow of one square inch at it.",
    fields: {
      dp_inH2O: num("Test pressure", "in H₂O", "28"), temperature_C: maybe(num("Temperature", "°C", "20"), "This or °F."), temperature_F: maybe(num("Temperature", "°F", "60"), "This or °C."),
      relative_humidity: num("Relative humidity", "0 to 1", "0"), pressure_Pa: num("Station pressure", "Pa", "101325"),
    },
    worked: ["dp_inH2O", "temperature_F", "relative_humidity", "pressure_Pa"],
    either: [{ of: [["temperature_C"], ["temperature_F"]] }],
    outputs: [figure("velocity_m_s", "Speed", "m/s", 1), figure("velocity_ft_s", "Speed", "ft/s", 0), figure("limit_cfm_per_in2", "Most flow of an area", "CFM/in²", 1)],
    source: "Bernoulli, with the density of CIPM-2007; 350 ft/s and 146 CFM/in² at 28 in H₂O are quoted in a public discussion.",
    compute: (v) => {
      const common = { dpInH2O: v.dp_inH2O, relativeHumidity: v.relative_humidity, pressurePa: v.pressure_Pa };
      const speed = idealVelocity(v.temperature_F !== undefined ? { ...common, temperatureF: v.temperature_F } : { ...common, temperatureC: v.temperature_C ?? 0 });
      return named(speed, (a) => ({ values: { velocity_m_s: a.velocityMS, velocity_ft_s: a.velocityFtS, limit_cfm_per_in2: a.limitCfmPerIn2 }, flags: a.flags }));
    },
  }),
  working({
    name: "mean_velocity", title: "Mean speed in a section", purpose: "Flow over area, as a speed.",
    fields: { flow_cfm: num("Flow", "CFM", "118"), area_mm2: maybe(num("Area", "mm²", "560"), "This or square inches."), area_in2: maybe(num("Area", "in²", "0.868"), "This or mm².") },
    worked: ["flow_cfm", "area_mm2"],
    either: [{ of: [["area_mm2"], ["area_in2"]] }],
    outputs: [figure("velocity_m_s", "Mean speed", "m/s", 1), figure("velocity_ft_s", "Mean speed", "ft/s", 0)],
    source: "Continuity; in shop units ft/s = 2.4 CFM/in².",
    compute: (v) => named(meanVelocity(v.area_mm2 !== undefined ? { flowCfm: v.flow_cfm, areaMm2: v.area_mm2 } : { flowCfm: v.flow_cfm, areaIn2: v.area_in2 ?? 0 }), (a) => ({ values: { velocity_m_s: a.velocityMS, velocity_ft_s: a.velocityFtS } })),
  }),
];

import { benchFactorFromPlates } from "../domain/bench-factor";
import { orificeCoefficient, orificeExpansibility, orificeMassFlow } from "../domain/orifice";
import { choice, maybe, num, nums } from "./field";
import { figure, significant } from "./output";
import { named, working } from "./working";

const NOT_CERTIFIED = "A bench orifice sits between two plenums without a meter tube: the standard does not certify it. Check with this, and calibrate.";

/** Orifice and calibration. */
export const ORIFICE_WORKINGS = [
  working({
    name: "orifice_mass_flow", title: "Mass flow of an orifice", purpose: "Mass flow through an orifice plate from its pressure difference.",
    fields: {
      C: num("Discharge coefficient C", "", "0.5988"), expansibility: num("Expansibility", "", "0.9975"), d_m: num("Orifice diameter", "m", "0.0222"), D_m: num("Pipe diameter", "m", "0.0739"),
      dp_Pa: num("Pressure difference", "Pa", "1000"), rho_kg_m3: num("Density before it", "kg/m³", "1.1646"),
    },
    outputs: [significant("mass_flow_kg_s", "Mass flow", "kg/s", 4)],
    source: "ISO 5167-1:2003 eq. (1); ASME MFC-3M.", caution: NOT_CERTIFIED, called: { coefficient: "C", orificeM: "d_m", pipeM: "D_m", densityKgM3: "rho_kg_m3" },
    compute: (v) => named(orificeMassFlow({ coefficient: v.C, expansibility: v.expansibility, orificeM: v.d_m, pipeM: v.D_m, dpPa: v.dp_Pa, densityKgM3: v.rho_kg_m3 }), (mass_flow_kg_s) => ({ values: { mass_flow_kg_s } })),
  }),
  working({
    name: "orifice_coefficient", title: "Coefficient of an orifice", purpose: "Discharge coefficient of a sharp-edged orifice plate, by Reader-Harris and Gallagher.",
    fields: {
      D_m: num("Pipe diameter", "m", "0.07391"), d_m: num("Orifice diameter", "m", "0.0222"), Re_D: num("Reynolds number of the pipe", "", "111742"),
      taps: choice("Pressure taps", { flange: "flange", corner: "corner", d_and_half_d: "D and D/2" }, "flange"),
    },
    outputs: [figure("C", "Discharge coefficient C", "", 4)],
    source: "ISO 5167-2:2003 5.3.2.1 eq. (4), Reader-Harris/Gallagher (clause numbers from memory).", caution: NOT_CERTIFIED, called: { orificeM: "d_m", pipeM: "D_m", reynolds: "Re_D" },
    compute: (v) => named(orificeCoefficient({ pipeM: v.D_m, orificeM: v.d_m, reynolds: v.Re_D, taps: v.taps }), (C) => ({ values: { C } })),
  }),
  working({
    name: "orifice_expansibility", title: "Expansibility of an orifice", purpose: "How far the air's expansion lowers the flow of an orifice plate.",
    fields: { beta: num("Diameter ratio d/D", "", "0.3004"), p1_Pa: num("Pressure before", "Pa", "100000"), p2_Pa: num("Pressure behind", "Pa", "99000"), kappa: num("Isentropic exponent", "", "1.4") },
    outputs: [figure("epsilon", "Expansibility", "", 4)],
    source: "ISO 5167-2:2003 5.3.2.2 eq. (5); the limit 0.75 from memory.", caution: NOT_CERTIFIED,
    compute: (v) => named(orificeExpansibility({ beta: v.beta, p1Pa: v.p1_Pa, p2Pa: v.p2_Pa, kappa: v.kappa }), (epsilon) => ({ values: { epsilon } })),
  }),
  working({
    name: "calibration_factor", title: "Bench factor from check plates", purpose: "The factor that brings the bench's readings to the plates' known flows, and how far the worst plate is off it.",
    fields: { reference_cfm: nums("Flows of the plates", "CFM", "30 60 90"), indicated_cfm: nums("Shown by the bench", "CFM", "29.6 59.4 88.9"), last_factor: maybe(num("Last factor", "", "1.008"), "Given, the drift is judged.") },
    outputs: [figure("factor", "Bench factor", "", 4), figure("max_residual_percent", "Worst plate off by", "%", 2)],
    source: "Least squares through zero, any statistics text; the 1 % for drift is common practice, no published source.",
    compute: (v) => named(benchFactorFromPlates({ referenceCfm: v.reference_cfm, indicatedCfm: v.indicated_cfm, lastFactor: v.last_factor }), (a) => ({ values: { factor: a.factor, max_residual_percent: a.maxResidualPercent }, flags: a.flags })),
  }),
];

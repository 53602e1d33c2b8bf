import { compareWithNoise, NOISE_WORDS } from "../domain/noise";
import { liftSettingUncertainty, pressureSettingUncertainty } from "../domain/setting-uncertainty";
import { tFactor } from "../domain/t-factor";
import { maybe, num, nums, yesNo } from "./field";
import { figure, said, sometimes } from "./output";
import { named, working } from "./working";

/** Is a change larger than the noise, and what the noise is made of. */
export const NOISE_WORKINGS = [
  working({
    name: "compare_with_noise", title: "Gain against the noise", purpose: "Whether a change at one lift is larger than the noise of the measurement.",
    fields: {
      before_cfm: nums("Readings before", "CFM", "103.2 103.6 103.5"), after_cfm: nums("Readings after", "CFM", "105.9 106.4 106.0"),
      u_other_cfm: { ...num("Other uncertainty of one test", "CFM", "0.30"), hint: "Standard uncertainty from pressure, lift and resolution." }, confidence: maybe(num("Confidence", "0 to 1", "0.95"), "0.95 where left out."),
      history_pooled_cfm: maybe(num("Pooled repeats of the bench", "CFM", "0.25"), "Stands in where a side was read once."), history_pairs: maybe(num("Repeat pairs behind it", "", "24"), "From 10 pairs in 12 months on."),
      is_converted: maybe(yesNo("One side was converted from another pressure", "no"), "Then 3 % of before comes on top."),
    },
    worked: ["before_cfm", "after_cfm", "u_other_cfm", "confidence"],
    either: [{ of: [["history_pooled_cfm", "history_pairs"]], optional: true }],
    outputs: [
      said("verdict", "Verdict", NOISE_WORDS), figure("mean_before", "Mean before", "CFM", 1), figure("mean_after", "Mean after", "CFM", 1), figure("difference", "Difference", "CFM", 1),
      sometimes(figure("combined_u", "Combined uncertainty", "CFM", 2)), sometimes({ ...figure("effective_dof", "Effective degrees of freedom", "", 0) }), sometimes(figure("k", "Factor k", "", 2)),
      sometimes(figure("expanded_U", "Expanded uncertainty U", "CFM", 2)), sometimes(figure("margin", "The change must exceed", "CFM", 2)),
    ],
    source: "JCGM 100:2008 (GUM) 4.2, 5.1.2, G.4.1 (Welch-Satterthwaite); t by NIST TN 1297 Table B.1.",
    compute: (v) => named(compareWithNoise({
      beforeCfm: v.before_cfm, afterCfm: v.after_cfm, uOtherCfm: v.u_other_cfm, confidence: v.confidence, isConverted: v.is_converted,
      history: v.history_pooled_cfm !== undefined && v.history_pairs !== undefined ? { pooledCfm: v.history_pooled_cfm, pairs: v.history_pairs } : undefined,
    }), (a) => ({
      values: {
        verdict: a.verdict, mean_before: a.meanBeforeCfm, mean_after: a.meanAfterCfm, difference: a.differenceCfm,
        // Without a Type A part there is no end to the degrees of freedom, and no number for it.
        ...(a.verdict === "not_assessed" ? {} : { combined_u: a.combinedUCfm, effective_dof: Number.isFinite(a.effectiveDof) ? a.effectiveDof : undefined, k: a.k, expanded_U: a.expandedUCfm, margin: a.marginCfm }),
      },
      flags: a.flags,
    })),
  }),
  working({
    name: "pressure_setting_uncertainty", title: "Noise of holding the pressure", purpose: "What an unsteady test pressure does to a flow.",
    fields: { flow_cfm: num("Flow", "CFM", "100"), dp_inH2O: num("Test pressure", "in H₂O", "28"), u_dp_inH2O: num("Held to within", "in H₂O", "0.1") },
    outputs: [figure("u_flow_cfm", "Standard uncertainty of flow", "CFM", 2)], source: "JCGM 100:2008 (GUM) 5.1.2, with flow as the root of pressure.",
    compute: (v) => named(pressureSettingUncertainty({ flowCfm: v.flow_cfm, dpInH2O: v.dp_inH2O, uDpInH2O: v.u_dp_inH2O }), (u_flow_cfm) => ({ values: { u_flow_cfm } })),
  }),
  working({
    name: "lift_setting_uncertainty", title: "Noise of setting the lift", purpose: "What an unsteady lift does to a flow, by the slope of the curve.",
    fields: {
      lifts_mm: nums("Lifts", "mm", "1 2 3 4 5 6 7 8 9"), flows_cfm: nums("Flows", "CFM", "18.1 38.6 58.9 78.4 95.7 109.2 118.6 124.0 126.8"), at_mm: num("At", "mm", "5.0"), u_lift_mm: num("Set to within", "mm", "0.02"),
      add_zero: maybe(yesNo("Start from nothing at zero lift", "yes"), "Yes where left out."),
    },
    outputs: [figure("u_flow_cfm", "Standard uncertainty of flow", "CFM", 2)], source: "JCGM 100:2008 (GUM) 5.1.2; slope of the monotone curve (Fritsch & Carlson 1980).", called: { at: "at_mm", lifts: "lifts_mm", uLift: "u_lift_mm" },
    compute: (v) => named(liftSettingUncertainty({ table: { lifts: v.lifts_mm, flowsCfm: v.flows_cfm }, at: v.at_mm, uLift: v.u_lift_mm, addZero: v.add_zero }), (u_flow_cfm) => ({ values: { u_flow_cfm } })),
  }),
  working({
    name: "t_factor", title: "Student's t", purpose: "Factor from standard to expanded uncertainty, for few repeats.",
    fields: { confidence: num("Confidence", "0 to 1", "0.95"), dof: num("Degrees of freedom", "", "4") },
    outputs: [figure("t", "t", "", 2)], source: "JCGM 100:2008 (GUM) Annex G; NIST TN 1297 Table B.1.",
    compute: (v) => named(tFactor(v.confidence, v.dof), (t) => ({ values: { t } })),
  }),
];

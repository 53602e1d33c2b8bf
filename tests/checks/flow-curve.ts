import { expect } from "vitest";
import { gainAtCamLift } from "@/modules/flow/domain/cam-lift";
import { comparability, type TestConditions } from "@/modules/flow/domain/comparability";
import { crossovers } from "@/modules/flow/domain/crossovers";
import { exhaustIntakeRatio } from "@/modules/flow/domain/exhaust-intake-ratio";
import { gainTable } from "@/modules/flow/domain/gain";
import { interpolateFlow, interpolateFlows } from "@/modules/flow/domain/interpolate-flow";
import { inletMachIndex } from "@/modules/flow/domain/mach-index";
import { meanFlowOverCam, meanFlowOverLift } from "@/modules/flow/domain/mean-flow";
import { compareWithNoise } from "@/modules/flow/domain/noise";
import { powerBracket, powerRuleOfThumb, weatherPowerFactor } from "@/modules/flow/domain/power-estimate";
import { sanityFlagsOfReading, sanityFlagsOfTest } from "@/modules/flow/domain/sanity-flags";
import { liftSettingUncertainty, pressureSettingUncertainty } from "@/modules/flow/domain/setting-uncertainty";
import { tFactor } from "@/modules/flow/domain/t-factor";
import { named, oneOf, type Adapters, type Inputs } from "./check-case";

const table = (i: Inputs, lifts: string, flows = "flows_cfm") => ({ lifts: i.nums(lifts), flowsCfm: i.nums(flows) });

const beforeAfter = (i: Inputs, lifts: string) => ({ lifts: i.nums(lifts), beforeCfm: i.nums("before_cfm"), afterCfm: i.nums("after_cfm") });

const conditions = (i: Inputs): TestConditions => ({
  fixtureBoreMm: i.num("fixture_bore_mm"),
  statedAtInH2O: i.num("dp_inH2O"),
  entry: oneOf(i.text("entry"), ["radius", "clay", "manifold", "none"] as const),
  valveDiametersMm: i.nums("valve_diameters_mm"),
  bench: i.text("bench"),
});

/** Adapters of the check cases on curves: interpolation, means, gain, noise, estimates, doubts. */
export const CURVE_ADAPTERS: Adapters = {
  interpolate_flow: (i) => {
    const t = table(i, "lifts_mm");
    const options = { addZero: i.bool("add_zero") };
    return i.isList("at_mm")
      ? named(interpolateFlows(t, i.nums("at_mm"), options), (v) => ({ flow_cfm: v }))
      : named(interpolateFlow(t, i.num("at_mm"), options), (v) => ({ flow_cfm: v }));
  },
  mean_flow_over_lift: (i) => named(meanFlowOverLift(table(i, "lifts_mm"), i.num("from_mm"), i.num("to_mm")), (v) => ({ mean_cfm: v })),
  mean_flow_over_cam: (i) =>
    named(meanFlowOverCam({ anglesDeg: i.nums("angles_deg"), camLifts: i.nums("lifts_mm"), table: table(i, "flow_lifts_mm") }), (v) => ({ mean_cfm: v })),
  gain_table: (i) =>
    named(gainTable(beforeAfter(i, "lifts_in")), (v) => ({ gain_cfm: v.map((r) => r.gainCfm), gain_percent: v.map((r) => r.gainPercent) })),
  crossovers: (i) => named(crossovers(beforeAfter(i, "lifts_mm")), (v) => ({ crossovers: v.crossovers, loss_points_mm: v.lossLifts })),
  gain_at_cam_lift: (i) =>
    named(gainAtCamLift({ ...beforeAfter(i, "lifts_mm"), camMaxLift: i.num("cam_max_lift_mm") }), (v) => ({
      gain_at_cam_lift_cfm: v.testedToCamLift ? v.gainCfm : undefined,
      points_at_or_above_mm: v.testedToCamLift ? v.rowsAtOrAbove.map((r) => r.lift) : [],
      tested_beyond_cam: v.testedBeyondCam,
    })),
  exhaust_intake_ratio: (i) => named(exhaustIntakeRatio({ exhaustCfm: i.num("exhaust_cfm"), intakeCfm: i.num("intake_cfm") }), (v) => ({ ratio: v.ratio })),
  compare_with_noise: (i) =>
    named(
      compareWithNoise({
        beforeCfm: i.nums("before_cfm"),
        afterCfm: i.nums("after_cfm"),
        uOtherCfm: i.num("u_other_cfm"),
        confidence: i.num("confidence"),
      }),
      (v) => ({
        verdict: v.verdict,
        mean_before: v.meanBeforeCfm,
        mean_after: v.meanAfterCfm,
        difference: v.differenceCfm,
        ...(v.verdict === "not_assessed" ? {} : { combined_u: v.combinedUCfm, effective_dof: v.effectiveDof, k: v.k, expanded_U: v.expandedUCfm }),
      }),
    ),
  pressure_setting_uncertainty: (i) =>
    named(pressureSettingUncertainty({ flowCfm: i.num("flow_cfm"), dpInH2O: i.num("dp_inH2O"), uDpInH2O: i.num("u_dp_inH2O") }), (v) => ({
      u_flow_cfm: v,
    })),
  lift_setting_uncertainty: (i) =>
    named(
      liftSettingUncertainty({ table: table(i, "lifts_mm"), at: i.num("at_mm"), uLift: i.num("u_lift_mm"), addZero: i.bool("add_zero") }),
      (v) => ({ u_flow_cfm: v }),
    ),
  t_factor: (i) => named(tFactor(i.num("confidence"), i.num("dof")), (v) => ({ t: v })),
  inlet_mach_index: (i) =>
    named(
      inletMachIndex({
        meanFlowCfm: i.num("mean_flow_cfm"),
        dpInH2O: i.num("dp_inH2O"),
        densityKgM3: i.num("density_kg_m3"),
        boreMm: i.num("bore_mm"),
        strokeMm: i.num("stroke_mm"),
        speedRpm: i.num("speed_rpm"),
        soundSpeedMS: i.num("sound_speed_m_s"),
      }),
      (v) => ({ Z: v.z, rpm_at_0_5: v.rpmAt0_5, rpm_at_0_6: v.rpmAt0_6 }),
    ),
  power_bracket: (i) =>
    named(
      powerBracket({
        meanFlowCfm: i.num("mean_flow_cfm"),
        dpInH2O: i.num("dp_inH2O"),
        densityKgM3: i.num("density_kg_m3"),
        engineAirDensityKgM3: i.num("engine_air_density_kg_m3"),
        soundSpeedMS: i.num("sound_speed_m_s"),
        cylinders: i.num("cylinders"),
      }),
      (v) => ({ kW_low: v.lowKW, kW_mid: v.midKW, kW_high: v.highKW, label: v.label }),
    ),
  power_rule_of_thumb: (i) =>
    named(
      powerRuleOfThumb({
        maxFlowCfm: i.num("max_flow_cfm"),
        dpInH2O: i.num("dp_inH2O"),
        cylinders: i.num("cylinders"),
        hpPerCfm: i.num("coefficient_hp_per_cfm"),
      }),
      (v) => ({ hp: v.hp, label: v.label }),
    ),
  weather_power_factor: (i) =>
    named(weatherPowerFactor({ dryPressureHPa: i.num("dry_pressure_hPa"), temperatureC: i.num("temperature_C") }), (v) => ({ factor: v.factor })),
  sanity_flags: (i) =>
    named(
      i.has("lifts_mm")
        ? sanityFlagsOfTest(table(i, "lifts_mm"))
        : sanityFlagsOfReading({
            flowCfm: i.num("flow_cfm"),
            minSectionMm2: i.num("min_section_mm2"),
            heldInH2O: i.num("dp_inH2O"),
            densityKgM3: i.num("density_kg_m3"),
          }),
      (flags: readonly string[]) => ({ flags }),
    ),
  comparability: (i) => {
    const before = i.inner("before");
    const after = i.inner("after");
    const value = comparability(conditions(before), conditions(after));
    expect([...before.unread(), ...after.unread()]).toEqual([]);
    return { ok: true, value: { ...value } };
  },
};

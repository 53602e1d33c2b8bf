import type { Result } from "@/modules/kernel/result";
import { moistAirDensity } from "@/modules/flow/domain/air-density";
import { benchFactorFromPlates } from "@/modules/flow/domain/bench-factor";
import { correctToReferenceDensity } from "@/modules/flow/domain/density-reference";
import { dischargeCoefficient } from "@/modules/flow/domain/discharge-coefficient";
import { idealMassFlow } from "@/modules/flow/domain/ideal-mass-flow";
import { subtractLeak } from "@/modules/flow/domain/leak";
import { orificeCoefficient, orificeExpansibility, orificeMassFlow, type PressureTaps } from "@/modules/flow/domain/orifice";
import { flowFromOrificeHead, flowFromRangePercent } from "@/modules/flow/domain/reading-to-flow";
import { speedOfSound } from "@/modules/flow/domain/speed-of-sound";
import { compressiblePressureRatio, correctToPressure } from "@/modules/flow/domain/test-pressure";
import { convertUnit, UNIT_NAMES, type UnitName } from "@/modules/flow/domain/units";
import { idealVelocity, meanVelocity } from "@/modules/flow/domain/velocity";
import { named, oneOf, type Adapters, type Answer } from "./check-case";

function unitName(text: string): UnitName {
  const unit = UNIT_NAMES.find((u) => u === text);
  if (!unit) throw new Error(`no unit ${text}`);
  return unit;
}

const flow = (r: Result<{ flowCfm: number; flags: readonly string[] }>): Answer => named(r, (v) => ({ flow_cfm: v.flowCfm, flags: v.flags }));

/** Adapters of the check cases on the bench: units, reading, pressure, air, leak, orifice, bench factor. */
export const BENCH_ADAPTERS: Adapters = {
  convert_unit: (i) => named(convertUnit(i.num("value"), unitName(i.text("from")), unitName(i.text("to"))), (value) => ({ value })),
  flow_from_range_percent: (i) => flow(flowFromRangePercent({ rangeCfm: i.num("range_cfm"), percent: i.num("percent") })),
  flow_from_orifice_head: (i) =>
    flow(flowFromOrificeHead({ rangeCfm: i.num("range_cfm"), head: i.num("head"), fullScaleHead: i.num("full_scale_head") })),
  convert_test_pressure: (i) =>
    flow(correctToPressure({ flowCfm: i.num("flow_cfm"), fromInH2O: i.num("from_inH2O"), toInH2O: i.num("to_inH2O") })),
  compressible_pressure_ratio: (i) =>
    named(compressiblePressureRatio({ fromInH2O: i.num("from_inH2O"), toInH2O: i.num("to_inH2O"), p0Pa: i.num("p0_Pa") }), (v) => ({
      ratio: v.ratio,
      sqrt_ratio: v.sqrtRatio,
      sqrt_overstates_percent: v.sqrtOverstatesPercent,
    })),
  moist_air_density: (i) =>
    named(
      moistAirDensity({ temperatureC: i.num("temperature_C"), pressurePa: i.num("pressure_Pa"), relativeHumidity: i.num("relative_humidity") }),
      (v) => ({ density_kg_m3: v.densityKgM3, flags: v.flags }),
    ),
  speed_of_sound: (i) =>
    named(speedOfSound({ temperatureC: i.num("temperature_C"), gamma: i.num("gamma"), gasConstant: i.num("R") }), (v) => ({ a_m_s: v })),
  density_reference_correction: (i) =>
    flow(
      correctToReferenceDensity(
        i.text("method") === "absolute_meter"
          ? {
              method: "absolute_meter",
              flowCfm: i.num("flow_cfm"),
              densityKgM3: i.num("density_kg_m3"),
              referenceDensityKgM3: i.num("reference_density_kg_m3"),
            }
          : { method: "series_orifice", flowCfm: i.num("flow_cfm"), portAirK: i.num("port_air_K"), orificeAirK: i.num("orifice_air_K") },
      ),
    ),
  subtract_leak: (i) =>
    flow(
      subtractLeak({
        measuredCfm: i.num("measured_cfm"),
        leakCfm: i.num("leak_cfm"),
        measuredAtInH2O: i.num("dp_measured_inH2O"),
        leakAtInH2O: i.num("dp_leak_inH2O"),
      }),
    ),
  orifice_mass_flow: (i) =>
    named(
      orificeMassFlow({
        coefficient: i.num("C"),
        expansibility: i.num("expansibility"),
        orificeM: i.num("d_m"),
        pipeM: i.num("D_m"),
        dpPa: i.num("dp_Pa"),
        densityKgM3: i.num("rho_kg_m3"),
      }),
      (v) => ({ mass_flow_kg_s: v }),
    ),
  orifice_coefficient: (i) =>
    named(
      orificeCoefficient({
        pipeM: i.num("D_m"),
        orificeM: i.num("d_m"),
        reynolds: i.num("Re_D"),
        taps: oneOf<PressureTaps>(i.text("taps"), ["corner", "d_and_half_d", "flange"]),
      }),
      (v) => ({ C: v }),
    ),
  orifice_expansibility: (i) =>
    named(orificeExpansibility({ beta: i.num("beta"), p1Pa: i.num("p1_Pa"), p2Pa: i.num("p2_Pa"), kappa: i.num("kappa") }), (v) => ({ epsilon: v })),
  calibration_factor: (i) =>
    named(benchFactorFromPlates({ referenceCfm: i.nums("reference_cfm"), indicatedCfm: i.nums("indicated_cfm") }), (v) => ({
      factor: v.factor,
      max_residual_percent: v.maxResidualPercent,
    })),
  ideal_mass_flow: (i) =>
    named(
      idealMassFlow({
        areaMm2: i.num("area_mm2"),
        p0Pa: i.num("p0_Pa"),
        t0K: i.num("T0_K"),
        dpPa: i.num("dp_Pa"),
        gamma: i.num("gamma"),
        gasConstant: i.num("R"),
      }),
      (v) => ({ mass_flow_kg_s: v.massFlowKgS, flags: v.flags }),
    ),
  discharge_coefficient: (i) => {
    const common = {
      flowCfm: i.num("flow_cfm"),
      dpInH2O: i.num("dp_inH2O"),
      densityKgM3: i.num("density_kg_m3"),
      referenceAreaMm2: i.num("reference_area_mm2"),
    };
    const model = oneOf(i.text("model"), ["compressible", "incompressible"] as const);
    const answer =
      model === "compressible"
        ? dischargeCoefficient({ ...common, model, p0Pa: i.num("p0_Pa"), t0K: i.num("T0_K"), gamma: i.num("gamma") })
        : dischargeCoefficient({ ...common, model });
    return named(answer, (v) => ({ Cd: v.cd, flags: v.flags }));
  },
  ideal_velocity: (i) =>
    named(
      idealVelocity({
        dpInH2O: i.num("dp_inH2O"),
        temperatureF: i.num("temperature_F"),
        relativeHumidity: i.num("relative_humidity"),
        pressurePa: i.num("pressure_Pa"),
      }),
      (v) => ({ velocity_m_s: v.velocityMS, velocity_ft_s: v.velocityFtS, limit_cfm_per_in2: v.limitCfmPerIn2 }),
    ),
  mean_velocity: (i) =>
    named(meanVelocity({ flowCfm: i.num("flow_cfm"), areaMm2: i.num("area_mm2") }), (v) => ({
      velocity_m_s: v.velocityMS,
      velocity_ft_s: v.velocityFtS,
    })),
};

import { subtractLeak } from "../domain/leak";
import { flowFromDirect, flowFromOrificeHead, flowFromRangePercent, type FlaggedFlow } from "../domain/reading-to-flow";
import { compressiblePressureRatio, correctToPressure } from "../domain/test-pressure";
import type { Result } from "@/modules/kernel/result";
import { maybe, num, yesNo } from "./field";
import { figure } from "./output";
import { named, working, type Made } from "./working";

const FACTOR = maybe(num("Bench factor", "", "1.012"), "1 where left out.");
const FLOW = [figure("flow_cfm", "Flow", "CFM", 1)];
const flow = (r: Result<FlaggedFlow>): Result<Made> => named(r, (a) => ({ values: { flow_cfm: a.flowCfm }, flags: a.flags }));

/** Reading and leak. */
export const READING_WORKINGS = [
  working({
    name: "flow_from_range_percent", title: "Flow from range and percent", purpose: "Flow of a scale that is even in flow: range times percent times bench factor.",
    fields: { range_cfm: num("Range", "CFM", "100"), percent: num("Reading", "%", "73.5"), calibration_factor: FACTOR },
    outputs: FLOW, source: "Common practice, no published source.", called: { benchFactor: "calibration_factor" },
    compute: (v) => flow(flowFromRangePercent({ rangeCfm: v.range_cfm, percent: v.percent, benchFactor: v.calibration_factor })),
  }),
  working({
    name: "flow_from_orifice_head", title: "Flow from the orifice manometer", purpose: "Flow of a plain manometer across the metering orifice, which goes as the root of its height.",
    fields: { range_cfm: num("Range", "CFM", "100"), head: num("Height read", "", "6.25"), full_scale_head: { ...num("Height at full scale", "", "16"), hint: "In the same unit as the height read." }, calibration_factor: FACTOR },
    outputs: FLOW, source: "ISO 5167-1:2003 eq. (1): flow goes as the root of the differential pressure.", called: { benchFactor: "calibration_factor" },
    compute: (v) => flow(flowFromOrificeHead({ rangeCfm: v.range_cfm, head: v.head, fullScaleHead: v.full_scale_head, benchFactor: v.calibration_factor })),
  }),
  working({
    name: "flow_from_direct", title: "Flow from a meter that shows it", purpose: "Flow of a direct reading meter times the bench factor.",
    fields: { value_cfm: num("Reading", "CFM", "131.8"), calibration_factor: FACTOR },
    outputs: FLOW, source: "Definition of the bench factor.", called: { benchFactor: "calibration_factor" },
    compute: (v) => flow(flowFromDirect({ valueCfm: v.value_cfm, benchFactor: v.calibration_factor })),
  }),
  working({
    name: "convert_test_pressure", title: "Flow at another test pressure", purpose: "States a flow at another test pressure by the root of the pressure ratio. Subtract the leak first.",
    fields: { flow_cfm: num("Flow", "CFM", "121"), from_inH2O: num("Read at", "in H₂O", "10"), to_inH2O: num("Stated at", "in H₂O", "28") },
    outputs: FLOW, source: "Bernoulli; ISO 5167-1:2003 eq. (1). From 10 to 28 in H₂O it overstates by about 2.5 %.",
    compute: (v) => flow(correctToPressure({ flowCfm: v.flow_cfm, fromInH2O: v.from_inH2O, toInH2O: v.to_inH2O })),
  }),
  working({
    name: "compressible_pressure_ratio", title: "How far the root law is off", purpose: "How far ideal flow really rises between two test pressures, against the root law.",
    fields: { from_inH2O: num("From", "in H₂O", "10"), to_inH2O: num("To", "in H₂O", "28"), p0_Pa: num("Station pressure", "Pa", "101325") },
    outputs: [figure("ratio", "Flow rises by the factor", "", 3), figure("sqrt_ratio", "The root law says", "", 3), figure("sqrt_overstates_percent", "The root law overstates by", "%", 1)],
    source: "Heywood, Internal Combustion Engine Fundamentals (1988), App. C eq. (C.8), from memory; checked by the energy equation.",
    called: { dpPa: "to_inH2O" },
    compute: (v) => named(compressiblePressureRatio({ fromInH2O: v.from_inH2O, toInH2O: v.to_inH2O, p0Pa: v.p0_Pa }), (a) => ({ values: { ratio: a.ratio, sqrt_ratio: a.sqrtRatio, sqrt_overstates_percent: a.sqrtOverstatesPercent } })),
  }),
  working({
    name: "subtract_leak", title: "Flow without the leak", purpose: "Takes the fixture's leak off a reading, both at one pressure.",
    fields: {
      measured_cfm: num("Flow read", "CFM", "48.6"), leak_cfm: num("Leak", "CFM", "1.4"), dp_measured_inH2O: num("Flow read at", "in H₂O", "28"), dp_leak_inH2O: num("Leak read at", "in H₂O", "28"),
      allow_scaling: maybe(yesNo("Scale a leak read at another pressure", "no"), "A stopgap: small cracks do not follow the root law well."),
    },
    outputs: FLOW, source: "Conservation of mass; the 2 % and 5 % limits are common practice, no published source.", called: { measuredAtInH2O: "dp_measured_inH2O", leakAtInH2O: "dp_leak_inH2O" },
    compute: (v) => flow(subtractLeak({ measuredCfm: v.measured_cfm, leakCfm: v.leak_cfm, measuredAtInH2O: v.dp_measured_inH2O, leakAtInH2O: v.dp_leak_inH2O, allowScaling: v.allow_scaling })),
  }),
];

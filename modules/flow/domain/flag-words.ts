import { FLOW_FLAGS, LIFT_FLAGS, type FlowFlag, type LiftFlag } from "./flow-flags";
import { SANITY_LIMITS, shownLimit, type SanityLimit, type SanityLimits } from "./sanity-limits";

/** A doubt in words, with the limit it was held against where that is the shop's to set. */
export function flagWords(flag: FlowFlag | LiftFlag, limits: SanityLimits = SANITY_LIMITS): string {
  const shown = (key: SanityLimit): string => String(shownLimit(key, limits[key]));
  const cd = (key: "cdLow" | "cdHigh"): string => (/\.\d\d/.test(shown(key)) ? shown(key) : limits[key].toFixed(2));
  switch (flag) {
    case "PRESSURE_OFF_NOMINAL": return `Pressure was more than ${shown("offNominalShare")} % off. Read it again.`;
    case "LEAK_HIGH": return `Leak is over ${shown("leakShare")} % of the reading. Seal the fixture.`;
    case "CD_UNUSUAL": return `Discharge coefficient outside ${cd("cdLow")} to ${cd("cdHigh")}. Check diameter, lift and units.`;
    case "GAIN_UNUSUAL": return `Gain over ${shown("gainShare")} %. Check range and pressure of both tests.`;
    default: return flag in LIFT_FLAGS ? LIFT_FLAGS[flag as LiftFlag] : FLOW_FLAGS[flag as FlowFlag];
  }
}

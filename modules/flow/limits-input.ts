import { z } from "@/modules/kernel/zod";
import { crossedLimits, keptLimit, LIMIT_FACTS, LIMIT_KEYS, SANITY_LIMITS, shownLimit, type OwnLimits, type SanityLimit } from "./domain/sanity-limits";
import { optionalField } from "./typed-field";

const field = (key: SanityLimit) => {
  const { min, max, unit } = LIMIT_FACTS[key];
  return optionalField({ min, max, unit });
};

/** Limits as typed, in the units they are shown in; an empty one is the product's. */
export const flowLimitsInput = z.strictObject({
  version: z.number().int(),
  fallShare: field("fallShare"), zeroLiftExtraCfm: field("zeroLiftExtraCfm"), percentLow: field("percentLow"), percentHigh: field("percentHigh"), cdLow: field("cdLow"), cdHigh: field("cdHigh"),
  offNominalShare: field("offNominalShare"), outlierTimesMedian: field("outlierTimesMedian"), outlierShareMin: field("outlierShareMin"), gainShare: field("gainShare"), zeroDriftMm: field("zeroDriftMm"), leakShare: field("leakShare"),
}).superRefine((typed, ctx) => {
  for (const [low, high] of crossedLimits({ ...SANITY_LIMITS, ...ownOf(typed) })) {
    const upper = typed[high] ?? shownLimit(high, SANITY_LIMITS[high]);
    // Told where something was typed: the lower one, or the upper one over the product's lower.
    if (typed[low] !== null) ctx.addIssue({ code: "custom", path: [low], message: `A number under the upper limit, ${upper} ${LIMIT_FACTS[high].unit}.` });
    else ctx.addIssue({ code: "custom", path: [high], message: `A number over the lower limit, ${shownLimit(low, SANITY_LIMITS[low])} ${LIMIT_FACTS[low].unit}.` });
  }
});

/** The limits that were given, as they are kept. */
export const ownOf = (typed: Readonly<Record<SanityLimit, number | null>>): OwnLimits =>
  Object.fromEntries(LIMIT_KEYS.flatMap((key) => (typed[key] === null ? [] : [[key, keptLimit(key, typed[key])]])));

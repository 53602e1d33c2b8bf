/** What each check of a reading or test is held against unless the owner says otherwise. Common practice, no source. */
export const SANITY_LIMITS = {
  fallShare: 0.01,
  zeroLiftExtraCfm: 0.5,
  /** Percent of full scale. */
  percentLow: 30,
  percentHigh: 98,
  /** Usual band of a coefficient on curtain area (shape of the curves: Heywood (1988) Fig. 6-18, from memory). */
  cdLow: 0.3,
  cdHigh: 0.8,
  offNominalShare: 0.1,
  outlierTimesMedian: 3,
  /** A quarter off the line: wide steps at low lift bend a sound curve by up to 15 %. */
  outlierShareMin: 0.25,
  gainShare: 0.4,
  zeroDriftMm: 0.05,
  leakShare: 0.05,
} as const;
export type SanityLimit = keyof typeof SANITY_LIMITS;
export type SanityLimits = { readonly [K in SanityLimit]: number };
/** What a shop has set itself; the rest is the product's. */
export type OwnLimits = { readonly [K in SanityLimit]?: number };

export interface LimitFacts {
  readonly label: string;
  readonly unit: string;
  /** In the unit it is shown in, ends included. Our choice: beyond them the check would always or never speak. */
  readonly min: number;
  readonly max: number;
  /** Shown for one kept: 100 where a share is shown as percent. */
  readonly times: 1 | 100;
}
export const LIMIT_FACTS: Readonly<Record<SanityLimit, LimitFacts>> = {
  fallShare: { label: "Flow falls to the next lift by more than", unit: "%", min: 0.1, max: 20, times: 100 },
  zeroLiftExtraCfm: { label: "Flow with the valve shut, above the leak, over", unit: "CFM", min: 0, max: 20, times: 1 },
  percentLow: { label: "Read low on the scale: under", unit: "%", min: 0, max: 90, times: 1 },
  percentHigh: { label: "Read at the top of the scale: over", unit: "%", min: 10, max: 100, times: 1 },
  cdLow: { label: "Coefficient on curtain area unusual: under", unit: "Cd", min: 0.05, max: 0.9, times: 1 },
  cdHigh: { label: "Coefficient on curtain area unusual: over", unit: "Cd", min: 0.1, max: 1, times: 1 },
  offNominalShare: { label: "Pressure off the test pressure by more than", unit: "%", min: 2, max: 50, times: 100 },
  outlierTimesMedian: { label: "Reading off the line of its neighbours by more than", unit: "× median", min: 1.5, max: 20, times: 1 },
  outlierShareMin: { label: "And never doubted while off that line by less than", unit: "%", min: 5, max: 100, times: 100 },
  gainShare: { label: "Gain over the before test at a lift over", unit: "%", min: 5, max: 200, times: 100 },
  zeroDriftMm: { label: "Indicator off its zero after the last lift by more than", unit: "mm", min: 0.005, max: 1, times: 1 },
  leakShare: { label: "Leak of the reading over", unit: "%", min: 0.5, max: 50, times: 100 },
};
export const LIMIT_KEYS = Object.keys(SANITY_LIMITS) as SanityLimit[];

/** A limit in the unit it is shown in, without the dust of a binary share. */
export const shownLimit = (key: SanityLimit, kept: number): number => Number((kept * LIMIT_FACTS[key].times).toFixed(6));
/** The other way: a number as typed to the one kept. */
export const keptLimit = (key: SanityLimit, shown: number): number => shown / LIMIT_FACTS[key].times;

/** What a shop set itself, from its settings; anything that is no number within its range is left out. */
export function ownLimits(stored: unknown): OwnLimits {
  const kept = (typeof stored === "object" && stored !== null ? stored : {}) as Record<string, unknown>;
  return Object.fromEntries(LIMIT_KEYS.flatMap((key) => {
    const value = kept[key];
    if (typeof value !== "number") return [];
    const shown = shownLimit(key, value);
    return shown >= LIMIT_FACTS[key].min && shown <= LIMIT_FACTS[key].max ? [[key, value]] : [];
  }));
}

/** The limits that hold: the shop's own over the product's. @param stored as kept in its settings. */
export const sanityLimits = (stored: unknown): SanityLimits => ({ ...SANITY_LIMITS, ...ownLimits(stored) });

const PAIRS: readonly (readonly [SanityLimit, SanityLimit])[] = [["percentLow", "percentHigh"], ["cdLow", "cdHigh"]];
/** Lower limits that do not lie under their upper one, each with that one. */
export const crossedLimits = (limits: SanityLimits): readonly (readonly [SanityLimit, SanityLimit])[] => PAIRS.filter(([low, high]) => limits[low] >= limits[high]);

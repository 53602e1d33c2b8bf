import { maybe, nums } from "./field";

/** Lifts in one unit or the other; the calculations need no more than one unit throughout. */
export const LIFT_FIELDS = {
  lifts_mm: maybe(nums("Lifts", "mm", "1 2 3 4 5 6 7 8 9"), "These or lifts in inches; rising, a space between them."),
  lifts_in: maybe(nums("Lifts", "in", ".100 .200 .300 .350 .375 .400 .450"), "These or lifts in mm."),
};
export const LIFTS_ALONG = ["lifts_mm", "lifts_in"];
export const EITHER_LIFTS = { of: [["lifts_mm"], ["lifts_in"]] };

/** What stands for a lift in either unit: `lifts_mm` or `lifts_in`, whichever was given. */
export const inEither = <T>(mm: T | undefined, inches: T | undefined, none: T): T => mm ?? inches ?? none;

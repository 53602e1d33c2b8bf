/** What the engine is used for. Recorded as the customer says it, never judged. */
export const USES = ["road", "closed_course", "other"] as const;
export type Use = (typeof USES)[number];

export const USE_WORDS: Record<Use, string> = { road: "Road", closed_course: "Closed course", other: "Other" };

/**
 * Shown while the order is written and printed on the estimate when the engine is used on the road.
 * Source: Clean Air Act section 203(a)(3), 42 U.S.C. 7522.
 */
export const ROAD_CAUTION =
  "Road use: removing or defeating emission controls on a certified road vehicle is prohibited (42 U.S.C. 7522(a)(3)). Local noise and inspection rules may ask for more; follow them.";

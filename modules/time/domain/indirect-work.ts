/** Bench time that belongs to no operation. */
export const INDIRECT_WORK = [
  "clean-up",
  "bench set-up",
  "waiting for parts",
  "waiting for instruction",
  "waiting for machine",
  "training",
  "meeting",
  "shop maintenance",
  "development",
  "counter help",
  "shipping",
] as const;
export type IndirectWork = (typeof INDIRECT_WORK)[number];

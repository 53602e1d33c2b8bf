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
  // A rest of 5 to about 20 minutes is work time (29 CFR 785.18): it stays on the clock and is counted as paid break.
  "break",
] as const;
export type IndirectWork = (typeof INDIRECT_WORK)[number];

/** Paid rest, counted apart from other indirect time. */
export const PAID_BREAK: IndirectWork = "break";

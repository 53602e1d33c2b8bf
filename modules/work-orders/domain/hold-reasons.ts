/** Why work on a piece stands still. */
export const HOLD_REASONS = ["customer answer", "parts", "outside service", "machine", "payment", "quality", "safety"] as const;
export type HoldReason = (typeof HOLD_REASONS)[number];

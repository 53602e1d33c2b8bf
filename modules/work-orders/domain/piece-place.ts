/** Where a piece is, in plain words. Always derived from facts, never typed. */
export const PIECE_PLACES = [
  "asked about",
  "priced",
  "agreed",
  "on its way in",
  "booked in",
  "torn down",
  "in work",
  "held",
  "proved",
  "released",
  "at the counter",
  "gone",
  "stopped",
  "returned undone",
  "scrapped by agreement",
  "left behind",
] as const;
export type PiecePlace = (typeof PIECE_PLACES)[number];

/** Days after ready at which the last reminder has gone out and the piece counts as left behind (shop rule). */
const LEFT_BEHIND_DAYS = 60;

/** What has happened to one piece. Dates are kept elsewhere; here only whether it is so. */
export interface PieceFacts {
  readonly isEstimateSent: boolean;
  readonly isApproved: boolean;
  /** The customer said it is sent, or a carrier number is known. */
  readonly isAnnounced: boolean;
  readonly isBookedIn: boolean;
  readonly isTornDown: boolean;
  /** A bench entry or a reading on any operation after teardown. */
  readonly isWorkStarted: boolean;
  readonly hasOpenHold: boolean;
  /** Final flow and final inspection passed. */
  readonly isProved: boolean;
  readonly isReleased: boolean;
  /** Packed, or laid out for pickup. */
  readonly isPacked: boolean;
  /** Whole days since the customer was told it is ready; null before. */
  readonly daysSinceReady: number | null;
  readonly isGone: boolean;
  /** How it ended early, if it did. */
  readonly ended: "stopped" | "returned undone" | "scrapped by agreement" | null;
}

/**
 * The furthest fact wins, with three exceptions: a side exit ends the walk; an open hold shows until release;
 * a ready piece nobody fetched is left behind.
 */
export function placeOf(f: PieceFacts): PiecePlace {
  if (f.ended) return f.ended === "stopped" && f.isGone ? "gone" : f.ended;
  if (f.isGone) return "gone";
  if (f.isReleased && f.daysSinceReady !== null && f.daysSinceReady >= LEFT_BEHIND_DAYS) return "left behind";
  if (f.isReleased) return f.isPacked ? "at the counter" : "released";
  if (f.hasOpenHold && f.isBookedIn) return "held";
  if (f.isProved) return "proved";
  if (f.isWorkStarted) return "in work";
  if (f.isTornDown) return "torn down";
  if (f.isBookedIn) return "booked in";
  if (f.isAnnounced && f.isApproved) return "on its way in";
  if (f.isApproved) return "agreed";
  return f.isEstimateSent ? "priced" : "asked about";
}

/** More than this between the two ways to count how long the question took, and the tablet's clock was set meanwhile. */
const STEP_MS = 500;

/**
 * How far the shop's clock is ahead of the tablet's, ms, by the answer's time against the middle of question and answer
 * (as in RFC 5905, section 8, with one server stamp). Null when the tablet's clock was set between the two: `elapsedMs`,
 * counted by a clock that is never set, then differs from what the wall clock says.
 */
export function clockOffset({ sentAt, receivedAt, elapsedMs, serverAt }: { sentAt: number; receivedAt: number; elapsedMs: number; serverAt: number }): number | null {
  if (Math.abs(receivedAt - sentAt - elapsedMs) > STEP_MS) return null;
  return Math.round(serverAt - (sentAt + receivedAt) / 2);
}

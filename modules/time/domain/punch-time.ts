/** The tablet's clock may be this far off before a punch is flagged. */
const SKEW_SECONDS_MAX = 120;
/** A punch that arrives later than this after the tap was kept on the tablet meanwhile; up to here it is live. */
export const LIVE_SECONDS_MAX = 15;
/** Older than this is not taken as time without somebody looking at it. */
const KEPT_DAYS_MAX = 14;

export interface PunchTime {
  /** The instant that counts, to the second. */
  readonly at: Date;
  readonly isLate: boolean;
  readonly flags: readonly ("tablet clock off" | "tablet clock ahead" | "very late")[];
}

/**
 * When a tap happened. The server's clock rules: the tablet's time is put right by the offset the tablet measured at its
 * last answer (server less tablet, ms), and a time that has not come counts now. Instants are cut to the second.
 */
export function punchTime(p: { readonly now: Date; readonly deviceAt: Date | null; readonly offsetMs: number | null }): PunchTime {
  const now = toSecond(p.now);
  if (p.deviceAt === null) return { at: now, isLate: false, flags: [] };
  const offset = p.offsetMs ?? 0;
  const tapped = toSecond(new Date(p.deviceAt.getTime() + offset));
  const flags: PunchTime["flags"][number][] = Math.abs(offset) > SKEW_SECONDS_MAX * 1000 ? ["tablet clock off"] : [];
  const late = (now.getTime() - tapped.getTime()) / 1000;
  if (late < -SKEW_SECONDS_MAX) flags.push("tablet clock ahead");
  if (late <= LIVE_SECONDS_MAX) return { at: late > 0 ? tapped : now, isLate: false, flags };
  if (late > KEPT_DAYS_MAX * 86_400) flags.push("very late");
  return { at: tapped, isLate: true, flags };
}

const toSecond = (d: Date): Date => new Date(Math.floor(d.getTime() / 1000) * 1000);

/** Kinds of loose parts counted when a piece is booked in. A count is a whole number of pieces. */
export const TRAY_KINDS = ["valves", "springs", "retainers", "keepers", "shims", "spring seats", "cams", "buckets", "bolts"] as const;
export type TrayKind = (typeof TRAY_KINDS)[number];
export type TrayCounts = Partial<Record<TrayKind, number>>;

/** `4 valves, 4 springs, 8 keepers`; `no loose parts` when nothing came. */
export function trayText(counts: Readonly<Record<string, number>>): string {
  const came = TRAY_KINDS.flatMap((k) => ((counts[k] ?? 0) > 0 ? [`${counts[k] ?? 0} ${k}`] : []));
  return came.length === 0 ? "no loose parts" : came.join(", ");
}

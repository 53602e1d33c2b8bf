/** How far a purchase order has come in, read from its lines. */
export type HowFar = "draft" | "sent" | "partly in" | "in" | "cancelled";

export function howFar(state: string, lines: readonly { readonly qtyMilli: number; readonly receivedMilli: number }[]): HowFar {
  if (state === "draft" || state === "cancelled") return state;
  if (lines.length > 0 && lines.every((l) => l.receivedMilli >= l.qtyMilli)) return "in";
  return lines.some((l) => l.receivedMilli > 0) ? "partly in" : "sent";
}

/**
 * What of a delivery goes on the shelf. More than was ordered goes in only when it is kept.
 * Null when there is too much and nobody said what becomes of it.
 */
export function takeIn(openMilli: number, cameMilli: number, over: "" | "keep" | "return" | "refuse"): { inMilli: number; overMilli: number } | null {
  const overMilli = Math.max(0, cameMilli - Math.max(0, openMilli));
  if (overMilli === 0) return { inMilli: cameMilli, overMilli: 0 };
  if (over === "") return null;
  return { inMilli: over === "keep" ? cameMilli : cameMilli - overMilli, overMilli };
}

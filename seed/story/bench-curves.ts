import { HERO_FLOW, HERO_LIFTS } from "../facts/hero";

/**
 * Invented readings of other heads: the hero's curve, scaled, with another shape of gain each, so that lists and charts
 * show good jobs, small gains and a loss at low lift on some exhaust ports.
 */
export function bench(side: "intake" | "exhaust", purpose: "baseline" | "after", salt: number): { lift: string; value: string }[] {
  const scale = 0.86 + (salt % 11) * 0.035;
  const strength = 0.35 + (salt % 7) * 0.16;
  return HERO_LIFTS.map((lift, i) => {
    const before = Number(HERO_FLOW[side].baseline[i] ?? 0) * scale;
    const gain = (Number(HERO_FLOW[side].after[i] ?? 0) - Number(HERO_FLOW[side].baseline[i] ?? 0)) * scale * strength;
    const lowLiftLoss = side === "exhaust" && salt % 4 === 1 && i < 2 ? -(0.9 - i * 0.4) : 0;
    return { lift, value: (purpose === "baseline" ? before : before + (lowLiftLoss || gain)).toFixed(1) };
  });
}

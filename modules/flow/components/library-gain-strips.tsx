import { decimal } from "@/modules/kernel/format";
import type { LiftGains } from "../domain/family-gains";
import type { LiftUnit } from "../domain/lift-ladder";
import { differenceText, liftWords } from "./flow-words";

const [ROW, TOP] = [34, 34];

/** Dots of 4 px radius in one outline: ten ports at 24 lifts would be a lot of circles. */
const dotsAt = (xs: readonly number[], y: number) => xs.map((x) => `M${(x - 4).toFixed(1)} ${y}a4 4 0 1 0 8 0a4 4 0 1 0 -8 0`).join("");

/** One strip a lift: a dot for each port's gain, the middle as a bar, losses left of zero as open dots with their number in words. */
export function LibraryGainStrips({ gains, unit, locale, names, flowUnit = "CFM", width = 620 }: { gains: readonly LiftGains[]; unit: LiftUnit; flowUnit?: string; locale: string; names: string; width?: number }) {
  if (gains.length === 0) return <p className="mid">No port of these heads could be compared before and after, so there is no gain to show.</p>;
  const isSmall = width < 480;
  const [left, right] = isSmall ? [48, 92] : [64, 132];
  const all = gains.flatMap((g) => g.dots.map((d) => d.gainCfm));
  const [low, high] = [Math.min(0, ...all), Math.max(1, ...all)];
  const pad = (high - low) * 0.04;
  const x = (v: number) => left + 10 + ((v - low + pad) / (high - low + 2 * pad)) * (width - left - right - 20);
  const height = TOP + gains.length * ROW + 30;
  const bottom = TOP + gains.length * ROW;
  const step = [0.5, 1, 2, 5, 10, 20, 50].find((s) => (high - low) / s <= 9) ?? 100;
  const ticks = Array.from({ length: Math.floor(high / step) - Math.ceil(low / step) + 1 }, (_, i) => (Math.ceil(low / step) + i) * step);
  const words = gains.map((g) => `${liftWords(g.liftUm, unit, locale)} ${unit}: middle ${differenceText(g.medianCfm, locale)} ${flowUnit} of ${g.n}${g.losses > 0 ? `, ${g.losses} lost` : ""}`).join("; ");
  return (
    <svg className="ch" viewBox={`0 0 ${width} ${height}`} role="img" aria-label={`Gain at each lift of ${names}. ${words}.`}>
      {ticks.map((t) => (
        <g key={t}><path className={t === 0 ? "ax" : "gr"} d={`M${x(t)} ${TOP - 8}V${bottom}`} /><text x={x(t)} y={bottom + 18} textAnchor="middle">{t > 0 ? "+" : ""}{decimal(t, step < 1 ? 1 : 0, locale).replace("-", "−")}</text></g>
      ))}
      <text className="eng" x={left - 10} y={14} textAnchor="end">{`LIFT, ${unit.toUpperCase()}`}</text>
      <text className="eng" x={x(0) + 8} y={14}>{`GAIN, ${flowUnit}`}</text>
      <text className="eng" x={width - 4} y={14} textAnchor="end">{isSmall ? "MIDDLE, N" : "MIDDLE, PORTS"}</text>
      {gains.map((g, i) => {
        const y = TOP + i * ROW + ROW / 2 - 4;
        return (
          <g key={g.liftUm} opacity={g.isThin ? 0.55 : 1}>
            <text className="lab" x={left - 10} y={y + 4} textAnchor="end">{liftWords(g.liftUm, unit, locale)}</text>
            <path className="gr" d={`M${left} ${y + ROW / 2}H${width}`} />
            {g.isThin ? null : <rect x={Math.min(x(0), x(g.medianCfm))} y={y - 7} width={Math.max(1, Math.abs(x(g.medianCfm) - x(0)))} height={14} className={g.medianCfm > 0 ? "gain" : undefined} fill={g.medianCfm > 0 ? undefined : "none"} stroke="var(--ink)" strokeWidth={1} />}
            <path className="pt" d={dotsAt(g.dots.filter((d) => d.gainCfm >= 0).map((d) => x(d.gainCfm)), y)} />
            {g.losses === 0 ? null : <path className="pw" d={dotsAt(g.dots.filter((d) => d.gainCfm < 0).map((d) => x(d.gainCfm)), y)} />}
            <text className="lab" x={width - 52} y={y + 4} textAnchor="end">{differenceText(g.medianCfm, locale)}</text>
            <text x={width - 4} y={y + 4} textAnchor="end">{g.losses > 0 ? `${g.n}, ▼${g.losses}` : g.n}</text>
          </g>
        );
      })}
    </svg>
  );
}

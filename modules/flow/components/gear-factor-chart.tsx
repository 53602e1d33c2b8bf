import { decimal } from "@/modules/kernel/format";
import { factorScale } from "../domain/factor-scale";

export interface FactorPoint { at: string; factor: number; drifted: boolean }

const [W, H, LEFT, RIGHT, TOP, BOTTOM] = [520, 150, 52, 12, 14, 118];

/** Bench factor over time, oldest left, each check a dot joined by steps: a factor holds until the next check. */
export function GearFactorChart({ points, locale, dateText }: { points: readonly FactorPoint[]; locale: string; dateText: (iso: string) => string }) {
  const [first, last] = [points[0], points.at(-1)];
  if (!first || !last) return null;
  const factors = points.map((p) => p.factor);
  const { low, high, ticks, digits } = factorScale(factors);
  const span = Math.max(1, Date.parse(last.at) - Date.parse(first.at));
  const x = (iso: string) => (points.length === 1 ? (LEFT + W - RIGHT) / 2 : LEFT + ((Date.parse(iso) - Date.parse(first.at)) / span) * (W - RIGHT - LEFT));
  const y = (f: number) => BOTTOM - ((f - low) / (high - low)) * (BOTTOM - TOP);
  const steps = points.map((p, i) => (i === 0 ? `M${x(p.at)} ${y(p.factor)}` : `H${x(p.at)}V${y(p.factor)}`)).join("");
  const [begun, ended] = [dateText(first.at), dateText(last.at)];
  const label = `Bench factor over ${points.length} check${points.length === 1 ? "" : "s"}: from ${decimal(first.factor, 4, locale)} on ${begun} to ${decimal(last.factor, 4, locale)} on ${ended}. The axis does not begin at zero.`;
  return (
    <svg className="ch max-w-[720px]" viewBox={`0 0 ${W} ${H}`} role="img" aria-label={label}>
      {ticks.map((t) => (
        <g key={t}>
          <path className="gr" d={`M${LEFT} ${y(t)}H${W - RIGHT}`} />
          <text x={LEFT - 8} y={y(t) + 4} textAnchor="end">{decimal(t, digits, locale)}</text>
        </g>
      ))}
      {/* The axis is broken: it does not reach zero. */}
      <path className="ax" d={`M${LEFT} ${TOP - 6}V${BOTTOM - 8}l-5 3l10 4l-5 3V${BOTTOM + 8}H${W - RIGHT}`} />
      <path className="aft" d={steps} />
      {points.map((p) => (p.drifted
        ? <path key={p.at} className="inv" d={`M${x(p.at)} ${y(p.factor) - 7}l7 12h-14Z`} />
        : <circle key={p.at} className="pt" cx={x(p.at)} cy={y(p.factor)} r={3.4} />))}
      {/* Checks of one day have one date under them. */}
      {begun === ended ? <text x={(LEFT + W - RIGHT) / 2} y={H - 4} textAnchor="middle">{begun}</text> : <><text x={LEFT} y={H - 4}>{begun}</text><text x={W - RIGHT} y={H - 4} textAnchor="end">{ended}</text></>}
    </svg>
  );
}

import { decimal } from "@/modules/kernel/format";
import { curveScale, flowTicks, liftTicks } from "../domain/curve-scale";
import { curveSegments, drawnCurve } from "../domain/drawn-curve";
import type { LiftUnit } from "../domain/lift-ladder";
import { noiseBand, type LiftMargin } from "../domain/noise-band";
import { pathText } from "../domain/path-segments";
import type { LiftReading } from "../domain/repeats";
import { flowText, liftWords } from "./flow-words";

export interface NamedCurve { name: string; readings: readonly LiftReading[]; /** thin, thick, or thick and broken */ look: "thin" | "thick" | "dash" }

/**
 * Any curves over each other, named at their ends. Both axes begin at zero; the curve is the monotone one through the readings.
 * With `margins` the dotted band about the first curve is the noise: a difference that stays in it cannot be told from nothing.
 */
export function LibraryCurves({ curves, unit, atInH2O, camLiftUm, locale, title, margins = [], width = 620, height = 340 }: {
  curves: readonly NamedCurve[]; margins?: readonly LiftMargin[]; unit: LiftUnit; atInH2O: number; camLiftUm: number | null; locale: string; title: string; width?: number; height?: number;
}) {
  const plot = { left: 46, right: width - (width < 480 ? 96 : 150), top: 34, bottom: height - 46 };
  const all = curves.flatMap((c) => c.readings);
  if (all.length === 0) return <p className="hint">Nothing has been read here yet.</p>;
  const text = (v: number, d: number) => decimal(v, d, locale);
  const bandTops = (curves[0]?.readings ?? []).map((r) => r.flowCfm + (margins.find((m) => m.liftUm === r.liftUm)?.marginCfm ?? 0));
  const scale = curveScale(plot, [...all.map((r) => r.liftUm), camLiftUm ?? 0], [...all.map((r) => r.flowCfm), ...bandTops]);
  const drawn = curves.flatMap((c) => {
    const made = drawnCurve(c.readings);
    const last = made.ok ? made.value.readings.at(-1) : undefined;
    return made.ok && last ? [{ ...c, curve: made.value, path: pathText(curveSegments(made.value, scale)), last }] : [];
  });
  const first = drawn.find((c) => c.name === curves[0]?.name);
  const band = first ? noiseBand(first.curve, margins, scale) : { outlines: [], bars: [] };
  // Names keep 15 px between them, from the highest line down.
  const names = [...drawn].sort((p, q) => q.last.flowCfm - p.last.flowCfm).reduce<((typeof drawn)[number] & { labelY: number })[]>((set, c) => [
    ...set, { ...c, labelY: Math.max(scale.y(c.last.flowCfm) + 4, (set.at(-1)?.labelY ?? -Infinity) + 15) },
  ], []);
  const words = drawn.map((c) => `${c.name}: ${c.readings.length} lifts, ${flowText(c.last.flowCfm, locale)} CFM at ${liftWords(c.last.liftUm, unit, locale)} ${unit}`).join("; ");
  const noiseWords = first && band.bars.length > 0 ? ` Band of the measurement noise about ${first.name}: ${band.bars.map((b) => `±${flowText(b.marginCfm, locale)} at ${liftWords(b.liftUm, unit, locale)}`).join(", ")}.` : "";
  return (
    <svg className="ch" viewBox={`0 0 ${width} ${height}`} role="img" aria-label={`${title}. ${words}.${noiseWords}`}>
      {flowTicks(scale, width < 480 ? 5 : 8, text).map((t) => (
        <g key={t.flowCfm}>{t.flowCfm === 0 ? null : <path className="gr" d={`M${plot.left} ${t.y}H${plot.right}`} />}<text x={plot.left - 8} y={t.y + 4} textAnchor="end">{t.text}</text></g>
      ))}
      {band.outlines.map((segments) => { const d = pathText(segments); return <path key={d} className="band" d={d} />; })}
      {band.bars.map((b) => <path key={b.liftUm} className="bar-u" d={`M${b.x - 3} ${b.top}h6M${b.x} ${b.top}V${b.bottom}M${b.x - 3} ${b.bottom}h6`} />)}
      {liftTicks(scale, unit, text).map((t) => (
        <g key={t.liftUm}><path className="tk" d={`M${t.x} ${plot.bottom}v${t.lengthPx}`} />{t.text === undefined ? null : <text x={t.x} y={plot.bottom + 22} textAnchor="middle">{t.text}</text>}</g>
      ))}
      <path className="ax" d={`M${plot.left} ${plot.top - 6}V${plot.bottom}H${plot.right}`} />
      {camLiftUm === null ? null : (
        <g><path className="cam" d={`M${scale.x(camLiftUm)} ${plot.top - 4}V${plot.bottom}`} /><text x={scale.x(camLiftUm)} y={plot.top - 10} textAnchor="middle">Cam lift {liftWords(camLiftUm, unit, locale)}</text></g>
      )}
      {drawn.map((c) => <path key={c.name} className={c.look === "thin" ? "base" : c.look === "dash" ? "aft dash" : "aft"} d={c.path} />)}
      {drawn.filter((c) => c.look !== "thin").flatMap((c) => c.readings.map((r) => <circle key={`${c.name}${r.liftUm}`} className={c.look === "dash" ? "pw" : "pt"} cx={scale.x(r.liftUm)} cy={scale.y(r.flowCfm)} r={3} />))}
      {names.map((c) => <text key={c.name} className={c.look === "thin" ? undefined : "lab"} x={scale.x(c.last.liftUm) + 10} y={c.labelY}>{c.name}</text>)}
      <text className="eng" x={plot.left} y={14}>{`CFM AT ${atInH2O} IN H₂O`}</text>
      <text className="eng" x={plot.right} y={height - 4} textAnchor="end">{`VALVE LIFT, ${unit.toUpperCase()}`}</text>
    </svg>
  );
}

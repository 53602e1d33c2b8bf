import { decimal } from "@/modules/kernel/format";
import { engravedAxis, type Units } from "../domain/curve-measure";
import { curveScale, flowTicks, liftTicks } from "../domain/curve-scale";
import { curveSegments, drawnCurve } from "../domain/drawn-curve";
import { overlaps, segmentMeets, type Rect } from "../domain/label-placement";
import type { LiftUnit } from "../domain/lift-ladder";
import { textWidthPx } from "../domain/line-end-labels";
import { neighbours } from "../domain/neighbours";
import { noiseBand, type LiftMargin } from "../domain/noise-band";
import { pathText } from "../domain/path-segments";
import type { LiftReading } from "../domain/repeats";
import { sampledPath } from "../domain/sampled-path";
import { unitWords } from "./unit-words";

export interface NamedCurve { name: string; readings: readonly LiftReading[]; /** thin, thick, or thick and broken */ look: "thin" | "thick" | "dash" }

/** Above or below its line's end, first where no other line runs through the name. */
const NAME_DY = [4, -10, 20, -24, 34, -38, 48];
const NAME_PX = 15;

/**
 * Any curves over each other, named at their ends. Both axes begin at zero; the curve is the monotone one through the readings.
 * With `margins` the dotted band about the first curve is the noise: a difference that stays in it cannot be told from nothing.
 */
export function LibraryCurves({ curves: read, unit: readUnit, atInH2O, camLiftUm, locale, title, margins: readMargins = [], units = "read", width = 620, height = 340 }: {
  curves: readonly NamedCurve[]; margins?: readonly LiftMargin[]; unit: LiftUnit; atInH2O: number; camLiftUm: number | null; locale: string; title: string; units?: Units; width?: number; height?: number;
}) {
  const w = unitWords(units, readUnit, locale);
  const unit = w.liftUnit;
  const curves = read.map((c) => ({ ...c, readings: c.readings.map((r) => ({ liftUm: r.liftUm, flowCfm: r.flowCfm * w.perCfm })) }));
  const margins = readMargins.map((m) => ({ ...m, marginCfm: m.marginCfm * w.perCfm }));
  const plot = { left: 46, right: width - (width < 480 ? 96 : 150), top: 34, bottom: height - 46 };
  const all = curves.flatMap((c) => c.readings);
  if (all.length === 0) return <p className="hint">Nothing has been read here yet.</p>;
  const text = (v: number, d: number) => decimal(v, d, locale);
  const bandTops = (curves[0]?.readings ?? []).map((r) => r.flowCfm + (margins.find((m) => m.liftUm === r.liftUm)?.marginCfm ?? 0));
  const scale = curveScale(plot, [...all.map((r) => r.liftUm), camLiftUm ?? 0], [...all.map((r) => r.flowCfm), ...bandTops]);
  const drawn = curves.flatMap((c) => {
    const made = drawnCurve(c.readings);
    const last = made.ok ? made.value.readings.at(-1) : undefined;
    return made.ok && last ? [{ ...c, curve: made.value, segments: curveSegments(made.value, scale), last }] : [];
  });
  const first = drawn.find((c) => c.name === curves[0]?.name);
  const band = first ? noiseBand(first.curve, margins, scale) : { outlines: [], bars: [] };
  // Names keep clear of each other and, where there is room, of the lines; from the highest line's end down.
  const edges = drawn.flatMap((c) => sampledPath(c.segments)).flatMap((path) => neighbours(path));
  const names = [...drawn].sort((p, q) => q.last.flowCfm - p.last.flowCfm).reduce<{ name: string; look: NamedCurve["look"]; box: Rect; x: number; y: number; end: number }[]>((set, c) => {
    const [x, end] = [scale.x(c.last.liftUm) + 10, scale.y(c.last.flowCfm)];
    const boxAt = (y: number): Rect => ({ x, y: y - 11, width: textWidthPx(c.name), height: NAME_PX });
    const free = NAME_DY.map((dy) => end + dy).filter((y) => set.every((n) => !overlaps(n.box, boxAt(y))));
    const y = free.find((at) => edges.every(([p, q]) => !segmentMeets(p, q, boxAt(at)))) ?? free[0] ?? end + 4;
    return [...set, { name: c.name, look: c.look, box: boxAt(y), x, y, end }];
  }, []);
  const words = drawn.map((c) => `${c.name}: ${c.readings.length} lifts, ${text(c.last.flowCfm, 1)} ${w.flowUnit} at ${w.lift(c.last.liftUm)} ${unit}`).join("; ");
  const noiseWords = first && band.bars.length > 0 ? ` Band of the measurement noise about ${first.name}: ${band.bars.map((b) => `±${text(b.marginCfm, 1)} at ${w.lift(b.liftUm)}`).join(", ")}.` : "";
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
        <g><path className="cam" d={`M${scale.x(camLiftUm)} ${plot.top - 4}V${plot.bottom}`} /><text x={scale.x(camLiftUm)} y={plot.top - 10} textAnchor="middle">Cam lift {w.lift(camLiftUm)}</text></g>
      )}
      {drawn.map((c) => <path key={c.name} className={c.look === "thin" ? "base" : c.look === "dash" ? "aft dash" : "aft"} d={pathText(c.segments)} />)}
      {drawn.flatMap((c) => c.readings.map((r) => <circle key={`${c.name}${r.liftUm}`} className={c.look === "dash" ? "pw" : c.look === "thin" ? "pt bf" : "pt"} cx={scale.x(r.liftUm)} cy={scale.y(r.flowCfm)} r={c.look === "thin" ? 2 : 3} />))}
      {names.map((c) => (
        <g key={c.name}>
          {Math.abs(c.y - 4 - c.end) > 8 ? <path className="ld" d={`M${c.x - 6} ${c.end}L${c.x - 2} ${c.y - 4}`} /> : null}
          <text className={c.look === "thin" ? undefined : "lab"} x={c.x} y={c.y}>{c.name}</text>
        </g>
      ))}
      <text className="eng" x={plot.left} y={14}>{engravedAxis(`${w.flowUnit} at ${w.pressure(atInH2O)}`)}</text>
      <text className="eng" x={plot.right} y={height - 4} textAnchor="end">{`VALVE LIFT, ${unit.toUpperCase()}`}</text>
    </svg>
  );
}

import clsx from "clsx";
import { useId } from "react";
import { decimal } from "@/modules/kernel/format";
import { curveGeometry, type CurveGeometry, type CurveLine } from "../domain/curve-geometry";
import { engravedAxis, type CurveMeasure } from "../domain/curve-measure";
import type { LiftUnit } from "../domain/lift-ladder";

export interface GainCurveProps {
  lines: readonly CurveLine[];
  unit: LiftUnit;
  atInH2O: number;
  camLiftUm: number | null;
  width: number;
  height: number;
  locale: string;
  /** Default: flow in CFM. The figures of `lines` are then of this measure. */
  measure?: CurveMeasure;
  /** Default: narrower than 480. */
  mini?: boolean;
  /** A mark at one lift, set by whoever reads the curve. */
  readAtUm?: number | null;
  className?: string;
}

/** Room for a leader between the plot and its labels. */
const LABELS = { columnPx: 15 } as const;

/** The geometry a `GainCurve` draws, for what is laid over it. Null when it cannot be drawn. */
export function geometryOf(p: Pick<GainCurveProps, "lines" | "unit" | "atInH2O" | "camLiftUm" | "width" | "height" | "locale" | "mini" | "measure">): CurveGeometry | null {
  const made = curveGeometry({
    widthPx: p.width, heightPx: p.height, unit: p.unit, atInH2O: p.atInH2O, camLiftUm: p.camLiftUm, lines: p.lines, decimalText: (v, d) => decimal(v, d, p.locale), ...(p.mini === undefined ? {} : { mini: p.mini }), ...(p.measure ? { measure: p.measure } : {}), labels: LABELS,
  });
  return made.ok ? made.value : null;
}

/**
 * Flow against lift, before and after, intake and exhaust: plain SVG, the same on the server and in the browser. The gain is
 * the fluid between the lines; a loss is hatched and plated; a withheld gain leaves the space between them empty. The dotted band
 * about before is the noise: a change that stays in it cannot be told from nothing.
 */
export function GainCurve(props: GainCurveProps) {
  const hatch = useId().replaceAll(":", "");
  const g = geometryOf(props);
  if (!g) return <p className="hint">These readings cannot be drawn as a curve. The table beside has them.</p>;
  const mark = props.readAtUm === null || props.readAtUm === undefined ? null : g.points.filter((p) => p.liftUm === props.readAtUm);
  return (
    <svg className={clsx("ch", props.className)} viewBox={`0 0 ${g.widthPx} ${g.heightPx}`} role="img" aria-label={g.description}>
      <defs>
        <pattern id={hatch} width="5" height="5" patternUnits="userSpaceOnUse" patternTransform="rotate(45)">
          <rect width="1.6" height="5" fill="var(--ink)" />
        </pattern>
      </defs>
      {g.flowTicks.map((t) => (
        <g key={t.flowCfm}>
          {t.flowCfm === 0 ? null : <path className="gr" d={`M${g.plot.left} ${t.y}H${g.plot.right}`} />}
          <text x={g.plot.left - 8} y={t.y + 4} textAnchor="end">{t.text}</text>
        </g>
      ))}
      {g.areas.map((a) => (
        <path key={`${a.side}${a.path}`} className={a.kind === "gain" ? (a.side === "intake" ? "gain" : "gain2") : undefined} fill={a.kind === "loss" ? `url(#${hatch})` : undefined} d={a.path} />
      ))}
      {g.bands.map((b) => <path key={`${b.side}${b.path}`} className="band" d={b.path} />)}
      {g.bars.map((b) => <path key={`${b.side}${b.liftUm}`} className="bar-u" d={`M${b.x - 3} ${b.top}h6M${b.x} ${b.top}V${b.bottom}M${b.x - 3} ${b.bottom}h6`} />)}
      {g.liftTicks.map((t) => (
        <g key={t.liftUm}>
          <path className="tk" d={`M${t.x} ${g.plot.bottom}v${t.lengthPx}`} />
          {t.text === undefined ? null : <text x={t.x} y={g.plot.bottom + 22} textAnchor="middle">{t.text}</text>}
        </g>
      ))}
      <path className="ax" d={`M${g.plot.left} ${g.plot.top - 6}V${g.plot.bottom}H${g.plot.right}`} />
      {g.cam === null ? null : (
        <g>
          <path className="cam" d={`M${g.cam.x} ${g.cam.top}V${g.cam.bottom}`} />
          {g.cam.plate === null ? null : (
            <>
              <path className="inv" d={g.cam.plate.path} />
              <text className="invt" x={g.cam.plate.textX} y={g.cam.plate.textY} textAnchor="middle">{g.cam.text}</text>
            </>
          )}
        </g>
      )}
      {g.lines.map((l) => <path key={`${l.side}${l.when}`} className={clsx(l.when === "before" ? "base" : "aft", l.isDashed && "dash")} d={l.path} />)}
      {mark === null || mark[0] === undefined ? null : <path className="rd" d={`M${mark[0].x} ${g.plot.top}V${g.plot.bottom}`} />}
      {g.points.map((p) => (
        <circle key={`${p.side}${p.when}${p.liftUm}`} className={clsx(p.isFilled ? "pt" : "pw", p.when === "before" && !mark?.includes(p) && "bf")} cx={p.x} cy={p.y} r={mark?.includes(p) ? p.radiusPx + 1.6 : p.radiusPx} />
      ))}
      {g.losses.map((m) => (m.plate === null ? null : (
        <g key={`${m.side}${m.liftUm}`}>
          {m.leader === null ? null : <path className="tk" d={`M${m.leader.x1} ${m.leader.y1}L${m.leader.x2} ${m.leader.y2}`} />}
          <path className="inv" d={`M${m.plate.x} ${m.plate.y}h${m.plate.width}v${m.plate.height}h-${m.plate.width}Z`} />
          <text className="invt" x={m.plate.textX} y={m.plate.textY} textAnchor="middle">{m.text}</text>
        </g>
      )))}
      {g.labels.map((l) => (l.leader === null ? null : <path key={l.key} className="ld" d={`M${l.leader.x1} ${l.leader.y1}L${l.leader.x2} ${l.leader.y2}`} />))}
      {g.labels.map((l) => l.lines.map((text, i) => (
        <text key={`${l.key}${i}`} className={i === 0 && (l.key.endsWith("after") || g.mini) ? "lab" : undefined} x={l.x} y={l.y + i * 14}>{text}</text>
      )))}
      {g.flowTitle === null ? null : <text className="eng" x={g.flowTitle.x} y={g.flowTitle.y} textAnchor={g.flowTitle.anchor}>{engravedAxis(g.flowTitle.text)}</text>}
      {g.liftTitle === null ? null : <text className="eng" x={g.liftTitle.x} y={g.liftTitle.y} textAnchor={g.liftTitle.anchor}>{g.liftTitle.text.toUpperCase()}</text>}
    </svg>
  );
}

import type { CurveLine } from "../domain/curve-geometry";
import { marginsOf } from "../domain/noise-band";
import type { LiftReading } from "../domain/repeats";
import type { PortGain, SideGain } from "../domain/side-gain";

const half = (gain: SideGain, when: "before" | "after"): LiftReading[] => {
  if (gain.state === "absent") return [];
  const unpaired = gain.state === "comparable" ? gain.unpairedRows : [];
  return [...gain.rows, ...unpaired].flatMap((row) => {
    const flowCfm = when === "before" ? row.beforeCfm : row.afterCfm;
    return flowCfm === null ? [] : [{ liftUm: row.liftUm, flowCfm }];
  });
};

/** What a curve may say of a side: the gain with the noise about it, or neither. */
export const shownOf = (gain: SideGain | null): Pick<CurveLine, "gain" | "margins"> => (gain?.comparable ? { gain: "shown", margins: marginsOf(gain.noise?.rows ?? []) } : { gain: "withheld" });

/** The same curves in another unit of flow. */
export const scaledLines = (lines: readonly CurveLine[], by: number): CurveLine[] => {
  const scaled = (list: readonly LiftReading[]) => list.map((r) => ({ ...r, flowCfm: r.flowCfm * by }));
  return lines.map((l) => ({ ...l, before: scaled(l.before), after: scaled(l.after), ...(l.margins ? { margins: l.margins.map((m) => ({ ...m, marginCfm: m.marginCfm * by })) } : {}) }));
};

/** Curve of one side as handed out. */
export const lineOf = (gain: SideGain): CurveLine => ({ side: gain.side, before: half(gain, "before"), after: half(gain, "after"), ...shownOf(gain) });

/** Curves of a port as handed out. A withheld gain draws both curves and nothing between them. */
export const linesOfPort = (port: PortGain): CurveLine[] => [port.intake, port.exhaust].map(lineOf);

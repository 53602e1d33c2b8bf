import type { PortSide } from "./comparison-reasons";
import { flowMeasure, type CurveMeasure } from "./curve-measure";
import { scaleLiftText, type DecimalText } from "./curve-scale";
import { gainAt } from "./gain";
import type { LiftUnit } from "./lift-ladder";
import type { LiftMargin } from "./noise-band";
import type { LiftReading } from "./repeats";

interface DescribedLine {
  readonly side: PortSide;
  readonly before: readonly LiftReading[];
  readonly after: readonly LiftReading[];
  readonly gain: "shown" | "withheld";
  readonly margins?: readonly LiftMargin[];
}
const SIDE_WORDS: Readonly<Record<PortSide, string>> = { intake: "Intake", exhaust: "Exhaust" };

/** The curve in words: each side at its highest lift, and every loss. A withheld gain is not hinted at. */
export function curveDescription(lines: readonly DescribedLine[], unit: LiftUnit, camLiftUm: number | null, decimalText: DecimalText, { digits, what }: Pick<CurveMeasure, "digits" | "what"> = flowMeasure("read", "")): string {
  const lift = (um: number) => scaleLiftText(um, unit, decimalText);
  const highest = (list: readonly LiftReading[]) => list.reduce<LiftReading | null>((top, r) => (top && top.liftUm >= r.liftUm ? top : r), null);
  const sentences = lines.flatMap((line) => {
    const words = SIDE_WORDS[line.side];
    const common = line.before.filter((b) => line.after.some((a) => a.liftUm === b.liftUm));
    const before = highest(common.length > 0 ? common : line.before);
    const after = before ? (line.after.find((a) => a.liftUm === before.liftUm) ?? highest(line.after)) : highest(line.after);
    const parts: string[] = [];
    if (before && after && before.liftUm === after.liftUm) {
      parts.push(`${words} at ${lift(before.liftUm)}: ${decimalText(before.flowCfm, digits)} before, ${decimalText(after.flowCfm, digits)} after.`);
    } else {
      if (before) parts.push(`${words} before at ${lift(before.liftUm)}: ${decimalText(before.flowCfm, digits)}.`);
      if (after) parts.push(`${words} after at ${lift(after.liftUm)}: ${decimalText(after.flowCfm, digits)}.`);
    }
    if (line.gain === "withheld") return parts;
    const losses = [...common].sort((a, b) => a.liftUm - b.liftUm).flatMap((b) => {
      const a = line.after.find((r) => r.liftUm === b.liftUm);
      const gain = a ? gainAt(b.flowCfm, a.flowCfm) : 0;
      return gain < 0 ? [`${words} lost ${decimalText(-gain, digits)} at ${lift(b.liftUm)}.`] : [];
    });
    const band = (line.margins ?? []).map((m) => `±${decimalText(m.marginCfm, 1)} at ${lift(m.liftUm)}${m.byHistory ? " by bench history" : ""}`);
    return [...parts, ...losses, ...(band.length === 0 ? [] : [`Band of the measurement noise about ${words.toLowerCase()} before: ${band.join(", ")}.`])];
  });
  const cam = camLiftUm === null ? [] : [`Cam lift ${lift(camLiftUm)}.`];
  return [`${what} against valve lift.`, ...sentences, ...cam].join(" ");
}

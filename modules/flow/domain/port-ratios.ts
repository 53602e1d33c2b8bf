import { exhaustIntakeRatio, type RatioBasis } from "./exhaust-intake-ratio";
import { interpolateFlow } from "./interpolate-flow";
import type { LiftReading } from "./repeats";
import type { Standing } from "./standing-tests";
import { figuresOfTest } from "./test-figures";

/** Exhaust flow over intake flow of one port, before or after. Never without its basis, and without a target. */
export interface PortRatio {
  readonly when: "before" | "after";
  readonly basis: Extract<RatioBasis, "equal_lift" | "own_cam_lift">;
  readonly percent: number;
  readonly intakeLiftUm: number;
  readonly exhaustLiftUm: number;
}
export interface RatioSet {
  readonly readings: readonly LiftReading[];
  readonly atInH2O: number;
  readonly camLiftUm: number | null;
}
type Both = Readonly<Record<"before" | "after", RatioSet | null>>;

function flowAt({ readings }: RatioSet, liftUm: number | null): number | null {
  if (liftUm === null) return null;
  const flow = interpolateFlow({ lifts: readings.map((r) => r.liftUm), flowsCfm: readings.map((r) => r.flowCfm) }, liftUm);
  return flow.ok ? flow.value : null;
}

function ratioOf(when: PortRatio["when"], basis: PortRatio["basis"], intake: RatioSet, exhaust: RatioSet): PortRatio | null {
  const common = exhaust.readings.filter((e) => intake.readings.some((i) => i.liftUm === e.liftUm)).at(-1)?.liftUm ?? null;
  const [intakeLiftUm, exhaustLiftUm] = basis === "equal_lift" ? [common, common] : [intake.camLiftUm, exhaust.camLiftUm];
  const [intakeCfm, exhaustCfm] = [flowAt(intake, intakeLiftUm), flowAt(exhaust, exhaustLiftUm)];
  if (intakeCfm === null || exhaustCfm === null || intakeLiftUm === null || exhaustLiftUm === null) return null;
  const made = exhaustIntakeRatio({ exhaustCfm, intakeCfm, exhaustAtInH2O: exhaust.atInH2O, intakeAtInH2O: intake.atInH2O, basis });
  return made.ok ? { when, basis, percent: made.value.ratio * 100, intakeLiftUm, exhaustLiftUm } : null;
}

/**
 * Ratios before and after on one basis: each side at its own cam lift where every set was read so far, else at the highest lift read
 * on both sides. None at unlike pressures. Source: as `exhaustIntakeRatio`.
 */
export function portRatios(intake: Both, exhaust: Both): PortRatio[] {
  const pairs = (["before", "after"] as const).flatMap((when) => { const [i, e] = [intake[when], exhaust[when]]; return i && e ? [{ when, i, e }] : []; });
  const on = (basis: PortRatio["basis"]) => pairs.flatMap(({ when, i, e }) => ratioOf(when, basis, i, e) ?? []);
  const atCam = on("own_cam_lift");
  return atCam.length > 0 && atCam.length === pairs.length ? atCam : on("equal_lift");
}

const setOf = (test: Standing["before"]): RatioSet | null => (test ? { readings: figuresOfTest(test).readings, atInH2O: test.nominalInH2O, camLiftUm: test.camLiftUm } : null);
/** `portRatios` of the standing tests of a port. */
export const ratiosOfPort = (intake: Standing, exhaust: Standing): PortRatio[] =>
  portRatios({ before: setOf(intake.before), after: setOf(intake.after) }, { before: setOf(exhaust.before), after: setOf(exhaust.after) });

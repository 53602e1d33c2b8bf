import { ok, refuse, type Result } from "@/modules/kernel/result";
import type { CamPoint } from "./cam-table";
import { syntheticCam } from "./mean-flow";

/** What is known of a camshaft's lift at the valve. */
export interface CamFacts {
  readonly maxLiftUm: number;
  readonly durationDeg: number | null;
  /** Empty: not measured. */
  readonly profile: readonly CamPoint[];
}
export interface CamOpening {
  readonly anglesDeg: readonly number[];
  readonly camLifts: readonly number[];
  /** Drawn from lift and duration alone; an assumption, to be said wherever a figure rests on it. */
  readonly isSynthetic: boolean;
}

/** Step of the stand-in cam, degrees. Our choice. */
const STEP_DEG = 5;

/** Lift against angle while the valve is open: the cam's own table, or a stand-in from lift and duration. Errors: CAM_NOT_KNOWN, those of `syntheticCam`. */
export function camOpening({ profile, maxLiftUm, durationDeg }: CamFacts): Result<CamOpening> {
  if (profile.length > 0) return ok({ anglesDeg: profile.map((p) => p.angleDeg), camLifts: profile.map((p) => p.liftUm), isSynthetic: false });
  if (durationDeg === null) return refuse("CAM_NOT_KNOWN", "The cam's duration or table is not recorded. Add it under Bench gear, Camshafts.");
  const made = syntheticCam({ maxLift: maxLiftUm, durationDeg, stepDeg: STEP_DEG });
  return made.ok ? ok({ anglesDeg: made.value.anglesDeg, camLifts: made.value.camLifts, isSynthetic: true }) : made;
}

import { ok, type Result } from "@/modules/kernel/result";
import type { FlowFlag } from "./flow-flags";
import { refuseFlow, refuseNotFinite } from "./flow-refusal";
import { gainAt, gainTable, type BeforeAfter, type GainRow } from "./gain";
import { interpolateFlow } from "./interpolate-flow";

/** The gain exists only when both tests reach the cam's maximum lift. */
export type CamLiftGain =
  | {
      readonly testedToCamLift: true;
      /** A point above cam lift was tested too. */
      readonly testedBeyondCam: boolean;
      readonly camLift: number;
      readonly beforeCfm: number;
      readonly afterCfm: number;
      readonly gainCfm: number;
      readonly rowsAtOrAbove: readonly GainRow[];
      readonly flags: readonly FlowFlag[];
    }
  | { readonly testedToCamLift: false; readonly testedBeyondCam: false; readonly camLift: number; readonly flags: readonly FlowFlag[] };

/**
 * Gain at the cam's maximum lift, each test by its own monotone curve, and the tested points at or above it.
 * Not tested that far: flag NOT_TESTED_TO_CAM_LIFT and no number.
 * @param camMaxLift valve lift, same unit as the lifts, > 0. Errors: as `gainTable`, GEOMETRY_INVALID.
 */
export function gainAtCamLift(input: BeforeAfter & { readonly camMaxLift: number }): Result<CamLiftGain> {
  const { camMaxLift } = input;
  const bad = refuseNotFinite({ camMaxLift });
  if (bad) return bad;
  if (camMaxLift <= 0) return refuseFlow("GEOMETRY_INVALID", "camMaxLift");
  const table = gainTable(input);
  if (!table.ok) return table;
  const rowsAtOrAbove = table.value.filter((r) => r.lift >= camMaxLift);
  if (rowsAtOrAbove.length === 0) {
    return ok({ testedToCamLift: false, testedBeyondCam: false, camLift: camMaxLift, flags: ["NOT_TESTED_TO_CAM_LIFT"] });
  }
  const before = interpolateFlow({ lifts: input.lifts, flowsCfm: input.beforeCfm }, camMaxLift);
  if (!before.ok) return before;
  const after = interpolateFlow({ lifts: input.afterLifts ?? input.lifts, flowsCfm: input.afterCfm }, camMaxLift);
  if (!after.ok) return after;
  return ok({
    testedToCamLift: true,
    testedBeyondCam: rowsAtOrAbove.some((r) => r.lift > camMaxLift),
    camLift: camMaxLift,
    beforeCfm: before.value,
    afterCfm: after.value,
    gainCfm: gainAt(before.value, after.value),
    rowsAtOrAbove,
    flags: [],
  });
}

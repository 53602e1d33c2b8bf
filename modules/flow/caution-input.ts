import { z } from "@/modules/kernel/zod";
import { HAZARDS } from "./domain/cautions";
import { line } from "./typed-field";

/** The step of the job at which a caution is shown: an operation's code, `bench session`, `intake`, `handover` … */
const step = line(60).min(1, "Which step?");
/** The job is an order; a head of the shop's own has none and stands for itself. */
export const seenInput = z.strictObject({ workOrderId: z.uuid().optional(), headId: z.uuid().optional(), hazards: z.array(z.enum(HAZARDS)).min(1).max(HAZARDS.length), step })
  .refine((s) => (s.workOrderId === undefined) !== (s.headId === undefined), { error: "Say which order, or which head of the shop's own.", path: ["workOrderId"] });

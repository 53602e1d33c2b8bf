import { z } from "@/modules/kernel/zod";
import { HAZARDS } from "./domain/cautions";
import { line } from "./typed-field";

/** The step of the job at which a caution is shown: an operation's code, `bench session`, `intake`, `handover` … */
const step = line(60).min(1, "Which step?");
export const seenInput = z.strictObject({ workOrderId: z.uuid(), hazards: z.array(z.enum(HAZARDS)).min(1).max(HAZARDS.length), step });

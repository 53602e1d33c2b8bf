import { z } from "@/modules/kernel/zod";

export const showEstimatesInput = z.strictObject({ show: z.boolean(), version: z.number().int() });

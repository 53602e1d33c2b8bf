import { z } from "@/modules/kernel/zod";

export const reopenInput = z.strictObject({ operationId: z.uuid(), reason: z.string().trim().min(3, "Say why it is done again: the cause.").max(500, "At most 500 characters.") });

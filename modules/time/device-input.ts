import { DEVICE_KINDS } from "@/modules/access/device-kinds";
import { z } from "@/modules/kernel/zod";

export const newDeviceInput = z.strictObject({
  name: z.string().trim().min(1, "Name the tablet by its place, such as Bench 2.").max(40, "At most 40 characters."),
  kind: z.enum(DEVICE_KINDS).default("clock"),
});

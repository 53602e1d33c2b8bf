import { qtyText } from "@/modules/stock/input";
import { parseMilli } from "@/modules/kernel/quantity";
import { z } from "@/modules/kernel/zod";

const line = (max: number) => z.string().trim().max(max, `At most ${max} characters.`).refine((s) => !/\p{Cc}/u.test(s), "Line breaks and control characters do not belong here.");

export const issueInput = z.strictObject({
  workOrderPartId: z.uuid(), qty: qtyText,
  /** A lot chosen by hand; empty takes the first to expire. */
  lotId: z.union([z.uuid(), z.literal("")]).default(""),
  /** The yes to "more than the order needs". */
  moreThanNeeded: z.boolean().default(false),
});
export const issueReadyInput = z.strictObject({ workOrderId: z.uuid() });
export const returnInput = z.strictObject({ workOrderPartId: z.uuid(), qty: qtyText, reason: line(200).default("") });
export const needPartInput = z.strictObject({ workOrderId: z.uuid(), partId: z.uuid("Choose a part."), qty: qtyText, pieceId: z.union([z.uuid(), z.literal("")]).default("") });
export const dropNeedInput = z.strictObject({ workOrderPartId: z.uuid(), version: z.number().int() });

/** Grams as typed, 0 or more, to thousandths. */
const gramsText = line(12).transform((s, issue) => {
  const q = parseMilli(s === "" ? "0" : s);
  if (q === null || q < 0) { issue.addIssue({ code: "custom", message: "Grams such as 38 or 4.5." }); return z.NEVER; }
  return q;
});
/** Cure time of the data sheet in hours, to whole minutes; above 0, at most 14 days. */
const cureText = line(8).transform((s, issue) => {
  const q = parseMilli(s);
  if (q === null || q <= 0 || q > 336_000) { issue.addIssue({ code: "custom", message: "Hours from the product's data sheet, such as 24; at most 336." }); return z.NEVER; }
  return Math.round((q * 60) / 1000);
});

const EPOXY_PORTS = ["intake", "exhaust"] as const;
export const epoxyInput = z.strictObject({
  pieceId: z.uuid(), operationId: z.uuid("Choose the operation this belongs to."), partId: z.uuid("Choose the epoxy."),
  port: z.enum(EPOXY_PORTS, "Say which port."),
  gramsInPort: gramsText.refine((g) => g > 0, "Grams in the port, above 0."),
  gramsWaste: gramsText,
  ratio: line(20).regex(/^\d{1,4}([.,]\d{1,3})?\s*:\s*\d{1,4}([.,]\d{1,3})?$/, "The ratio as on the can, such as 100:20."),
  surfacePrepared: z.boolean().refine((b) => b, "Clean and key the surface as the data sheet says, then tick this."),
  mixedAt: line(16).regex(/^\d{4}-\d{2}-\d{2}T\d{2}:\d{2}$/, "The time it was mixed, such as 2026-03-07 11:30."),
  /** Answers the question when the clocks were put back and the time came twice. */
  which: z.enum(["", "first", "second"]).default(""),
  cureHours: cureText,
  lotId: z.union([z.uuid(), z.literal("")]).default(""),
});

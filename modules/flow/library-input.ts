import { z } from "@/modules/kernel/zod";
import { HEAD_WORK } from "./gear-input";
import { line } from "./typed-field";

const day = z.union([z.literal(""), z.iso.date("A date such as 2026-03-31.")]).default("");

/** What the library is looked through by. Empty = any. */
export const libraryInput = z.strictObject({
  q: line(80).default(""),
  family: line(80).default(""),
  side: z.enum(["", "intake", "exhaust"]).default(""),
  purpose: z.enum(["", "baseline", "after", "interim", "check"]).default(""),
  owner: z.enum(["", "customer", "development"]).default(""),
  work: z.enum(["", ...HEAD_WORK]).default(""),
  /** Valve head diameter in mm, met within a quarter of a millimetre. */
  valve: line(12).default(""),
  seat: line(60).default(""),
  from: day,
  to: day,
  limit: z.coerce.number().int().min(1).max(100).default(40),
  after: z.string().max(80).optional(),
});
export type LibraryAsk = z.output<typeof libraryInput>;

export const familyPictureInput = z.strictObject({
  family: line(80).min(1, "Which family?"),
  side: z.enum(["intake", "exhaust"]).default("intake"),
  /** Heads in the picture of gains. */
  last: z.coerce.number().int().min(1).max(20).default(10),
});
export const overlayInput = z.strictObject({ a: z.uuid(), b: z.uuid() });

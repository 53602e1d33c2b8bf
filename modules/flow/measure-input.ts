import { z } from "@/modules/kernel/zod";
import { typedNumber } from "./domain/typed-number";
import { line } from "./typed-field";

const side = z.enum(["", "intake", "exhaust"]).default("");
/** One line of the sheet as typed; an empty value takes back what stood there. */
export const measurementRow = z.strictObject({
  cylinder: z.number().int().min(1).max(16), side, position: z.enum(["", "single", "left", "centre", "right"]).default(""), kind: line(40),
  value: line(30), unit: line(10),
  /** The question was answered: it is kept as it stands. */
  confirmed: z.boolean().default(false),
  /** Revision of the line that was looked at; 0 = it was empty. */
  revisionSeen: z.number().int().min(0).default(0),
});
export const saveMeasurementsInput = z.strictObject({
  headId: z.uuid(), stage: z.enum(["before", "after"]), instrument: line(80).default(""),
  /** Who typed it, where that may not be who is signed in by now: another one's typing is refused and waits for them. */
  by: z.uuid().optional(),
  rows: z.array(measurementRow).min(1, "Type at least one measurement.").max(300),
});

const limitText = line(20).default("").refine((t) => t === "" || typedNumber(t).ok, "A number such as 0,10 or 0.10. Or leave it empty.");
/** A limit of the shop's own, with where it is from. */
export const limitInput = z.strictObject({
  family: line(80).min(1, "Which family?"), kind: line(40), side, min: limitText, max: limitText, unit: line(10),
  source: line(200).min(3, "Say where the limit is from: the service manual and its page."),
  /** Of the limit that stands; 0 = there is none yet. */
  version: z.number().int().min(0),
}).refine((l) => l.min !== "" || l.max !== "", { error: "Give the least, the most, or both.", path: ["min"] });

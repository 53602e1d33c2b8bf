import { z } from "@/modules/kernel/zod";
import { typedNumber } from "./domain/typed-number";
import { line, words } from "./typed-field";

const column = z.number().int().min(0).max(200);
const optionalColumn = column.nullable().default(null);
export const mappingInput = z.strictObject({
  headerRows: z.number().int().min(0).max(20), decimal: z.enum([".", ","]), lift: column, flow: column, pressure: optionalColumn, side: optionalColumn, cylinder: optionalColumn, repeat: optionalColumn, range: optionalColumn,
  liftUnit: z.enum(["in", "mm"]), fixedSide: z.enum(["intake", "exhaust"]).default("intake"), fixedCylinder: z.number().int().min(1).max(16).default(1),
});
const typed = line(20).refine((t) => { const n = typedNumber(t); return n.ok && n.value > 0; }, "A number above zero, such as 28 or 27,9.");

/** What a file of readings is read into, beside the file itself. */
export const uploadInput = z.strictObject({
  headId: z.uuid({ error: "Choose the head." }),
  purpose: z.enum(["baseline", "after", "interim", "check"]),
  benchId: z.uuid({ error: "Choose the bench." }),
  fixtureId: z.uuid({ error: "Choose the bore adapter." }),
  nominal: typed,
  flowUnit: z.enum(["cfm", "L/s", "m3/h", "percent", "head"]),
  pressureUnit: z.enum(["inH2O", "Pa", "hPa", "kPa"]),
  entry: z.enum(["radius", "clay", "manifold", "none"]).default("radius"),
  valve: line(20).refine((t) => t === "" || typedNumber(t).ok, "A number such as 31 or 26,5. Or leave it empty.").default(""),
  seatNote: words(200).default(""),
  /** When it was flowed; empty = now. The bench check of that day counts. */
  flowedAt: z.union([z.literal(""), z.iso.datetime("A date and time.")]).default(""),
  mapping: mappingInput,
  /** Rows refused that the person leaves out on purpose. */
  leaveOut: z.array(z.number().int().min(1).max(100_000)).max(2000).default([]),
  /** Why doubtful readings are kept; empty = they are refused. */
  reason: words(200).default(""),
  finish: z.boolean().default(true),
});
/** The same with the file: its text as read, and its bytes as they lie in the store. */
export const readFileInput = uploadInput.extend({
  text: z.string().max(1_000_000, "At most 1 MB."),
  file: z.strictObject({ name: line(200), mime: z.string().max(80), storageKey: z.string().max(300), sizeBytes: z.number().int().positive(), sha256: z.string().regex(/^[0-9a-f]{64}$/) }),
});
export const sheetPhotoInput = z.strictObject({
  headId: z.uuid(), name: z.string().trim().max(200).default("sheet.jpg"), note: line(200).default(""), storageKey: z.string().max(300), thumbKey: z.string().max(300).nullable(), sizeBytes: z.number().int().positive(), sha256: z.string().regex(/^[0-9a-f]{64}$/),
});

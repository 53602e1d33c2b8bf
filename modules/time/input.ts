import { ROLES } from "@/modules/access/roles";
import { z } from "@/modules/kernel/zod";
import { INDIRECT_WORK } from "./domain/indirect-work";
import { pinProblem } from "./domain/pin-rules";

const line = (max: number) => z.string().trim().max(max, `At most ${max} characters.`).refine((s) => !/\p{Cc}/u.test(s), "Line breaks and control characters do not belong here.");
const reason = z.string().trim().min(3, "Say why, in a few words.").max(500, "At most 500 characters.");
const which = z.enum(["", "first", "second"]).default("").transform((w) => (w === "" ? undefined : w));
const optionalId = z.union([z.literal(""), z.uuid()]).default("").transform((id) => (id === "" ? null : id));

const spanShape = {
  clock: z.enum(["door", "bench"]),
  /** What it was spent on, for the bench clock: an operation or work on no head. */
  operationId: optionalId,
  indirect: z.union([z.literal(""), z.enum(INDIRECT_WORK)]).default("").transform((w) => (w === "" ? null : w)),
  start: z.string().trim().max(20), end: z.string().trim().max(20), startWhich: which, endWhich: which,
  reason,
};
const needsWork = (s: { clock: string; operationId: string | null; indirect: string | null }) => s.clock === "door" || (s.operationId === null) !== (s.indirect === null);
const WORK_ERROR = { error: "Say what it was: one operation, or one kind of work that is on no head.", path: ["indirect"] };

export const askCorrectionInput = z.strictObject({ timeEntryId: optionalId, ...spanShape }).refine(needsWork, WORK_ERROR);
export const enterTimeInput = z.strictObject({ personId: z.uuid("Choose a person."), replacesId: optionalId, isDone: z.boolean().default(false), ...spanShape }).refine(needsWork, WORK_ERROR);
export const answerInput = z.strictObject({ id: z.uuid(), note: z.string().trim().max(300, "At most 300 characters.").default("") });
export const setAsideInput = z.strictObject({ id: z.uuid(), reason });

export const personInput = z.strictObject({
  name: line(80).min(1, "Type the name as on the payroll."),
  shortName: line(20).min(1, "Type the short name for tags and the clock."),
  email: line(254).refine((s) => s === "" || /^[^\s@<>(),;:"\\]+@[^\s@<>(),;:"\\]+\.[^\s@<>(),;:"\\]+$/.test(s), "One e-mail address, such as name@shop.example.").default(""),
  roles: z.array(z.enum(ROLES)).min(1, "Give at least one role."),
  skills: line(300).default(""),
});
export const personEditInput = personInput.safeExtend({ id: z.uuid(), version: z.number().int() });
export const badgeInput = z.strictObject({ id: z.uuid(), badgeCode: line(60).refine((s) => s === "" || s.length >= 4, "At least four characters, or none to take the badge away.") });
export const pinInput = z.strictObject({
  id: z.uuid(),
  pin: z.string().superRefine((pin, ctx) => {
    const problem = pinProblem(pin);
    if (problem) ctx.addIssue({ code: "custom", message: problem });
  }),
});
export const rateInput = z.strictObject({
  personId: z.uuid(), validFrom: z.iso.date("Type a date."),
  rate: line(12).regex(/^\d{1,5}([.,]\d{1,2})?$/, "An amount an hour, such as 29.50."),
});
export const weekInput = z.object({ person: z.uuid().optional(), date: z.iso.date().optional() });

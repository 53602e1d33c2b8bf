import { z } from "@/modules/kernel/zod";
import { holdsCardNumber } from "@/modules/kernel/card-number";
import { INVOICE_VIEWS } from "./domain/invoice-views";
import { parseMinor } from "@/modules/kernel/money";

const words = (max: number) => z.string().trim().max(max, `At most ${max} characters.`)
  .refine((s) => !holdsCardNumber(s), "This looks like a card number. Card numbers are never written down here.");

/** An amount as typed, at most two decimals; refused, never rounded. */
const moneyText = z.string().trim().transform((text, ctx) => {
  const value = parseMinor(text);
  if (value === null) ctx.addIssue({ code: "custom", message: "Type an amount such as 1,910.33, with at most two decimals." });
  return value ?? 0;
});

export const draftInvoiceInput = z.strictObject({ workOrderId: z.uuid(), which: z.enum(["all", "released"]).default("all") });
export const saveDraftInput = z.strictObject({
  invoiceId: z.uuid(), version: z.number().int(),
  lines: z.array(z.strictObject({ lineId: z.uuid(), description: words(300).min(1, "Say what this line is."), amount: moneyText })).min(1, "An invoice has at least one line.").max(200),
  note: words(500).default(""),
});
export const draftRefInput = z.strictObject({ invoiceId: z.uuid(), version: z.number().int() });
export const issueInvoiceInput = draftRefInput.extend({
  /** The total that was on the screen; another one is asked about again. */
  totalMinor: z.number().int(),
  send: z.boolean().default(true),
});
export const sendInvoiceInput = z.strictObject({ invoiceId: z.uuid() });
export const creditInvoiceInput = z.strictObject({
  invoiceId: z.uuid(),
  reason: words(240).min(3, "Say why, in a few words: it is printed on the credit note."),
  /** Null takes back all that is left. */
  lines: z.array(z.strictObject({ lineId: z.uuid(), amount: moneyText.refine((v) => v > 0, "Type an amount above 0.") })).min(1, "Choose at least one line.").max(200).nullable(),
});
export const applyCreditInput = z.strictObject({ invoiceId: z.uuid() });
export const writeOffInput = z.strictObject({ invoiceId: z.uuid(), reason: words(240).min(3, "Say why, in a few words.") });
export const findInvoicesInput = z.strictObject({
  view: z.enum(INVOICE_VIEWS).default("open"), q: z.string().trim().max(100).default(""),
  after: z.string().max(200).optional(), limit: z.coerce.number().int().min(1).max(100).default(50),
});
export type FindInvoices = z.output<typeof findInvoicesInput>;

import { z } from "@/modules/kernel/zod";
import { parseMinor } from "@/modules/kernel/money";
import { DATE_ORDERS } from "./domain/bank-file";

const column = z.coerce.number<string | number>({ error: "Choose a column." }).int().min(0).max(99);
const balanceText = z.string().trim().default("").transform((text, ctx) => {
  if (text === "") return null;
  const value = parseMinor(text);
  if (value === null) ctx.addIssue({ code: "custom", message: "Type the balance such as 24,871.16, or leave it empty." });
  return value;
});

const bankMappingInput = z.strictObject({
  hasHeader: z.boolean(), dateColumn: column, dateOrder: z.enum(DATE_ORDERS), textColumns: z.array(column).max(10), amountColumn: column,
  outColumn: column.nullable(), decimalComma: z.boolean(),
});
const file = { name: z.string().trim().min(1).max(200), text: z.string().min(1, "The file is empty.").max(900_000, "This file is too large; at most 900 kB."), delimiter: z.enum(["auto", ",", ";", "\t"]).default("auto") };
export const lookAtBankFileInput = z.strictObject({ ...file, mapping: bankMappingInput.nullable() });
export const takeInBankFileInput = z.strictObject({ ...file, mapping: bankMappingInput, opening: balanceText, closing: balanceText });

export const lockMatchInput = z.strictObject({
  lineId: z.uuid(), version: z.number().int(),
  kind: z.enum(["invoice", "payment", "payout", "account"]),
  /** Invoices in the order they are paid; or the one payment or payout. */
  ids: z.array(z.uuid()).max(20).default([]),
  /** For `account`: where the money went or came from. */
  account: z.string().regex(/^\d{4}$/).nullish(),
  /** What is short of the one invoice: left open, or written off up to the shop's limit. */
  rest: z.enum(["leave", "write-off"]).default("leave"),
});
export const unlockMatchInput = z.strictObject({ lineId: z.uuid(), version: z.number().int() });

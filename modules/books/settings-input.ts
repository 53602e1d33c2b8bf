import { z } from "@/modules/kernel/zod";
import { parseDecimal, parseMinor } from "@/modules/kernel/money";

const text = (max: number) => z.string().trim().max(max, `At most ${max} characters.`);
/** A percent as typed, 0 to 100 with at most two decimals, to basis points. */
const percent = z.string().trim().transform((s, ctx) => {
  const p = parseDecimal(s.replace(",", ".") || "0");
  const bp = p && p.scale <= 2 ? Number(p.units * 10n ** BigInt(2 - p.scale)) : -1;
  if (bp < 0 || bp > 10_000) ctx.addIssue({ code: "custom", message: "A percentage from 0 to 100, such as 7.5." });
  return bp;
});
const money = z.string().trim().transform((s, ctx) => {
  const v = parseMinor(s || "0");
  if (v === null || v < 0) ctx.addIssue({ code: "custom", message: "An amount of 0 or more, such as 60.00." });
  return v ?? 0;
});
const moneyOrNone = z.string().trim().transform((s, ctx) => {
  if (s === "") return null;
  const v = parseMinor(s);
  if (v === null || v < 0) ctx.addIssue({ code: "custom", message: "An amount of 0 or more, such as 60.00, or nothing for no cap." });
  return v;
});
const days = z.coerce.number<string | number>({ error: "A whole number of days." }).int("A whole number.").min(1, "At least 1.").max(365, "At most 365.");

export const shopSettingsInput = z.strictObject({
  version: z.number().int(),
  address: text(400), phone: text(40), email: text(254).refine((s) => s === "" || /^[^\s@]+@[^\s@]+\.[^\s@]+$/.test(s), "One e-mail address, such as counter@shop.example."), taxNumber: text(40),
  taxMode: z.enum(["sales", "vat"]), taxName: text(40).min(1, "How the tax is called on papers."),
  taxRateText: z.string().trim().regex(/^\d{1,2}(\.\d{1,4})?$/, "A rate such as 7.35."), taxBasis: z.enum(["invoice", "line"]),
  laborTaxable: z.boolean(), partsTaxable: z.boolean(), suppliesTaxable: z.boolean(), freightTaxable: z.boolean(), taxDecidedBy: text(200),
  supplies: percent, suppliesCap: moneyOrNone, deposit: percent, burden: percent, billRate: money, writeOffLimit: money, estimateValidDays: days,
  referencePrefix: z.string().trim().toUpperCase().regex(/^[A-Z]{2,4}$/, "Two to four letters A to Z."), invoiceWords: text(600),
});

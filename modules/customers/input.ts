import { z } from "@/modules/kernel/zod";
import { TERMS } from "./domain/terms";

const line = (max: number) => z.string().trim().max(max, `At most ${max} characters.`).refine((s) => !/\p{Cc}/u.test(s), "Line breaks and control characters do not belong here.");

export const emailText = line(254).refine((s) => s === "" || /^[^\s@<>(),;:"\\]+@[^\s@<>(),;:"\\]+\.[^\s@<>(),;:"\\]+$/.test(s), "One e-mail address, such as name@shop.example.");
export const phoneText = line(40).refine((s) => s === "" || /\d{5,}/.test(s.replace(/\D+/g, "")), "A telephone number with at least five digits.");

export const customerInput = z.strictObject({
  kind: z.enum(["person", "company"]).default("person"),
  name: line(120).min(1, "Type the customer's name."),
  email: emailText.default(""),
  phone: phoneText.default(""),
  address: z.string().trim().max(500, "At most 500 characters.").default(""),
  terms: z.enum(TERMS).default("receipt"),
  laborDiscountPercent: line(6).regex(/^\d{0,2}([.,]\d{1,2})?$/, "A percentage such as 5 or 7.5.").default("0"),
  notes: z.string().trim().max(2000, "At most 2,000 characters.").default(""),
}).refine((c) => c.email !== "" || c.phone !== "", { error: "Give one way to reach them: an e-mail address or a telephone number.", path: ["email"] });

export const customerEditInput = customerInput.safeExtend({ id: z.uuid(), version: z.number().int() });
export const findCustomersInput = z.strictObject({ q: z.string().trim().max(100).default(""), limit: z.coerce.number().int().min(1).max(100).default(20), after: z.string().max(200).optional() });

import { emailText, phoneText } from "@/modules/customers/input";
import { TERMS } from "@/modules/customers/domain/terms";
import { dateText, lotText, optionalAmountText, qtyText } from "@/modules/stock/input";
import { parseMilli } from "@/modules/kernel/quantity";
import { z } from "@/modules/kernel/zod";

const line = (max: number) => z.string().trim().max(max, `At most ${max} characters.`).refine((s) => !/\p{Cc}/u.test(s), "Line breaks and control characters do not belong here.");
const words = (max: number) => z.string().trim().max(max, `At most ${max} characters.`);

export const supplierInput = z.strictObject({
  name: line(120).min(1, "Type the supplier's name."),
  email: emailText.default(""), phone: phoneText.default(""), address: words(500).default(""), terms: z.enum(TERMS).default("net_30"),
  leadDays: line(4).regex(/^\d{0,3}$/, "Whole days, such as 6, or leave it empty.").default(""),
});
export const supplierEditInput = supplierInput.extend({ id: z.uuid(), version: z.number().int(), active: z.boolean().default(true) });

const orderLine = z.strictObject({
  /** Empty for a line that is new. */
  id: z.union([z.uuid(), z.literal("")]).default(""),
  partId: z.uuid("Choose a part."), supplierNumber: line(60).default(""), qty: qtyText,
  /** Empty: the price that stands on the line, for a new line the last one paid. */
  price: optionalAmountText.default(""),
  /** Bought for this work order; empty for the shelf. */
  workOrderId: z.union([z.uuid(), z.literal("")]).default(""),
});
const orderFields = { neededBy: dateText.default(""), notes: words(1000).default(""), lines: z.array(orderLine).max(100, "At most 100 lines an order.") };
export const draftInput = z.strictObject({ supplierId: z.uuid("Choose a supplier."), ...orderFields, lines: orderFields.lines.default([]) });
export const changeOrderInput = z.strictObject({ id: z.uuid(), version: z.number().int(), ...orderFields });
export const sendInput = z.strictObject({ id: z.uuid(), version: z.number().int(), by: z.enum(["mail", "hand"]).default("mail"), expectedOn: dateText.default("") });
export const expectInput = z.strictObject({ id: z.uuid(), version: z.number().int(), expectedOn: dateText.refine((s) => s !== "", "Type the date the supplier gave.") });
export const cancelInput = z.strictObject({ id: z.uuid(), version: z.number().int(), reason: line(200).min(3, "Say why, in a few words.") });

/** Quantity that came: 0 or more; empty is nothing. */
const cameText = line(16).transform((s, issue) => {
  const q = parseMilli(s === "" ? "0" : s);
  if (q === null || q < 0) { issue.addIssue({ code: "custom", message: "A quantity such as 6, or empty when none came." }); return z.NEVER; }
  return q;
});
const OVER_CHOICES = ["keep", "return", "refuse"] as const;
export const receiveInput = z.strictObject({
  purchaseOrderId: z.uuid(), freight: optionalAmountText.default(""), deliveryNote: line(120).default(""),
  lines: z.array(z.strictObject({
    lineId: z.uuid(), came: cameText, lotCode: lotText.default(""), expiresOn: dateText.default(""),
    /** What is done with more than was ordered. */
    over: z.union([z.enum(OVER_CHOICES), z.literal("")]).default(""),
  })).min(1).max(100),
});
export const reverseReceiptInput = z.strictObject({ receiptId: z.uuid(), reason: line(200).min(3, "Say why, in a few words.") });

export const ORDER_VIEWS = ["open", "drafts", "in", "all"] as const;
export type OrderView = (typeof ORDER_VIEWS)[number];
export const findOrdersInput = z.strictObject({ q: line(60).default(""), view: z.enum(ORDER_VIEWS).default("open"), limit: z.coerce.number().int().min(1).max(100).default(50), after: z.string().max(80).optional() });

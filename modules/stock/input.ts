import { currencyDecimals } from "@/modules/kernel/format";
import { parseMinor } from "@/modules/kernel/money";
import { parseMilli } from "@/modules/kernel/quantity";
import { z } from "@/modules/kernel/zod";
import { COUNT_CAUSES, HAZARDS, PART_CLASSES, POSITIONS, STOCK_UNITS } from "./domain/part-words";
import { checkSku } from "./domain/sku";

const line = (max: number) => z.string().trim().max(max, `At most ${max} characters.`).refine((s) => !/\p{Cc}/u.test(s), "Line breaks and control characters do not belong here.");

/** Quantity above 0 as typed (`2`, `42,5`), to thousandths. */
export const qtyText = line(16).transform((s, issue) => {
  const q = parseMilli(s);
  if (q === null || q <= 0) { issue.addIssue({ code: "custom", message: "A quantity above 0, such as 2 or 42.5." }); return z.NEVER; }
  return q;
});
/** Quantity of 0 or more; empty is null. */
const levelText = line(16).transform((s, issue) => {
  if (s === "") return null;
  const q = parseMilli(s);
  if (q === null || q < 0) { issue.addIssue({ code: "custom", message: "A quantity of 0 or more, or leave it empty." }); return z.NEVER; }
  return q;
});
/** Amount of 0 or more as typed. More decimals than two are refused when the command reads it for the shop's currency. */
export const amountText = line(20).refine((s) => { const m = parseMinor(s, 4); return m !== null && m >= 0; }, "An amount of 0 or more, such as 23.75.");
export const optionalAmountText = line(20).refine((s) => { if (s === "") return true; const m = parseMinor(s, 4); return m !== null && m >= 0; }, "An amount of 0 or more, or leave it empty.");
/** Amount in minor units of the shop's currency; null when it has more decimals than the currency. */
export const amountIn = (text: string, currency: string): number | null => parseMinor(text, currencyDecimals(currency));
export const dateText = line(10).refine((s) => s === "" || (/^\d{4}-\d{2}-\d{2}$/.test(s) && !Number.isNaN(Date.parse(s)) && new Date(`${s}T00:00:00Z`).toISOString().startsWith(s)), "A date that exists, such as 2026-03-20.");
export const lotText = line(40);

export const PART_VIEWS = ["all", "short", "reorder", "expiring", "on-order", "kits", "lots"] as const;
export type PartView = (typeof PART_VIEWS)[number];

export const findPartsInput = z.strictObject({
  q: z.string().trim().max(100).default(""),
  view: z.enum(PART_VIEWS).default("all"),
  partClass: z.union([z.enum(PART_CLASSES), z.literal("")]).default(""),
  /** With parts no longer kept. */
  gone: z.stringbool().default(false),
  limit: z.coerce.number().int().min(1).max(100).default(50),
  after: z.string().max(60).optional(),
});
export type FindPartsInput = z.output<typeof findPartsInput>;
/** For callers that give only some of it. */
export const partsAsk = (ask: z.input<typeof findPartsInput> = {}): FindPartsInput => findPartsInput.parse(ask);

const skuText = line(60).transform((s, issue) => {
  const sku = checkSku(s);
  if (!sku.ok) { issue.addIssue({ code: "custom", message: sku.refusal.message }); return z.NEVER; }
  return sku.value;
});

const partFields = {
  description: line(160).min(1, "Say what it is, such as exhaust valve 22.5 mm."),
  partClass: z.enum(PART_CLASSES, "Choose a class."),
  families: line(300).default(""),
  position: z.enum(POSITIONS).default(""),
  bin: line(40).default(""),
  salePrice: optionalAmountText,
  reorderPoint: levelText.default(null),
  orderQty: levelText.default(null),
  preferredSupplierId: z.union([z.uuid(), z.literal("")]).default(""),
  supplierNumber: line(60).default(""),
  materialNote: line(200).default(""),
  hazard: z.enum(HAZARDS).default(""),
};
export const addPartInput = z.strictObject({
  sku: skuText, ...partFields, stockUnit: z.enum(STOCK_UNITS).default("each"), isKit: z.boolean().default(false), lotTracked: z.boolean().default(false),
});
export const changePartInput = z.strictObject({ id: z.uuid(), version: z.number().int(), ...partFields, stockUnit: z.enum(STOCK_UNITS), lotTracked: z.boolean(), active: z.boolean() });
export const kitInput = z.strictObject({
  kitPartId: z.uuid(), version: z.number().int(),
  lines: z.array(z.strictObject({ partId: z.uuid("Choose a part."), qty: qtyText })).max(60, "At most 60 parts in a kit."),
});

export const openingInput = z.strictObject({ partId: z.uuid(), qty: qtyText, value: amountText, lotCode: lotText.default(""), expiresOn: dateText.default(""), reason: line(200).default("") });

export const countInput = z.strictObject({
  /** Wall clock of the count, `YYYY-MM-DDTHH:mm`; empty is now. What moved since is taken into account. */
  countedAt: line(16).default(""),
  cause: z.enum(COUNT_CAUSES, "Say why it was counted."),
  note: line(200).default(""),
  lines: z.array(z.strictObject({ partId: z.uuid(), lotId: z.uuid().nullable().default(null), counted: levelText })).min(1).max(200, "At most 200 lines a count."),
});

export const reverseInput = z.strictObject({ movementId: z.uuid(), reason: line(200).min(3, "Say why, in a few words.") });
export const scrapInput = z.strictObject({ partId: z.uuid(), lotId: z.union([z.uuid(), z.literal("")]).default(""), qty: qtyText, reason: line(200).min(3, "Say why it is thrown out.") });
export const ledgerInput = z.strictObject({ part: z.uuid(), before: z.coerce.number().int().optional(), limit: z.coerce.number().int().min(1).max(100).default(40) });
export const partInput = z.strictObject({ part: z.string().min(1).max(60) });

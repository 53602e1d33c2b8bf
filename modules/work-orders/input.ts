import { emailText, phoneText } from "@/modules/customers/input";
import { holdsCardNumber } from "@/modules/kernel/card-number";
import { parseDecimal, parseMinor } from "@/modules/kernel/money";
import { parseMilli } from "@/modules/kernel/quantity";
import { z } from "@/modules/kernel/zod";
import { STATIONS } from "./domain/floor-station";
import { HOLD_REASONS } from "./domain/hold-reasons";
import { TRAY_KINDS } from "./domain/tray-kinds";
import { USES } from "./domain/uses";
import { CHECKLIST } from "./domain/release-check";
import { ESTIMATE_LINE_KINDS } from "./domain/estimate-snapshot";

const NO_CARD = "This looks like a card number. Card numbers are never written here; send the payment link instead.";
/** One line of text. */
const line = (max: number) =>
  z.string().trim().max(max, `At most ${max} characters.`).refine((s) => !/\p{Cc}/u.test(s), "Line breaks and control characters do not belong here.").refine((s) => !holdsCardNumber(s), NO_CARD);
/** A maker's number as stamped: any digits may be one, so it is not taken for a card number. */
const stamped = z.string().trim().max(40, "At most 40 characters.").refine((s) => !/\p{Cc}/u.test(s), "Line breaks and control characters do not belong here.");
/** Several lines of text. */
const words = (max: number) =>
  z.string().trim().max(max, `At most ${max} characters.`).refine((s) => !/[^\P{Cc}\n\r\t]/u.test(s), "Control characters do not belong here.").refine((s) => !holdsCardNumber(s), NO_CARD);
const isoDate = z.string().trim().regex(/^\d{4}-\d{2}-\d{2}$/, "A date such as 2026-03-20.").refine((s) => !Number.isNaN(Date.parse(`${s}T00:00:00Z`)), "There is no such day.");
/** A day, or none. */
const dayOrNone = z.union([z.literal(""), isoDate]).transform((s) => s || null);

const AMOUNT_MAX = 100_000_000_00;
/** An amount as typed, to minor units; not below 0. */
const amountText = z.string().trim().transform((s, ctx) => {
  const value = parseMinor(s);
  if (value === null || value < 0 || value > AMOUNT_MAX) {
    ctx.addIssue({ code: "custom", message: "An amount such as 1250 or 1,250.00, not below 0." });
    return z.NEVER;
  }
  return value;
});
/** An amount or nothing: "" is null. */
const amountOrNone = z.string().trim().transform((s, ctx) => {
  if (s === "") return null;
  const value = parseMinor(s);
  if (value === null || value < 0 || value > AMOUNT_MAX) {
    ctx.addIssue({ code: "custom", message: "An amount such as 3200 or 3,200.00, or nothing." });
    return z.NEVER;
  }
  return value;
});
/** A percentage from 0 to 100 with up to two decimals, to basis points. */
export const percentText = z.string().trim().transform((s, ctx) => {
  const p = parseDecimal((s || "0").replace(",", "."));
  const bp = p && p.scale <= 2 ? Number((p.units * 100n) / 10n ** BigInt(p.scale)) : -1;
  if (bp < 0 || bp > 10_000) {
    ctx.addIssue({ code: "custom", message: "A percentage from 0 to 100, such as 5 or 7.5." });
    return z.NEVER;
  }
  return bp;
});
/** A quantity above 0, to thousandths. */
const qtyText = z.string().trim().transform((s, ctx) => {
  const q = parseMilli(s);
  if (q === null || q <= 0 || q > 1_000_000_000) {
    ctx.addIssue({ code: "custom", message: "A quantity above 0, such as 4 or 1.5." });
    return z.NEVER;
  }
  return q;
});
/** Hours as typed (`4.5`), to whole minutes. */
const hoursText = z.string().trim().transform((s, ctx) => {
  const p = parseDecimal(s.replace(",", "."));
  const minutes = p && p.units >= 0n ? Number((p.units * 60n * 2n + 10n ** BigInt(p.scale)) / (2n * 10n ** BigInt(p.scale))) : -1;
  if (minutes < 0 || minutes > 60_000) {
    ctx.addIssue({ code: "custom", message: "Hours such as 0.5 or 4.5." });
    return z.NEVER;
  }
  return minutes;
});

export const menuInput = z.strictObject({
  code: line(8).transform((s) => s.toUpperCase()).refine((s) => /^[A-Z0-9]{2,8}$/.test(s), "A code of 2 to 8 letters and digits, such as PIN."),
  name: line(80).min(1, "Type what the bench calls it."),
  customerWords: line(200).default(""),
  station: z.enum(STATIONS, { error: "Choose the station where it is done." }),
  skill: line(40).min(1, "Type the machine or skill, such as seat machine."),
  sequence: z.coerce.number<string | number>({ error: "A whole number; lower comes first." }).int("A whole number; lower comes first.").min(0, "0 or more.").max(9999, "At most 9999."),
  bookHours: hoursText,
  price: amountText,
  billing: z.enum(["fixed", "hourly"]).default("fixed"),
  needsBefore: z.array(line(8)).max(20).default([]),
  mustRecord: line(200).default(""),
  hazards: z.array(line(40)).max(20).default([]),
});
export const menuEditInput = menuInput.extend({ id: z.uuid(), version: z.number().int(), active: z.boolean().default(true) });

const pieceInput = z.strictObject({
  family: line(60).min(1, "Type the engine family, or “unknown”."),
  castingNumber: stamped.default(""),
  serial: stamped.default(""),
  declaredValue: amountOrNone.default(null),
  description: line(200).default(""),
  ownerKind: z.enum(["customer", "shop"]).default("customer"),
});
const newCustomer = z.strictObject({
  name: line(120).min(1, "Type the customer's name."), email: emailText.default(""), phone: phoneText.default(""), kind: z.enum(["person", "company"]).default("person"),
}).refine((c) => c.email !== "" || c.phone !== "", { error: "Give one way to reach them: an e-mail address or a telephone number.", path: ["phone"] });

export const openOrderInput = z.strictObject({
  /** A known customer, or "" when `newCustomer` is filled. */
  customerId: z.union([z.literal(""), z.uuid()]).default(""),
  newCustomer: newCustomer.nullable().default(null),
  pieces: z.array(pieceInput).min(1, "An order has at least one piece.").max(24, "At most 24 pieces."),
  wants: words(2000).default(""),
  use: z.enum(USES, { error: "Say what it is used on; other will do." }),
  promisedOn: dayOrNone.default(null),
  customerReference: line(60).default(""),
}).refine((o) => o.customerId !== "" || o.newCustomer !== null, {
  error: "Pick a customer, or add a new one.", path: ["customerId"],
  // Said together with what else is wrong, not only once that is mended.
  when: ({ value }) => typeof value === "object" && value !== null && "customerId" in value,
});

export const changeOrderInput = z.strictObject({
  id: z.uuid(), version: z.number().int(), wants: words(2000), use: z.enum(USES), customerReference: line(60), notes: words(2000),
});
export const addPieceInput = pieceInput.extend({ workOrderId: z.uuid() });
export const promiseInput = z.strictObject({ workOrderId: z.uuid(), version: z.number().int(), promisedOn: isoDate, reason: line(200).min(1, "Say why the promise moves; the customer may ask.") });
export const cancelOrderInput = z.strictObject({ workOrderId: z.uuid(), version: z.number().int(), reason: line(200).min(1, "Say why the order is called off.") });

export const startEstimateInput = z.strictObject({ workOrderId: z.uuid(), findingIds: z.array(z.uuid()).max(50).default([]) });
const estimateLineInput = z.strictObject({
  kind: z.enum(ESTIMATE_LINE_KINDS),
  /** "" and null: for the whole order, or for its only piece. */
  pieceNo: z.union([z.null(), z.literal("").transform(() => null), z.coerce.number<string | number>().int().min(1).max(24)]).default(null),
  /** Of a labor line: the menu's code. */
  operationCode: line(8).nullable().default(null),
  partId: z.uuid().nullable().default(null),
  description: line(200).min(1, "Say what it is."),
  qty: qtyText,
  unitPrice: amountText,
  findingId: z.uuid().nullable().default(null),
});
export const saveEstimateInput = z.strictObject({
  estimateId: z.uuid(),
  version: z.number().int(),
  laborDiscountPercent: percentText,
  freight: amountText,
  depositPercent: percentText,
  exclusions: words(2000),
  message: words(2000),
  readyOn: dayOrNone,
  lines: z.array(estimateLineInput).max(300, "At most 300 lines."),
});
export type SaveEstimateInput = z.output<typeof saveEstimateInput>;
export const sendEstimateInput = z.strictObject({
  estimateId: z.uuid(), version: z.number().int(),
  /** "" hands it over in print: nothing is mailed. */
  to: emailText,
});
export const answerInput = z.strictObject({
  answer: z.enum(["approved", "declined"]),
  name: line(120).min(2, "Type your name, as your signature."),
  /** Hash of the version that was on the screen. */
  documentHash: z.string().regex(/^[0-9a-f]{64}$/),
});
export const spokenAnswerInput = z.strictObject({
  estimateId: z.uuid(),
  answer: z.enum(["approved", "declined"]),
  via: z.enum(["phone", "counter"]),
  name: line(120).min(2, "Type who said it."),
  phoneNumber: phoneText.default(""),
  note: line(300).default(""),
}).refine((a) => a.via !== "phone" || a.phoneNumber !== "", { error: "Type the number that was called.", path: ["phoneNumber"] });

const count = z.coerce.number<string | number>({ error: "A whole number." }).int("A whole number.").min(0, "0 or more.").max(999, "At most 999.");
export const receiveInput = z.strictObject({
  pieceId: z.uuid(), version: z.number().int(),
  parcelCondition: z.enum(["sound", "crushed", "wet", "open", "handed over"], { error: "Say how the parcel looked." }),
  counts: z.partialRecord(z.enum(TRAY_KINDS), count).default({}),
  castingNumber: stamped.default(""),
  serial: stamped.default(""),
  missing: words(1000).default(""),
  damage: words(1000).default(""),
  notes: words(1000).default(""),
  place: line(60).default(""),
  /** "Yes, it is so" to fewer than four photos. */
  fewPhotosOk: z.boolean().default(false),
});
export const pieceIdInput = z.strictObject({ pieceId: z.uuid() });
export const placeInput = z.strictObject({ pieceId: z.uuid(), version: z.number().int(), place: line(60) });
export const addPhotoInput = z.strictObject({
  subjectKind: z.enum(["piece", "finding"]), subjectId: z.uuid(), name: z.string().max(200), storageKey: z.string().max(300), thumbKey: z.string().max(300).nullable(),
  sizeBytes: z.number().int().positive(), sha256: z.string().regex(/^[0-9a-f]{64}$/), note: line(200).default(""),
});
export const holdInput = z.strictObject({ pieceId: z.uuid(), reason: z.enum(HOLD_REASONS, { error: "Choose why it stands still." }), words: line(300).default("") });
export const endHoldInput = z.strictObject({ holdId: z.uuid() });
export const findingInput = z.strictObject({
  pieceId: z.uuid(), words: words(1000).min(3, "Say what was found."), position: line(60).default(""), goOnMeanwhile: z.boolean().default(true),
});
export const findingIdInput = z.strictObject({ findingId: z.uuid(), version: z.number().int() });
export const operationStateInput = z.strictObject({
  operationId: z.uuid(), version: z.number().int(), to: z.enum(["done", "open", "skipped"]), reason: line(200).default(""),
}).refine((o) => o.to !== "skipped" || o.reason !== "", { error: "Say why it is skipped.", path: ["reason"] });
export const releaseInput = z.strictObject({
  pieceId: z.uuid(), version: z.number().int(),
  checked: z.array(z.enum(CHECKLIST.map((c) => c.key) as [string, ...string[]])).max(20),
  /** What came in and where it is now, by kind: fitted + returned + scrapped by agreement. */
  tray: z.array(z.strictObject({ kind: z.enum(TRAY_KINDS), fitted: count, returned: count, scrapped: count })).max(20).default([]),
  note: line(300).default(""),
});
export const refuseReleaseInput = z.strictObject({ pieceId: z.uuid(), reason: line(300).min(3, "Say what is to be mended.") });
export const handOverInput = z.strictObject({
  workOrderId: z.uuid(), pieceIds: z.array(z.uuid()).min(1, "Pick the pieces that leave.").max(24),
  to: line(120).min(2, "Type who takes it."),
  unpaidOk: z.boolean().default(false),
});
export const shipInput = z.strictObject({
  workOrderId: z.uuid(), pieceIds: z.array(z.uuid()).min(1, "Pick the pieces that leave.").max(24),
  carrier: line(60).min(2, "Type the carrier."), service: line(60).default(""), tracking: line(60).default(""),
  insured: amountOrNone, cost: amountText, unpaidOk: z.boolean().default(false),
});
export const reopenPieceInput = z.strictObject({ pieceId: z.uuid(), version: z.number().int(), reason: line(200).min(3, "Say why it is opened again.") });

export const ORDER_VIEWS = ["open", "due", "approval", "short", "over", "to-invoice", "gone"] as const;
const ORDER_SORTS = ["number", "promised", "customer"] as const;
export const findOrdersInput = z.strictObject({
  view: z.enum(ORDER_VIEWS).default("open"),
  q: z.string().trim().max(100).default(""),
  station: z.union([z.literal(""), z.enum(STATIONS)]).default(""),
  person: z.string().max(60).default(""),
  promised: z.enum(["", "today", "week", "late", "none"]).default(""),
  sort: z.enum(ORDER_SORTS).default("number"),
  descending: z.enum(["true", "false"]).default("true"),
  after: z.string().max(300).optional(),
  limit: z.coerce.number<string | number>().int().min(1).max(100).default(50),
});
export const findInput = z.strictObject({ q: z.string().trim().max(100).default("") });
export const noInput = z.strictObject({});

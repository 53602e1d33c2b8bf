import type { PieceGain } from "@/modules/invoices/domain/gain-block";
import { pieceGain } from "@/modules/invoices/domain/gain-block";
import type { InvoiceLine, InvoiceSnapshot } from "@/modules/invoices/domain/invoice-snapshot";
import type { ReadingSetConditions } from "@/modules/flow/domain/comparison-reasons";
import { compareSets } from "@/modules/flow/domain/shop-comparison";
import { totalsUnder, type DocumentRules } from "@/modules/work-orders/domain/document-rules";
import { must } from "./shop";

/** The readings of docs/hero-job.md, CFM at 28 in water, lifts .050 to .400 in. */
export const HERO_FLOW = {
  intake: { before: [24.6, 48.9, 71.2, 90.8, 106.5, 117.9, 124.4, 127.0], after: [25.0, 51.6, 76.9, 99.7, 118.2, 131.8, 140.1, 143.6] },
  exhaust: { before: [21.8, 43.0, 60.7, 74.1, 83.6, 89.7, 93.1, 94.8], after: [22.3, 44.9, 64.8, 80.2, 91.5, 98.8, 103.2, 105.1] },
} as const;
const LIFTS_UM = [1270, 2540, 3810, 5080, 6350, 7620, 8890, 10160];

export function heroGain(fixtureAfter = "77"): PieceGain {
  const set = (side: "intake" | "exhaust", flows: readonly number[], at: string, seat: string, fixtureName: string) => ({
    conditions: {
      side, benchId: "b1", benchName: "Bench 1", fixtureId: fixtureName, fixtureName, fixtureBoreMm: fixtureName === "77" ? 77 : 80, nominalInH2O: 28, entry: "radius", valvesOpen: ["all"], liftsUm: LIFTS_UM,
      benchCheckAt: new Date(`${at.slice(0, 10)}T15:00:00Z`), takenAt: new Date(at), operator: "June", benchFactor: 1, valve: "stock", seat,
    } satisfies ReadingSetConditions,
    readings: flows.map((flowCfm, i) => ({ liftUm: LIFTS_UM[i] ?? 0, flowCfm })),
  });
  return pieceGain((["intake", "exhaust"] as const).map((side) => ({
    side, cylinder: 1, atInH2O: 28, camLiftUm: 8636, conditions: "Bench 1, adapter 77, radius entry, test springs.",
    comparison: must(compareSets({
      before: set(side, HERO_FLOW[side].before, "2026-02-26T17:00:00Z", "cleaned original", "77"), after: set(side, HERO_FLOW[side].after, "2026-03-12T17:00:00Z", "new, 3 angles", fixtureAfter), camLiftUm: 8636,
    })),
  })));
}

export const HERO_RULES: DocumentRules = {
  taxMode: "sales", taxName: "Pell County tax", taxRateText: "7.35", taxBasis: "invoice", laborTaxable: false, partsTaxable: true, suppliesTaxable: true, freightTaxable: false,
  suppliesBasisPoints: 400, suppliesCapMinor: 6000, exemptBy: null,
};

/** Agreed lines of the hero job, version 2: description, quantity, unit price, book minutes, worked minutes. */
export const HERO_LABOR: readonly (readonly [string, number, number, number, number])[] = [
  ["Clean & hot wash", 1, 4500, 30, 28], ["Teardown & measure", 1, 9500, 60, 67], ["Crack / pressure test", 1, 6500, 36, 38], ["Baseline flow", 1, 11000, 60, 56], ["Guide replace, each", 2, 4200, 48, 52],
  ["Epoxy floor fill", 1, 14000, 72, 65], ["Intake porting", 1, 49500, 270, 280], ["Exhaust porting", 1, 33000, 180, 195], ["Seat cutting, each", 4, 5500, 120, 108], ["Lap & vacuum check", 1, 7500, 48, 42],
  ["Spring setup", 1, 7500, 42, 45], ["Lash shims", 1, 6500, 36, 38], ["Final flow", 1, 11000, 60, 57], ["Assembly", 1, 8500, 48, 51], ["Final inspection", 1, 4000, 24, 27],
];
export const HERO_PARTS: readonly (readonly [string, number, number])[] = [
  ["Spring kit S250-4V", 1, 18900], ["Stem seal", 4, 650], ["Lash shim", 4, 725], ["Head gasket", 1, 3850], ["Epoxy", 1, 1400], ["Intake valve", 2, 6200], ["Exhaust valve", 2, 4800], ["Guide", 2, 1875],
];

const TAG = "260224-07";
export function heroLines(): InvoiceLine[] {
  const labor = HERO_LABOR.map(([description, n, unit, book, worked]) => ({ kind: "labor" as const, description, qtyMilli: n * 1000, unitPriceMinor: unit, amountMinor: n * unit, bookMinutes: book, actualMinutes: worked }));
  const parts = HERO_PARTS.map(([description, n, unit]) => ({ kind: "part" as const, description, qtyMilli: n * 1000, unitPriceMinor: unit, amountMinor: n * unit, bookMinutes: 0, actualMinutes: 0 }));
  const freight = { kind: "freight" as const, description: "Freight & insurance", qtyMilli: 1000, unitPriceMinor: 4200, amountMinor: 4200, bookMinutes: 0, actualMinutes: 0 };
  return [...labor, ...parts, freight].map((l, i) => ({ ...l, id: `line-${i}`, lineNo: i + 1, pieceTag: l.kind === "freight" ? "" : TAG }));
}

/** The hero invoice as frozen at issue. */
export function heroSnapshot(more: Partial<InvoiceSnapshot> = {}): InvoiceSnapshot {
  const lines = heroLines();
  const totals = must(totalsUnder(HERO_RULES, { lines, laborDiscountBp: 500, freightMinor: 0 }));
  return {
    kind: "invoice", ruleSet: "2026-1", number: "INV-2026-00318", date: "2026-03-13", supplyOn: "2026-03-13", dueOn: "2026-03-13", terms: "Due on receipt", currency: "USD", locale: "en-US", zone: "America/Denver",
    shop: { name: "Ninebark Headworks", address: "18 Mill Race\nPell", phone: "555-0110", email: "counter@ninebark.example", taxNumber: "" },
    customer: { name: "Odalys Brennan", address: "4 Quarry Row\nPell", email: "odalys@brennan.example", taxNumber: "" }, customerReference: "", orderNumber: "WO-2026-0118",
    pieces: [{ tag: TAG, family: "S250-4V", castingNumber: "K7-2201", serial: "A1193", released: true, gain: heroGain() }], lines, laborDiscountBp: 500, rules: HERO_RULES, totals,
    deposit: { appliedMinor: 72310, on: "2026-02-19" }, balanceMinor: totals.totalMinor - 72310, reference: "RF95NB202600318",
    approvals: [{ version: 1, totalMinor: 241032, name: "Odalys Brennan", on: "2026-02-19", via: "link" }, { version: 2, totalMinor: 263343, name: "Odalys Brennan", on: "2026-02-27", via: "link" }], refused: [], words: "", credits: null, ...more,
  };
}

import { randomUUID } from "node:crypto";
import { and, eq } from "drizzle-orm";
import { estimates, kitLines, parts, stockMovements, workPieces } from "@/db/schema";
import { withShop } from "@/db/scope";
import { openLinkContextFor } from "./link-context";
import { addCustomer } from "@/modules/customers/commands";
import { parseMinor } from "@/modules/kernel/money";
import { saveEstimate, startEstimate } from "@/modules/work-orders/commands/estimate-draft";
import { addMenuOperation } from "@/modules/work-orders/commands/menu";
import { openOrder } from "@/modules/work-orders/commands/open-order";
import { sendEstimate } from "@/modules/work-orders/commands/send-estimate";
import { HERO_EPOXY, HERO_KIT, HERO_PARTS, NINEBARK_MENU } from "@/seed/facts/ninebark";
import { must, type TestShop } from "./shop";

const cents = (text: string): number => {
  const value = parseMinor(text);
  if (value === null) throw new Error(text);
  return value;
};

/** Puts the demo menu on the wall of a test shop. */
export async function heroMenu(shop: TestShop): Promise<void> {
  for (const [i, m] of NINEBARK_MENU.entries()) {
    must(await addMenuOperation(shop.as("mgr"), {
      code: m.code, name: m.name, station: m.station, skill: m.skill, sequence: (i + 1) * 10, bookHours: String(m.bookMinutes / 60), price: m.price,
      needsBefore: [...m.needs], mustRecord: m.record, hazards: [...m.hazards],
    }));
  }
}

/** The parts of the hero job with their opening stock; returns ids by part number. */
export async function heroParts(shop: TestShop): Promise<Record<string, string>> {
  const shopId = shop.shop.id;
  const ids: Record<string, string> = {};
  await withShop(shopId, async (tx) => {
    const add = async (sku: string, description: string, sale: string, more: Partial<typeof parts.$inferInsert> = {}) => {
      const id = randomUUID();
      ids[sku] = id;
      await tx.insert(parts).values({ shopId, id, sku, description, descriptionKey: description.toLowerCase(), partClass: "valve", salePriceMinor: cents(sale), ...more });
      return id;
    };
    for (const p of HERO_PARTS) {
      const id = await add(p.sku, p.description, p.sale, { partClass: p.partClass });
      if (p.opening > 0) {
        await tx.insert(stockMovements).values({ shopId, id: randomUUID(), partId: id, qtyMilli: p.opening * 1000, valueMinor: cents(p.unitCost) * p.opening, kind: "opening", at: new Date("2026-01-02T00:00:00Z") });
      }
    }
    await add(HERO_EPOXY.sku, HERO_EPOXY.description, HERO_EPOXY.sale, { partClass: "epoxy", stockUnit: "gram", lotTracked: true });
    const kit = await add(HERO_KIT.sku, HERO_KIT.description, HERO_KIT.sale, { partClass: "kit", isKit: true });
    for (const [sku, n] of HERO_KIT.contents) await tx.insert(kitLines).values({ shopId, kitPartId: kit, partId: ids[sku] ?? "", qtyMilli: n * 1000 });
  });
  return ids;
}

export const HERO_LABOR: readonly [code: string, qty: string][] = [
  ["CLN", "1"], ["TDN", "1"], ["PRT", "1"], ["FLB", "1"], ["EPX", "1"], ["PIN", "1"], ["PEX", "1"], ["SEA", "4"], ["LAP", "1"], ["SPR", "1"], ["LSH", "1"], ["FLF", "1"], ["ASM", "1"], ["INS", "1"],
];
export const HERO_SHELF: readonly [sku: string, qty: string][] = [
  ["KIT-SPG-S250", "1"], ["SEL-55", "4"], ["SHM-748", "4"], ["GSK-S250-HD", "1"], ["EPX-PORT", "1"], ["VIN-S250-310", "2"],
];
export const HERO_FOUND = { labor: [["GDE", "2"]], shelf: [["VEX-S250-265", "2"], ["GDE-S250-BRZ", "2"]] } as const;

/** Lines as the form sends them. */
export function heroLines(ids: Record<string, string>, labor: readonly (readonly [string, string])[], shelf: readonly (readonly [string, string])[]) {
  const menu = new Map<string, (typeof NINEBARK_MENU)[number]>(NINEBARK_MENU.map((m) => [m.code, m]));
  const prices = new Map<string, { description: string; sale: string }>([...HERO_PARTS, HERO_KIT, HERO_EPOXY].map((p) => [p.sku, p]));
  return [
    ...labor.map(([code, qty]) => ({ kind: "labor" as const, pieceNo: 1, operationCode: code, description: menu.get(code)?.name ?? code, qty, unitPrice: menu.get(code)?.price ?? "0" })),
    ...shelf.map(([sku, qty]) => ({ kind: "part" as const, pieceNo: 1, partId: ids[sku] ?? null, description: prices.get(sku)?.description ?? sku, qty, unitPrice: prices.get(sku)?.sale ?? "0" })),
  ];
}

export interface HeroOrder { orderId: string; number: string; pieceId: string; customerId: string; parts: Record<string, string> }

/** Customer, order and piece of the hero job, on 2026-02-17. */
export async function openHero(shop: TestShop, ids: Record<string, string>, mark = "A1193"): Promise<HeroOrder> {
  const counter = shop.as("counter", "2026-02-17T17:00:00Z");
  const customer = must(await addCustomer(counter, { name: "Odalys Brennan", email: "odalys@brennan.example", phone: "303-555-0142", laborDiscountPercent: "5" }));
  const order = must(await openOrder(counter, {
    customerId: customer.id, use: "closed_course", wants: "Full port", promisedOn: "2026-03-20",
    pieces: [{ family: "S250-4V", castingNumber: "K7-2201", serial: mark, declaredValue: "3,200.00" }],
  }));
  return { orderId: order.id, number: order.number, pieceId: order.pieces[0]?.id ?? "", customerId: customer.id, parts: ids };
}

/** Writes and sends the next version. */
export async function sendVersion(shop: TestShop, hero: HeroOrder, lines: ReturnType<typeof heroLines>, at: string, to = "odalys@brennan.example") {
  const draft = must(await startEstimate(shop.as("counter", at), { workOrderId: hero.orderId }));
  const saved = must(await saveEstimate(shop.as("counter", at), {
    estimateId: draft.estimateId, version: draft.version, laborDiscountPercent: "5", freight: "42.00", depositPercent: "30", exclusions: "", message: "", readyOn: "2026-03-20", lines,
  }));
  return must(await sendEstimate(shop.as("counter", at), { estimateId: draft.estimateId, version: saved.version, to }));
}

/** Hash of a sent version, as the customer's page carries it. */
export async function hashOf(shop: TestShop, estimateId: string): Promise<string> {
  const [row] = await withShop(shop.shop.id, (tx) => tx.select({ hash: estimates.documentHash }).from(estimates).where(and(eq(estimates.shopId, shop.shop.id), eq(estimates.id, estimateId))));
  return row?.hash ?? "";
}

export async function pieceVersion(shop: TestShop, pieceId: string): Promise<number> {
  const [row] = await withShop(shop.shop.id, (tx) => tx.select({ v: workPieces.version }).from(workPieces).where(and(eq(workPieces.shopId, shop.shop.id), eq(workPieces.id, pieceId))));
  return row?.v ?? 0;
}

/** The customer as their link makes them. */
export const asCustomer = (shop: TestShop, hero: HeroOrder, estimateId: string, at: string) => openLinkContextFor(shop, hero.customerId, estimateId, at);

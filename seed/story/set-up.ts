import { addCustomer } from "@/modules/customers/commands";
import { openStock } from "@/modules/stock/commands/adjust";
import { addPart, setKit } from "@/modules/stock/commands/parts";
import { addMenuOperation } from "@/modules/work-orders/commands/menu";
import { must, type Cast } from "../cast";
import { HERO_EPOXY, HERO_KIT, HERO_PARTS, NINEBARK_MENU } from "../facts/ninebark";

/** The shop's price list on the wall. `factor` scales prices for a shop of another place. */
export async function menuOnTheWall(cast: Cast, who: string, at: string, priceFactor = 1): Promise<void> {
  for (const [i, m] of NINEBARK_MENU.entries()) {
    must(await addMenuOperation(cast.as(who, at), {
      code: m.code, name: m.name, station: m.station, skill: m.skill, sequence: (i + 1) * 10, bookHours: String(m.bookMinutes / 60),
      price: (Number(m.price) * priceFactor).toFixed(2), needsBefore: [...m.needs], mustRecord: m.record, hazards: [...m.hazards],
    }), `menu ${m.code}`);
  }
}

export interface Shelf { readonly parts: Readonly<Record<string, string>>; readonly suppliers: Readonly<Record<string, string>> }

/** The parts of the hero job and what lies on the shelf of them. Returns ids by part number. */
export async function heroShelf(cast: Cast, who: string, at: string, suppliers: Readonly<Record<string, string>>): Promise<Record<string, string>> {
  const ids: Record<string, string> = {};
  const actor = cast.as(who, at);
  for (const p of HERO_PARTS) {
    const part = must(await addPart(actor, {
      sku: p.sku, description: p.description, partClass: p.partClass, families: "S250-4V", position: p.position, bin: p.bin, salePrice: p.sale,
      preferredSupplierId: suppliers[p.supplier] ?? "",
    }), p.sku);
    ids[p.sku] = part.id;
    if (p.opening > 0) must(await openStock(actor, { partId: part.id, qty: String(p.opening), value: (Number(p.unitCost) * p.opening).toFixed(2), reason: "taken on" }), `opening ${p.sku}`);
  }
  const kit = must(await addPart(actor, { sku: HERO_KIT.sku, description: HERO_KIT.description, partClass: "kit", families: "S250-4V", salePrice: HERO_KIT.sale, isKit: true }));
  ids[HERO_KIT.sku] = kit.id;
  must(await setKit(actor, { kitPartId: kit.id, version: 1, lines: HERO_KIT.contents.map(([sku, n]) => ({ partId: ids[sku] ?? "", qty: String(n) })) }));
  const epoxy = must(await addPart(actor, {
    sku: HERO_EPOXY.sku, description: HERO_EPOXY.description, partClass: "epoxy", stockUnit: "gram", lotTracked: true, salePrice: HERO_EPOXY.sale, hazard: "epoxy resin",
    preferredSupplierId: suppliers[HERO_EPOXY.supplier] ?? "",
  }));
  ids[HERO_EPOXY.sku] = epoxy.id;
  for (const [lot, expiresOn, grams] of HERO_EPOXY.lots) {
    must(await openStock(actor, { partId: epoxy.id, qty: String(grams), value: (grams * 0.124).toFixed(2), lotCode: lot, expiresOn, reason: "taken on" }), `lot ${lot}`);
  }
  return ids;
}

/** Customers by name; returns ids. */
export async function customersOf(cast: Cast, who: string, at: string, people: readonly (Parameters<typeof addCustomer>[1])[]): Promise<Record<string, string>> {
  const ids: Record<string, string> = {};
  for (const c of people) ids[c.name] = must(await addCustomer(cast.as(who, at), c), c.name).id;
  return ids;
}

import { openStock } from "@/modules/stock/commands/adjust";
import { addPart, setKit } from "@/modules/stock/commands/parts";
import { must, type TestShop } from "./shop";

/** Parts of the job in docs/hero-job.md with what is on the shelf before it: quantity and value in whole cents. */
const PARTS = [
  { sku: "SP-S250", description: "Valve spring S250-4V", partClass: "spring", salePrice: "14.00", qty: "40", value: "394.00", bin: "D 1" },
  { sku: "RT-S250", description: "Retainer S250-4V, titanium", partClass: "retainer", salePrice: "12.50", qty: "40", value: "344.00", bin: "C 3" },
  { sku: "KP-S250", description: "Keeper S250-4V", partClass: "keeper", salePrice: "2.00", qty: "80", value: "100.00", bin: "C 2" },
  { sku: "SS-S250", description: "Spring seat S250-4V", partClass: "spring seat", salePrice: "3.50", qty: "40", value: "84.00", bin: "D 2" },
  { sku: "SL-S250", description: "Stem seal S250-4V", partClass: "seal", salePrice: "6.50", qty: "60", value: "147.00", bin: "D 4" },
  { sku: "SH-S250", description: "Lash shim S250-4V", partClass: "lash shim", salePrice: "7.25", qty: "30", value: "78.00", bin: "D 5" },
  { sku: "HG-S250", description: "Head gasket S250", partClass: "gasket", salePrice: "38.50", qty: "5", value: "84.50", bin: "G 1" },
  { sku: "IV-S250", description: "Intake valve S250-4V", partClass: "valve", salePrice: "62.00", qty: "8", value: "251.20", bin: "B 1" },
  { sku: "EV-S250", description: "Exhaust valve S250-4V", partClass: "valve", salePrice: "48.00", bin: "B 2" },
  { sku: "GV-S250", description: "Valve guide S250-4V, exhaust", partClass: "guide", salePrice: "18.75", qty: "6", value: "45.00", bin: "A 4" },
] as const;

const KIT = [["SP-S250", "4"], ["RT-S250", "4"], ["KP-S250", "8"], ["SS-S250", "4"]] as const;

/** Adds them, the spring kit, and epoxy in three lots: E-2511 past its date, E-2602 with 30 g left, E-2604 full. Ids by number. */
export async function heroParts(shop: TestShop, at = "2026-02-16T16:00:00Z"): Promise<(sku: string) => string> {
  const owner = shop.as("owner", at);
  const ids = new Map<string, string>();
  for (const p of PARTS) {
    const { id } = must(await addPart(owner, { sku: p.sku, description: p.description, partClass: p.partClass, salePrice: p.salePrice, bin: p.bin, families: "S250-4V" }));
    ids.set(p.sku, id);
    if ("qty" in p) must(await openStock(owner, { partId: id, qty: p.qty, value: p.value }));
  }
  const id = (sku: string): string => {
    const found = ids.get(sku);
    if (!found) throw new Error(`no part ${sku}`);
    return found;
  };
  const kit = must(await addPart(owner, { sku: "SPK-S250", description: "Spring kit S250-4V", partClass: "kit", salePrice: "189.00", isKit: true }));
  ids.set("SPK-S250", kit.id);
  must(await setKit(owner, { kitPartId: kit.id, version: 1, lines: KIT.map(([sku, qty]) => ({ partId: id(sku), qty })) }));
  const epoxy = must(await addPart(owner, { sku: "EP-04", description: "Port epoxy, 2-part", partClass: "epoxy", salePrice: "0.34", stockUnit: "gram", lotTracked: true, bin: "F 1", hazard: "epoxy resin" }));
  ids.set("EP-04", epoxy.id);
  // The oldest lot was still good when it was opened into the books, and is past its date when the job comes.
  must(await openStock(shop.as("owner", "2026-01-10T16:00:00Z"), { partId: epoxy.id, qty: "100", value: "12.40", lotCode: "E-2511", expiresOn: "2026-01-31" }));
  must(await openStock(owner, { partId: epoxy.id, qty: "30", value: "3.72", lotCode: "E-2602", expiresOn: "2026-06-30" }));
  must(await openStock(owner, { partId: epoxy.id, qty: "1000", value: "124.00", lotCode: "E-2604", expiresOn: "2026-10-31" }));
  return id;
}

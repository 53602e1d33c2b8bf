import { openStock } from "@/modules/stock/commands/adjust";
import { addPart } from "@/modules/stock/commands/parts";
import { must, type Cast } from "../cast";
import { FAMILIES } from "../facts/ninebark";

/** Per class: how many numbers the shelf holds beside the hero's, cost and price from, supplier, bin row. All invented. */
const CLASSES = [
  { partClass: "valve", mark: "V", count: 34, cost: 19, factor: 2, supplier: "Greywater Valve Supply", row: "A", words: "Valve" },
  { partClass: "spring", mark: "S", count: 13, cost: 8, factor: 2.4, supplier: "Ostrander Spring & Wire", row: "B", words: "Valve spring" },
  { partClass: "retainer", mark: "R", count: 9, cost: 7, factor: 2.2, supplier: "Ostrander Spring & Wire", row: "B", words: "Retainer" },
  { partClass: "keeper", mark: "K", count: 5, cost: 1.1, factor: 2.2, supplier: "Ostrander Spring & Wire", row: "B", words: "Keeper half" },
  { partClass: "spring seat", mark: "T", count: 7, cost: 1.9, factor: 2.5, supplier: "Ostrander Spring & Wire", row: "B", words: "Spring seat" },
  { partClass: "seal", mark: "L", count: 9, cost: 2.1, factor: 2.6, supplier: "Cinder Lane Gasket", row: "C", words: "Stem seal" },
  { partClass: "guide", mark: "G", count: 17, cost: 6.8, factor: 2.4, supplier: "Greywater Valve Supply", row: "B", words: "Valve guide" },
  { partClass: "seat ring", mark: "Q", count: 16, cost: 11, factor: 2.3, supplier: "Greywater Valve Supply", row: "B", words: "Seat ring" },
  { partClass: "lash shim", mark: "H", count: 11, cost: 2.4, factor: 2.8, supplier: "Ostrander Spring & Wire", row: "C", words: "Lash shim" },
  { partClass: "gasket", mark: "X", count: 9, cost: 14, factor: 2.2, supplier: "Cinder Lane Gasket", row: "D", words: "Head gasket" },
  { partClass: "weld rod", mark: "W", count: 3, cost: 0.36, factor: 3, supplier: "Halfmoon Welding Stores", row: "E", words: "Weld rod" },
  { partClass: "consumable", mark: "M", count: 4, cost: 4, factor: 2, supplier: "Halfmoon Welding Stores", row: "E", words: "Consumable" },
] as const;
const SHIM = [5.0, 5.05, 5.1, 5.15, 5.2, 5.25, 5.3, 5.35, 5.4, 5.45, 5.5];

/** The rest of the shelf, so that lists look like a shop's. Figures follow from the position in the list, not from chance. */
export async function restOfTheShelf(cast: Cast, who: string, at: string, suppliers: Readonly<Record<string, string>>): Promise<void> {
  for (const c of CLASSES) {
    for (let i = 0; i < c.count; i++) {
      const family = FAMILIES[i % FAMILIES.length] ?? "S250-4V";
      const side = c.partClass === "valve" || c.partClass === "guide" || c.partClass === "seat ring" ? (i % 2 === 0 ? "intake" : "exhaust") : "";
      const cost = (c.cost * (1 + (i % 5) * 0.11)).toFixed(2);
      const size = c.partClass === "lash shim" ? ` ${(SHIM[i] ?? 5).toFixed(2)} mm` : c.partClass === "valve" || c.partClass === "seat ring" ? ` ${(22 + ((i * 7) % 23) / 2).toFixed(1)} mm` : "";
      const beryllium = c.partClass === "seat ring" && i % 4 === 3;
      const part = must(await addPart(cast.as(who, at), {
        sku: `${c.mark}${100 + i}-${family.replace("-", "")}`, description: `${c.words}${size}, ${family}${side ? `, ${side}` : ""}${beryllium ? ", copper beryllium" : ""}`, partClass: c.partClass,
        families: family, position: side, bin: `${c.row}-${String(20 + i).padStart(2, "0")}`, salePrice: (Number(cost) * c.factor).toFixed(2), stockUnit: c.partClass === "weld rod" ? "stick" : "each",
        reorderPoint: String(2 + (i % 4)), orderQty: String(6 + (i % 3) * 2), preferredSupplierId: suppliers[c.supplier] ?? "", hazard: beryllium ? "contains beryllium copper" : "",
      }), c.words);
      const held = (i * 5) % 17;
      if (held > 0) must(await openStock(cast.as(who, at), { partId: part.id, qty: String(held), value: (Number(cost) * held).toFixed(2), reason: "taken on" }));
    }
  }
}

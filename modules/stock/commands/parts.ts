import "server-only";
import { randomUUID } from "node:crypto";
import { and, eq, inArray, ne, sql } from "drizzle-orm";
import { kitLines, parts, stockMovements, suppliers } from "@/db/schema";
import { changedMeanwhile, defineCommand } from "@/modules/access/command";
import type { TxContext } from "@/modules/access/context";
import { ok, refuse, type Result } from "@/modules/kernel/result";
import { lookalikeKey } from "../domain/sku";
import { addPartInput, amountIn, changePartInput, kitInput } from "../input";
import { lockOne, qtyWords } from "./shelf";

const familiesOf = (text: string): string[] => [...new Set(text.split(/[,;]/).map((f) => f.trim()).filter(Boolean))];
const wrongAmount = () => refuse("AMOUNT_DECIMALS", "More decimals than the currency has. Type an amount such as 23.75.", { field: "salePrice" });

async function supplierKnown(ctx: TxContext, id: string): Promise<Result<string | null>> {
  if (id === "") return ok(null);
  const [row] = await ctx.tx.select({ id: suppliers.id }).from(suppliers).where(and(eq(suppliers.shopId, ctx.shop.id), eq(suppliers.id, id)));
  return row ? ok(row.id) : refuse("SUPPLIER_UNKNOWN", "This supplier is not here any more. Choose another.", { field: "preferredSupplierId" });
}

/** Adds a part under a number that was never used before and reads like no other. */
export const addPart = defineCommand({
  name: "stock.addPart",
  act: "parts.write",
  input: addPartInput,
  async run(ctx, input) {
    if (input.salePrice === "") return refuse("PRICE_MISSING", "Type a sale price, or 0 when it is not sold by itself.", { field: "salePrice" });
    const salePriceMinor = amountIn(input.salePrice, ctx.shop.currency);
    if (salePriceMinor === null) return wrongAmount();
    const supplier = await supplierKnown(ctx, input.preferredSupplierId);
    if (!supplier.ok) return supplier;
    const alike = await ctx.tx.select({ sku: parts.sku }).from(parts).where(and(eq(parts.shopId, ctx.shop.id), sql`translate(${parts.sku}, 'OI', '01') = ${lookalikeKey(input.sku)}`));
    if (alike.some((a) => a.sku === input.sku)) return refuse("SKU_TAKEN", `${input.sku} is in use already. A number is never used twice, also when the part is gone.`, { field: "sku" });
    if (alike[0]) return refuse("SKU_LOOKALIKE", `${input.sku} reads like ${alike[0].sku} on a label. Choose a number that differs in more than O and 0 or I and 1.`, { field: "sku" });
    if (input.isKit && input.lotTracked) return refuse("KIT_HAS_NO_SHELF", "A kit has no lots; its parts have.", { field: "lotTracked" });
    const id = randomUUID();
    await ctx.tx.insert(parts).values({
      shopId: ctx.shop.id, id, sku: input.sku, description: input.description, descriptionKey: input.description.toLowerCase(), partClass: input.partClass, families: familiesOf(input.families),
      position: input.position, stockUnit: input.stockUnit, bin: input.bin, salePriceMinor, isKit: input.isKit, lotTracked: input.lotTracked, reorderPointMilli: input.reorderPoint,
      orderQtyMilli: input.orderQty, preferredSupplierId: supplier.value, supplierNumber: input.supplierNumber, materialNote: input.materialNote, hazard: input.hazard,
    });
    return ok({ id, sku: input.sku });
  },
  subject: (_, value) => ({ kind: "part", id: value.id }),
});

/** Changes what may change. Number and kind of a part stay; its unit and lots stay once it has moved. */
export const changePart = defineCommand({
  name: "stock.changePart",
  act: "parts.write",
  input: changePartInput,
  async run(ctx, input) {
    const at = and(eq(parts.shopId, ctx.shop.id), eq(parts.id, input.id));
    const [part] = await ctx.tx.select().from(parts).where(at);
    if (!part) return refuse("NOT_FOUND", "This part is not here any more.");
    if (part.version !== input.version) return changedMeanwhile("This part");
    // A role that does not see sale prices sends none: the price stays.
    const salePriceMinor = input.salePrice === "" ? part.salePriceMinor : amountIn(input.salePrice, ctx.shop.currency);
    if (salePriceMinor === null) return wrongAmount();
    const supplier = await supplierKnown(ctx, input.preferredSupplierId);
    if (!supplier.ok) return supplier;
    if (input.stockUnit !== part.stockUnit || input.lotTracked !== part.lotTracked) {
      const [moved] = await ctx.tx.select({ id: stockMovements.id }).from(stockMovements).where(and(eq(stockMovements.shopId, ctx.shop.id), eq(stockMovements.partId, input.id))).limit(1);
      if (moved) return refuse("PART_HAS_MOVED", `${part.sku} has moved already, so its unit and its lots stay as they are. Make a new part number.`, { field: input.stockUnit !== part.stockUnit ? "stockUnit" : "lotTracked" });
      if (part.isKit && input.lotTracked) return refuse("KIT_HAS_NO_SHELF", "A kit has no lots; its parts have.", { field: "lotTracked" });
    }
    if (!input.active && part.active) {
      const shelf = await lockOne(ctx, input.id);
      if (shelf.onHandMilli > 0) return refuse("STILL_ON_SHELF", `There are ${qtyWords(shelf.onHandMilli, part.stockUnit)} on the shelf. Use or throw them out first.`, { field: "active" });
    }
    const changed = await ctx.tx.update(parts).set({
      description: input.description, descriptionKey: input.description.toLowerCase(), partClass: input.partClass, families: familiesOf(input.families), position: input.position,
      stockUnit: input.stockUnit, bin: input.bin, salePriceMinor, lotTracked: input.lotTracked, reorderPointMilli: input.reorderPoint, orderQtyMilli: input.orderQty,
      preferredSupplierId: supplier.value, supplierNumber: input.supplierNumber, materialNote: input.materialNote, hazard: input.hazard, active: input.active, version: sql`${parts.version} + 1`,
    }).where(and(at, eq(parts.version, input.version))).returning({ version: parts.version });
    return changed[0] ? ok({ id: input.id, sku: part.sku, version: changed[0].version }) : changedMeanwhile("This part");
  },
  subject: (input) => ({ kind: "part", id: input.id }),
});

/** Says what a kit is made of. Open work orders keep the parts they were agreed with. */
export const setKit = defineCommand({
  name: "stock.setKit",
  act: "parts.write",
  input: kitInput,
  async run(ctx, input) {
    const at = and(eq(parts.shopId, ctx.shop.id), eq(parts.id, input.kitPartId));
    const [kit] = await ctx.tx.select({ isKit: parts.isKit, sku: parts.sku }).from(parts).where(at);
    if (!kit) return refuse("NOT_FOUND", "This kit is not here any more.");
    if (!kit.isKit) return refuse("NOT_A_KIT", `${kit.sku} is a single part, not a kit.`);
    const ids = input.lines.map((l) => l.partId);
    const twice = ids.findIndex((id, i) => ids.indexOf(id) !== i);
    if (twice >= 0) return refuse("PART_TWICE", "This part is in the kit already. Change its quantity there.", { field: `lines.${twice}.partId` });
    const known = ids.length ? await ctx.tx.select({ id: parts.id, isKit: parts.isKit }).from(parts).where(and(eq(parts.shopId, ctx.shop.id), inArray(parts.id, ids), ne(parts.id, input.kitPartId))) : [];
    const bad = ids.findIndex((id) => !known.some((k) => k.id === id && !k.isKit));
    if (bad >= 0) return refuse("PART_UNKNOWN", "A kit is made of single parts of this shop. Choose one from the list.", { field: `lines.${bad}.partId` });
    const changed = await ctx.tx.update(parts).set({ version: sql`${parts.version} + 1` }).where(and(at, eq(parts.version, input.version))).returning({ version: parts.version });
    if (!changed[0]) return changedMeanwhile("This kit");
    await ctx.tx.delete(kitLines).where(and(eq(kitLines.shopId, ctx.shop.id), eq(kitLines.kitPartId, input.kitPartId)));
    if (input.lines.length) await ctx.tx.insert(kitLines).values(input.lines.map((l) => ({ shopId: ctx.shop.id, kitPartId: input.kitPartId, partId: l.partId, qtyMilli: l.qty })));
    return ok({ id: input.kitPartId, version: changed[0].version });
  },
  subject: (input) => ({ kind: "part", id: input.kitPartId }),
});

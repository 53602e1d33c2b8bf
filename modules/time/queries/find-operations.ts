import "server-only";
import { and, desc, eq, ilike, isNull, or } from "drizzle-orm";
import { operations, workOrders, workPieces } from "@/db/schema";
import { inShop, mustBeAble, type ShopContext } from "@/modules/access/context";

export interface OperationChoice { readonly id: string; readonly label: string; readonly detail: string; readonly aside: string }

/** Operations by a scrap of tag, order number or name, newest orders first: for time entered after the fact. */
export async function findOperations(ctx: ShopContext, ask: { q: string }): Promise<OperationChoice[]> {
  mustBeAble(ctx, "time.see-own");
  const like = ask.q.split(/\s+/).filter(Boolean).map((w) => `%${w.replace(/[\\%_]/g, (c) => `\\${c}`)}%`);
  const rows = await inShop(ctx, (tx) => tx.select({ id: operations.id, name: operations.name, tag: workPieces.tag, number: workOrders.number, doneAt: operations.doneAt }).from(operations)
    .innerJoin(workPieces, and(eq(workPieces.shopId, operations.shopId), eq(workPieces.id, operations.pieceId)))
    .innerJoin(workOrders, and(eq(workOrders.shopId, operations.shopId), eq(workOrders.id, operations.workOrderId)))
    .where(and(eq(operations.shopId, ctx.shop.id), isNull(operations.removedAt), ...like.map((w) => or(ilike(operations.name, w), ilike(workPieces.tag, w), ilike(workOrders.number, w)))))
    .orderBy(desc(workOrders.openedAt), workPieces.pieceNo, operations.sequence).limit(25));
  return rows.map((r) => ({ id: r.id, label: r.name, detail: [r.tag, r.number].filter(Boolean).join(", "), aside: r.doneAt ? "done" : "" }));
}

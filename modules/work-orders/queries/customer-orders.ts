import "server-only";
import { eq } from "drizzle-orm";
import { workOrders } from "@/db/schema";
import { ableTo, inShop, mustBeAble, type ShopContext } from "@/modules/access/context";
import { orderStatus, type StateDial } from "../domain/piece-status";
import { houseOrders } from "./house";

export interface CustomerOrderRow { number: string; job: string; dial: StateDial; word: string; promisedOn: string | null; totalMinor: number | null; leftMinor: number | null; isOpen: boolean }

/** The orders of one customer, newest first. */
export async function ordersOfCustomer(ctx: ShopContext, customerId: string): Promise<CustomerOrderRow[]> {
  mustBeAble(ctx, "orders.see");
  const seesPrices = ableTo(ctx, "prices.see");
  return inShop(ctx, async (tx) => (await houseOrders({ ...ctx, tx }, eq(workOrders.customerId, customerId))).map((h) => {
    const status = orderStatus(h.pieces.map((p) => p.status));
    return {
      number: h.number, job: `${[...new Set(h.pieces.map((p) => p.family))].join(", ")}${h.pieces.length > 1 ? `, ${h.pieces.length} heads` : ""}`, dial: h.isCancelled ? "out" as const : status?.dial ?? "draft", word: h.isCancelled ? "Called off" : (status?.word ?? ""),
      promisedOn: h.promisedOn, totalMinor: seesPrices ? (h.agreedMinor || h.waiting?.totalMinor || null) : null, leftMinor: seesPrices ? h.leftToPayMinor : null, isOpen: !h.isClosed && !h.isCancelled,
    };
  }));
}

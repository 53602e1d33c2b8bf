import "server-only";
import type { TxContext } from "@/modules/access/context";
import { partsNeededBy, shareOut } from "@/modules/stock/commands/share-out";

/**
 * Reserves what is there for the parts a work order needs. Run when its needs change: agreed, a change agreed, a need
 * added. The earlier promise wins among the orders that wait for the same part.
 */
export async function reserveForWorkOrder(ctx: TxContext, workOrderId: string): Promise<void> {
  await shareOut(ctx, await partsNeededBy(ctx, workOrderId));
}

/** Lets the reservations of an order go, to the orders that wait. Run after `cancelled_at` or `closed_at` is written. */
export const releaseReservations = (ctx: TxContext, workOrderId: string): Promise<void> => reserveForWorkOrder(ctx, workOrderId);

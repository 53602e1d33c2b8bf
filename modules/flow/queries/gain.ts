import "server-only";
import { and, eq } from "drizzle-orm";
import { heads, workOrders, workPieces } from "@/db/schema";
import { ableTo, inShop, mustBeAble, NotFound, settingsOf, type ShopContext } from "@/modules/access/context";
import { logFault } from "@/modules/access/fault";
import type { PortSide } from "../domain/comparison-reasons";
import type { RawTest } from "../domain/raw-test";
import { sideGain, type GainOfPiece, type PortGain, type SideGain } from "../domain/side-gain";
import { standingTests } from "../domain/standing-tests";
import { withRepeatHistory } from "./repeat-history";
import { rawTests } from "./tests-of-head";

/** One side from finished tests. Figures that cannot be computed are withheld as absent, and the fault is logged. */
function sideOf(tests: readonly RawTest[], side: PortSide, hoursMax: number): SideGain {
  const gain = sideGain(standingTests(tests, side, "complete"), side, hoursMax);
  if (gain.ok) return gain.value;
  logFault("flow.gain", new Error(`${gain.refusal.code} on ${side}`));
  return { state: "absent", comparable: false, side, absent: "both" };
}

/** Port pairs that have a finished test, by cylinder. */
export function portGains(tests: readonly (RawTest & { cylinder: number })[], hoursMax: number): PortGain[] {
  const cylinders = [...new Set(tests.filter((t) => t.state === "complete").map((t) => t.cylinder))].sort((a, b) => a - b);
  return cylinders.map((cylinder) => {
    const here = tests.filter((t) => t.cylinder === cylinder);
    return { cylinder, intake: sideOf(here, "intake", hoursMax), exhaust: sideOf(here, "exhaust", hoursMax) };
  });
}

/**
 * What may be said about a piece's flow, side by side: a gain, both tables with the reasons, or what is missing. From finished
 * tests only. For staff who see the flow room, and for the customer whose piece it is. @throws NotFound
 */
export async function gainForPiece(ctx: ShopContext, pieceId: string): Promise<GainOfPiece> {
  const isOwner = ctx.actor.kind === "customer";
  if (!isOwner) mustBeAble(ctx, "flow.see");
  const { hoursMax, piece, tests } = await inShop(ctx, async (tx) => {
    const inner = { ...ctx, tx };
    const [piece] = await tx.select({ pieceId: workPieces.id, tag: workPieces.tag, family: workPieces.family, headId: heads.id, mark: heads.mark, customerId: workOrders.customerId }).from(workPieces)
      .innerJoin(workOrders, and(eq(workOrders.shopId, workPieces.shopId), eq(workOrders.id, workPieces.workOrderId)))
      .leftJoin(heads, and(eq(heads.shopId, workPieces.shopId), eq(heads.pieceId, workPieces.id)))
      .where(and(eq(workPieces.shopId, ctx.shop.id), eq(workPieces.id, pieceId)));
    if (!piece || (isOwner && piece.customerId !== ctx.actor.id)) throw new NotFound("piece");
    return { piece, hoursMax: (await settingsOf(inner)).benchCheckHours, tests: piece.headId ? await withRepeatHistory(inner, (await rawTests(inner, { headIds: [piece.headId] })).filter((t) => t.state === "complete")) : [] };
  });
  return { pieceId, headId: piece.headId, mark: piece.mark ?? piece.tag ?? "", family: piece.family, ports: portGains(tests, hoursMax) };
}

/** True when the reader may see the customer's name beside a head. */
export const seesCustomers = (ctx: ShopContext): boolean => ableTo(ctx, "customers.see");

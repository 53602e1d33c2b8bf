import "server-only";
import { and, eq, gte, isNotNull, isNull, sql } from "drizzle-orm";
import { purchaseOrderLines, purchaseOrders, workOrders, workPieces, workOrderParts, parts } from "@/db/schema";
import { ableTo, inShop, mustBeAble, type ShopContext } from "@/modules/access/context";
import { localDate } from "@/modules/kernel/instant";
import { STATIONS, type Station } from "../domain/floor-station";
import { houseOrders, type HouseOrder, type HousePiece } from "./house";

export interface FloorHead {
  pieceId: string; pieceNo: number; orderNumber: string; tag: string; customer: string; family: string; dial: HousePiece["status"]["dial"]; word: string; since: string | null;
  /** Only while a clock runs on it. */
  running: { person: string; since: string; workedMinutes: number; bookMinutes: number } | null;
}
export interface FloorStation { station: Station; heads: FloorHead[]; leftMinutes: number }
export interface FloorLine { number: string; name: string; words: string }
export interface FloorView {
  now: string; today: string;
  stations: FloorStation[];
  promised: FloorLine[]; waiting: { number: string; name: string; totalMinor: number | null; changeMinor: number | null; since: string; isOpened: boolean }[];
  short: FloorLine[]; ready: { number: string; name: string; leftMinor: number | null }[];
  onTheWay: number; headsHere: number; leftMinutes: number; clocks: number;
  /** Mean days from booked in to handed over, of those that left in the last 30 days; null when none did. */
  daysThrough: number | null;
}

const headOf = (o: HouseOrder, p: HousePiece): FloorHead => ({
  pieceId: p.id, pieceNo: p.pieceNo, orderNumber: o.number, tag: p.tag ?? "", customer: o.customer, family: p.family, dial: p.status.dial, word: p.status.word, since: p.status.since,
  running: p.running ? { person: p.running.person, since: p.running.since, workedMinutes: p.next?.workedMinutes ?? 0, bookMinutes: p.next?.bookMinutes ?? 0 } : null,
});

/** The picture of the floor: every head at its station, and what needs a hand today. */
export async function floorOf(ctx: ShopContext): Promise<FloorView> {
  mustBeAble(ctx, "floor.see");
  const seesPrices = ableTo(ctx, "prices.see");
  return inShop(ctx, async (tx) => {
    const inner = { ...ctx, tx };
    const today = localDate(ctx.now, ctx.shop.zone);
    const orders = await houseOrders(inner, and(isNull(workOrders.closedAt), isNull(workOrders.cancelledAt)));
    const here = orders.flatMap((o) => o.pieces.filter((p) => p.status.station !== null).map((p) => ({ o, p })));
    const stations = STATIONS.map((station): FloorStation => {
      const at = here.filter(({ p }) => p.status.station === station)
        // Clocks first, then what is due, then by promise.
        .sort((a, b) => Number(b.p.running !== null) - Number(a.p.running !== null) || (a.o.promisedOn ?? "9").localeCompare(b.o.promisedOn ?? "9") || (a.p.tag ?? "").localeCompare(b.p.tag ?? ""));
      return { station, heads: at.map(({ o, p }) => headOf(o, p)), leftMinutes: at.reduce((sum, { p }) => sum + (p.next?.station === station || station === "Counter in" ? Math.max(0, (p.next?.bookMinutes ?? 0) - (p.next?.workedMinutes ?? 0)) : 0), 0) };
    });
    const arriving = new Map((await tx.select({ sku: parts.sku, number: sql<string>`min(${purchaseOrders.number})`, due: sql<string | null>`min(${purchaseOrders.expectedOn})::text` })
      .from(workOrderParts).innerJoin(parts, and(eq(parts.shopId, workOrderParts.shopId), eq(parts.id, workOrderParts.partId)))
      .innerJoin(purchaseOrderLines, and(eq(purchaseOrderLines.shopId, parts.shopId), eq(purchaseOrderLines.partId, parts.id)))
      .innerJoin(purchaseOrders, and(eq(purchaseOrders.shopId, purchaseOrderLines.shopId), eq(purchaseOrders.id, purchaseOrderLines.purchaseOrderId)))
      .where(and(eq(workOrderParts.shopId, ctx.shop.id), isNull(workOrderParts.removedAt), eq(purchaseOrders.state, "sent"), sql`${purchaseOrderLines.receivedMilli} < ${purchaseOrderLines.qtyMilli}`)).groupBy(parts.sku)).map((r) => [r.sku, r]));
    const [through] = await tx.select({ days: sql<number | null>`avg(extract(epoch from ${workPieces.handedOverAt} - ${workPieces.bookedInAt}) / 86400)::float8` }).from(workPieces)
      .where(and(eq(workPieces.shopId, ctx.shop.id), isNotNull(workPieces.bookedInAt), gte(workPieces.handedOverAt, new Date(ctx.now.getTime() - 30 * 86_400_000))));
    const notReady = (o: HouseOrder) => o.pieces.some((p) => p.status.dial !== "ready" && p.status.dial !== "out");
    return {
      now: ctx.now.toISOString(), today, stations,
      promised: orders.filter((o) => o.promisedOn !== null && o.promisedOn <= today && (notReady(o) || o.promisedOn === today)).map((o) => ({ number: o.number, name: o.customer, words: promisedWords(o, today) })),
      waiting: orders.flatMap((o) => (o.waiting ? [{ number: o.number, name: o.customer, totalMinor: seesPrices ? o.waiting.totalMinor : null, changeMinor: seesPrices ? o.waiting.changeMinor : null, since: o.waiting.since, isOpened: o.waiting.isOpened }] : [])),
      short: orders.flatMap((o) => o.short.slice(0, 2).map((x) => {
        const po = arriving.get(x.sku);
        return { number: o.number, name: x.description, words: `${x.shortMilli / 1000} short${po?.number ? `, on ${po.number}${po.due ? `, due ${po.due}` : ""}` : ", not on order"}` };
      })),
      ready: orders.filter((o) => o.pieces.length > 0 && o.pieces.every((p) => p.status.dial === "ready" || p.status.dial === "out")).map((o) => ({ number: o.number, name: o.customer, leftMinor: seesPrices ? o.leftToPayMinor : null })),
      onTheWay: orders.reduce((n, o) => n + o.pieces.filter((p) => p.status.word === "On its way in").length, 0),
      headsHere: here.length, leftMinutes: here.reduce((sum, { p }) => sum + p.leftMinutes, 0), clocks: here.filter(({ p }) => p.running !== null).length, daysThrough: through?.days ?? null,
    };
  });
}

function promisedWords(o: HouseOrder, today: string): string {
  const open = o.pieces.filter((p) => p.status.dial !== "ready" && p.status.dial !== "out");
  const late = o.promisedOn !== null && o.promisedOn < today ? "Late. " : "";
  if (open.length === 0) return "Done, at the counter";
  const minutes = open.reduce((sum, p) => sum + p.leftMinutes, 0);
  const next = open[0];
  if (!next?.next) return `${late}${next?.status.word ?? ""}`;
  return `${late}${next.next.name}, ${(minutes / 60).toFixed(1)} h to go`;
}

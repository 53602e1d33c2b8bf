import { dateTime, shortDate, type Place } from "@/modules/kernel/format";
import { localDate } from "@/modules/kernel/instant";
import { LineStrip } from "@/modules/ui/line-strip";
import type { OrderDetail } from "../queries/orders";

type At = Pick<Place, "locale" | "zone">;

/** Where the order is: written, sent, due, taken in. */
export function OrderSteps({ order, place }: { order: OrderDetail; place: At }) {
  if (order.state === "cancelled") return null;
  const day = (iso: string) => shortDate(localDate(new Date(iso), place.zone), place.locale);
  const last = order.receipts[0];
  const open = order.lines.filter((l) => l.openMilli > 0).length;
  const now = order.state === "draft" ? 0 : order.state === "in" ? 3 : order.expectedOn ? 2 : 1;
  return (
    <div style={{ margin: "6px 0 22px" }}>
      <LineStrip variant="steps" label="Where this purchase order is" now={now} stations={[
        { key: "written", label: "Written", note: day(order.createdAt) },
        { key: "sent", label: "Sent", note: order.orderedAt ? `${dateTime(order.orderedAt, place)}${order.mail.length ? ", mail" : ", by hand"}` : "–" },
        { key: "due", label: "Date given", note: order.expectedOn ? `due ${shortDate(order.expectedOn, place.locale)}` : "no date yet" },
        { key: "in", label: "Taken in", note: order.state === "in" && last ? day(last.at) : order.state === "partly in" ? `${open} of ${order.lines.length} lines open` : "–" },
      ]} />
    </div>
  );
}

/** Who wrote it, for what. */
export function orderSub(order: OrderDetail, place: At): string {
  const orders = [...new Set(order.lines.flatMap((l) => (l.workOrderNumber ? [l.workOrderNumber] : [])))];
  const shelf = order.lines.some((l) => l.workOrderNumber === null);
  return [
    order.state === "cancelled" ? "Cancelled" : order.number ?? "Not sent yet", order.revision > 1 ? `revision ${order.revision}` : "", order.orderedBy ? `sent by ${order.orderedBy}` : "",
    orders.length ? `for ${orders.join(", ")}${shelf ? " and stock" : ""}` : "for stock", order.neededBy ? `needed by ${shortDate(order.neededBy, place.locale)}` : "",
  ].filter(Boolean).join(", ");
}

import { hours, money, shortDate } from "@/modules/kernel/format";
import { daysBetween, localDate } from "@/modules/kernel/instant";
import { Flag } from "@/modules/ui/flag";
import { Facts } from "@/modules/ui/kv";
import { LineStrip } from "@/modules/ui/line-strip";
import type { PlaceFacts } from "@/modules/ui/place";
import { Status } from "@/modules/ui/status";
import { Tag } from "@/modules/ui/tag";
import type { OrderPage } from "../queries/order-page";
import { PromiseDialog } from "./order-dialogs";

/** Facts of an order and where its heads are. */
export function OrderTop({ order, place }: { order: OrderPage; place: PlaceFacts }) {
  const { status } = order;
  const agreed = order.versions.find((v) => v.state === "approved");
  const waiting = order.versions.find((v) => v.state === "sent");
  const left = order.promisedOn === null ? null : daysBetween(order.today, order.promisedOn);
  const isOpen = order.closedAt === null && order.cancelledAt === null;
  const day = (iso: string) => shortDate(localDate(new Date(iso), place.zone), place.locale);
  const running = order.pieces.find((p) => p.running)?.running;
  return (
    <>
      <Facts facts={[
        { label: "Status", value: order.cancelledAt ? <Status dial="out">Called off</Status> : status ? <Status dial={status.dial}>{running ? `In work, ${running.person}` : status.word}</Status> : "–" },
        { label: "Promised", value: (
          <>
            {order.promisedOn === null ? <span className="dim">Not set</span> : status?.due && isOpen ? <Flag>{shortDate(order.promisedOn, place.locale)}</Flag> : <b>{shortDate(order.promisedOn, place.locale)}</b>}{" "}
            <span className="mid">{left === null || !isOpen ? "" : left > 0 ? `${left} ${left === 1 ? "day" : "days"}` : left < 0 ? `${-left} ${left === -1 ? "day" : "days"} late` : ""}</span>{" "}
            {isOpen && order.may.edit ? <PromiseDialog orderId={order.id} version={order.version} promisedOn={order.promisedOn} today={order.today} /> : null}
          </>
        ) },
        { label: "Opened", value: <><b>{day(order.openedAt)}</b> <span className="mid">{order.openedBy}</span></> },
        { label: "Worked of book", value: <b className="q">{hours(order.workedMinutes, place.locale)} of {hours(order.bookMinutes, place.locale)} h</b> },
        ...(order.may.prices ? [{ label: agreed ? "Approved" : waiting ? "Waits for a yes" : "Estimate", value: agreed?.totalMinor != null
          ? <><b>{money(agreed.totalMinor, place)}</b> <span className="mid">{agreed.answer ? `${day(agreed.answer.at)}, ${agreed.answer.via === "link" ? "by link" : agreed.answer.via === "phone" ? "by phone" : "at the counter"}` : ""}</span></>
          : waiting?.totalMinor != null ? <><b>{money(waiting.totalMinor, place)}</b> <span className="mid">{waiting.openedAt ? "opened" : "not opened"}</span></> : <span className="dim">{order.versions.length > 0 ? "Draft" : "None yet"}</span> }] : []),
        { label: order.pieces.length === 1 ? "Head" : "Heads", value: <span className="flex flex-wrap gap-1">{order.pieces.slice(0, 4).map((p) => (p.tag ? <Tag key={p.id} running={p.running !== null} href={`/s/${place.slug}/orders/${order.number}/pieces/${p.pieceNo}`}>{p.tag}</Tag> : <span key={p.id} className="dim">{p.family}, not in</span>))}{order.pieces.length > 4 ? <span className="dim">+{order.pieces.length - 4}</span> : null}</span> },
      ]} />
      <div className="mb-6 mt-5"><LineStrip label={`Where order ${order.number} is`} stations={order.line.map((l) => ({ key: l.station, label: l.station, note: l.note }))} now={order.lineNow} /></div>
    </>
  );
}

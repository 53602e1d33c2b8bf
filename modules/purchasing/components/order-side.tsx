"use client";
import Link from "next/link";
import { TERMS_WORDS, type Terms } from "@/modules/customers/domain/terms";
import { amount, dateTime, shortDate } from "@/modules/kernel/format";
import { qtyText } from "@/modules/stock/domain/qty-text";
import { Bay, Bays } from "@/modules/ui/bay";
import { usePlace } from "@/modules/ui/place";
import { Tag } from "@/modules/ui/tag";
import type { OrderDetail } from "../queries/orders";
import { ReverseReceiptDialog } from "./order-acts";

const MAIL_WORDS: Record<string, string> = { queued: "on its way", sent: "sent", failed: "not delivered" };

/** The side of a purchase order: supplier, who is held up, what was taken in, what was mailed. */
export function OrderSide({ order, canReceive }: { order: OrderDetail; canReceive: boolean }) {
  const place = usePlace();
  const { slug, locale } = place;
  const s = order.supplier;
  return (
    <Bays>
      <Bay label="Supplier">
        <b>{s.name}</b>
        <p className="mid" style={{ whiteSpace: "pre-line" }}>{[s.email, s.phone, s.address, [s.leadDays === null ? "" : `${s.leadDays} days`, TERMS_WORDS[s.terms as Terms] ?? s.terms].filter(Boolean).join(", ")].filter(Boolean).join("\n")}</p>
      </Bay>
      {order.held.length ? (
        <Bay label="Held up by this order">
          <div className="grid gap-3">{order.held.map((h) => (
            <div key={h.number}>
              <p style={{ display: "flex", gap: 6, flexWrap: "wrap", marginBottom: 6 }}>{h.tags.map((t) => <Tag key={t}>{t}</Tag>)}</p>
              <p className="mid"><Link className="lk" href={`/s/${slug}/orders/${h.number}`}>{h.number}</Link>{h.promisedOn ? `, promised ${shortDate(h.promisedOn, locale)}` : ", no promise yet"}</p>
            </div>
          ))}</div>
        </Bay>
      ) : null}
      {order.receipts.length ? (
        <Bay label="Taken in">
          <div className="grid gap-3">{order.receipts.map((r) => (
            <div key={r.id}>
              <p style={{ display: "flex", justifyContent: "space-between", gap: 8 }}><b className={r.reversed ? "line-through" : ""}>{r.number}</b>{canReceive && !r.reversed ? <ReverseReceiptDialog receipt={r} /> : r.reversed ? <span className="mid sm">reversed</span> : null}</p>
              <p className="mid sm">{[dateTime(r.at, place), r.personName].filter(Boolean).join(", ")}</p>
              <p className="sm">{r.lines.map((l) => `${qtyText(l.qtyMilli, "each")} ${l.sku}${l.lotCode ? ` (${l.lotCode})` : ""}${l.landedMinor === null ? "" : ` ${amount(l.landedMinor, place)}`}`).join(", ")}</p>
              {r.deliveryNote ? <p className="mid sm">{r.deliveryNote}</p> : null}
            </div>
          ))}</div>
        </Bay>
      ) : null}
      {order.mail.length ? (
        <Bay label="Mail"><ul className="grid gap-1 sm">{order.mail.map((m) => <li key={m.id}>{`${MAIL_WORDS[m.state] ?? m.state} to ${m.to}, ${dateTime(m.at, place)}`}{m.state === "failed" && m.error ? <span className="mid">{` (${m.error})`}</span> : null}</li>)}</ul></Bay>
      ) : null}
      {order.notes ? <Bay label="Notes"><p style={{ whiteSpace: "pre-line" }}>{order.notes}</p></Bay> : null}
    </Bays>
  );
}

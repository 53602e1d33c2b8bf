"use client";
import Link from "next/link";
import { useState } from "react";
import { amount } from "@/modules/kernel/format";
import { qtyText } from "@/modules/stock/domain/qty-text";
import { Bay, Bays } from "@/modules/ui/bay";
import { usePlace } from "@/modules/ui/place";
import type { OrderDetail } from "../queries/orders";
import { OrderLinesForm } from "./order-lines-form";
import { ReceiveForm } from "./receive-form";

/** The lines of a purchase order: to write while it is not sent, to take in afterwards, to read when all is in. */
export function OrderBody({ order, canWrite, canReceive }: { order: OrderDetail; canWrite: boolean; canReceive: boolean }) {
  const place = usePlace();
  const [editing, setEditing] = useState(false);
  const isOpen = order.state === "sent" || order.state === "partly in";
  if (order.state === "draft" && canWrite) return <Bay label="Lines"><OrderLinesForm key={order.version} order={order} /></Bay>;
  if (editing) return <Bay label={`Lines, revision ${order.revision + 1}`} aside={<button type="button" className="lk" onClick={() => setEditing(false)}>Leave it</button>}><OrderLinesForm key={order.version} order={order} onDone={() => setEditing(false)} /></Bay>;
  const change = canWrite && order.rawState === "sent" ? <button type="button" className="lk" onClick={() => setEditing(true)}>Change lines</button> : undefined;
  const ordered = (
    <Bay label={isOpen && canReceive ? "Ordered" : "Lines"} flush aside={change}>
      <table className="calm">
        <caption className="sr-only">Lines of this purchase order</caption>
        <thead><tr><th className="w2">No.</th><th>Part</th><th className="w2">For</th><th className="r">Ordered</th><th className="r">Came</th>{order.partsMinor === null ? null : <><th className="r hide-s">Cost each</th><th className="r">{`Cost ${place.currency}`}</th></>}</tr></thead>
        <tbody>{order.lines.map((l) => (
          <tr key={l.id}>
            <td className="q mid w2 nw">{l.sku}</td><td className="b"><Link className="hover:underline underline-offset-[3px]" href={`/s/${place.slug}/parts/${encodeURIComponent(l.sku)}`}>{l.description}</Link>{l.supplierNumber ? <span className="dim sm" style={{ display: "block", fontWeight: 400 }}>{l.supplierNumber}</span> : null}</td><td className="mid w2">{l.workOrderNumber ?? "Stock"}</td>
            <td className="r q">{qtyText(l.qtyMilli, l.stockUnit)}</td><td className="r q">{qtyText(l.receivedMilli, l.stockUnit)}</td>
            {l.unitPriceMinor === null || l.valueMinor === null ? null : <><td className="r q hide-s">{amount(l.unitPriceMinor, place)}</td><td className="r q b">{amount(l.valueMinor, place)}</td></>}
          </tr>
        ))}</tbody>
        {order.partsMinor === null ? null : (
          <tfoot><tr><td className="w2" /><td /><td className="w2" /><td /><td className="r" style={{ lineHeight: 1.5, paddingBlock: 10 }}>Parts{order.freightMinor ? <><br /><span className="mid" style={{ fontWeight: 400 }}>Freight</span><br />Total</> : null}</td><td className="hide-s" /><td className="r q" style={{ lineHeight: 1.5 }}>{amount(order.partsMinor, place)}{order.freightMinor ? <><br /><span style={{ fontWeight: 400 }}>{amount(order.freightMinor, place)}</span><br />{amount(order.partsMinor + order.freightMinor, place)}</> : null}</td></tr></tfoot>
        )}
      </table>
    </Bay>
  );
  return (
    <Bays className="min-w-0">
      {isOpen && canReceive ? <Bay label="Take in delivery" flush><ReceiveForm key={order.version} order={order} /></Bay> : null}
      {ordered}
    </Bays>
  );
}

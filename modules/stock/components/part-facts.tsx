"use client";
import Link from "next/link";
import { amount, date, shortDate } from "@/modules/kernel/format";
import { Bay, Bays } from "@/modules/ui/bay";
import { Flag } from "@/modules/ui/flag";
import { Kv, type Pair } from "@/modules/ui/kv";
import { Note } from "@/modules/ui/note";
import { usePlace } from "@/modules/ui/place";
import { qtyText } from "../domain/qty-text";
import type { PartDetail } from "../queries/get-part";
import { PartFigures } from "./part-figures";

/** The side of a part's page: figures, facts, lots, who waits, what is coming. */
export function PartFacts({ part, seesOrders }: { part: PartDetail; seesOrders: boolean }) {
  const place = usePlace();
  const { slug, locale } = place;
  const facts: Pair[] = [
    ["Fits", part.families.join(", ") || "not said"], ...(part.position ? [["Side", part.position] as Pair] : []), ["Supplier", [part.supplierName ?? "none chosen", part.supplierNumber].filter(Boolean).join(", ")],
    ...(part.salePriceMinor === null ? [] : [["Sale price", amount(part.salePriceMinor, place)] as Pair]), ...(part.lastPriceMinor === null ? [] : [["Last paid", amount(part.lastPriceMinor, place)] as Pair]),
    ...(part.valueMinor === null || part.isKit ? [] : [["On the shelf, worth", amount(part.valueMinor, place)] as Pair, ["Average cost", part.unitCost ?? "–"] as Pair]),
    ...(part.materialNote ? [["Material", part.materialNote] as Pair] : []), ...(part.inKits.length ? [["In kits", part.inKits.map((k) => k.sku).join(", ")] as Pair] : []),
  ];
  return (
    <Bays>
      <Bay label="Stock">
        <PartFigures part={part} locale={locale} />
        {part.hazard ? <Note className="mt-4" title={`${part.hazard[0]?.toUpperCase() ?? ""}${part.hazard.slice(1)}.`}>Dust and fumes can do harm. Follow the maker&rsquo;s safety data sheet and your local rules.</Note> : null}
        <div style={{ marginTop: 16 }}><Kv pairs={facts} /></div>
      </Bay>
      {part.isKit ? (
        <Bay label="Contents" flush><table className="calm"><caption className="sr-only">Contents of one kit</caption><tbody>{part.kit.map((k) => (
          <tr key={k.partId}><td className="b"><Link className="lk" href={`/s/${slug}/parts/${encodeURIComponent(k.sku)}`}>{k.description}</Link></td><td className="r q">{qtyText(k.qtyMilli, k.stockUnit)}</td><td className="r mid">{`${qtyText(k.freeMilli, k.stockUnit)} free`}</td></tr>
        ))}</tbody></table></Bay>
      ) : null}
      {part.lots.length ? (
        <Bay label="Lots, oldest first" flush><table className="calm"><caption className="sr-only">Lots</caption><tbody>{part.lots.map((l) => (
          <tr key={l.id}><td className="b">{l.code}</td><td>{l.state === "gone" ? "gone" : `${qtyText(l.onHandMilli, part.stockUnit)} left`}</td>
            <td>{l.state === "expired" ? <Flag>{`Expired ${l.expiresOn ? date(l.expiresOn, locale) : ""}`}</Flag> : <span className={l.state === "soon" ? "b" : "mid"}>{l.expiresOn ? date(l.expiresOn, locale) : "no date"}</span>}</td></tr>
        ))}</tbody></table></Bay>
      ) : null}
      {part.waiting.length ? (
        <Bay label="Promised to" flush><table className="calm"><caption className="sr-only">Orders that need it</caption><tbody>{part.waiting.map((w) => (
          <tr key={w.number}><td className="b"><Link className="lk" href={`/s/${slug}/orders/${w.number}`}>{w.number}</Link></td><td className="mid">{w.promisedOn ? shortDate(w.promisedOn, locale) : "no date"}</td><td className="r q">{qtyText(w.needMilli, part.stockUnit)}</td>
            <td>{w.reservedMilli >= w.needMilli ? <span className="mid">Reserved</span> : <Flag>{`${qtyText(w.needMilli - w.reservedMilli, part.stockUnit)} short`}</Flag>}</td></tr>
        ))}</tbody></table></Bay>
      ) : null}
      {part.onOrder.length ? (
        <Bay label="On order" flush><table className="calm"><caption className="sr-only">Purchase orders</caption><tbody>{part.onOrder.map((o, i) => (
          <tr key={i}><td className="b">{seesOrders && o.number ? <Link className="lk" href={`/s/${slug}/purchases/${o.number}`}>{o.number}</Link> : (o.number ?? "")}</td><td className="mid">{o.expectedOn ? shortDate(o.expectedOn, locale) : "no date yet"}</td><td className="r q">{qtyText(o.openMilli, part.stockUnit)}</td></tr>
        ))}</tbody></table></Bay>
      ) : null}
    </Bays>
  );
}

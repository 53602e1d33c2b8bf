"use client";
import { useQuery } from "@tanstack/react-query";
import Link from "next/link";
import { amount, date, shortDate } from "@/modules/kernel/format";
import { localDate } from "@/modules/kernel/instant";
import { getJson } from "@/modules/ui/fetch-json";
import { Flag } from "@/modules/ui/flag";
import { usePlace } from "@/modules/ui/place";
import { movementWords } from "../domain/part-words";
import { qtyText, signedQtyText } from "../domain/qty-text";
import type { PartDetail } from "../queries/get-part";
import type { LedgerRow } from "../queries/ledger";
import { PartFigures } from "./part-figures";

const TABLE = "calm sm [&_td:first-child]:pl-0 [&_td:last-child]:pr-0 [&_td]:h-8";
const HEAD = { margin: "18px 0 2px" } as const;

/** The picked part beside the list: figures, lots oldest first, the last rows of its ledger. */
export function PartPanel({ part }: { part: PartDetail }) {
  const place = usePlace();
  const { slug, locale } = place;
  const { data } = useQuery({ queryKey: ["ledger", slug, part.id, "short"], queryFn: ({ signal }) => getJson<{ rows: LedgerRow[] }>(`/api/v1/s/${slug}/parts/${part.id}/movements`, { limit: 6 }, signal) });
  const lots = part.lots.slice(0, 5);
  return (
    <div className="plate">
      <div style={{ display: "flex", justifyContent: "space-between", gap: 12 }}>
        <div className="min-w-0">
          <h2 className="font-cut" style={{ fontSize: "1.375rem", lineHeight: 1.15, fontWeight: 720 }}>{part.description}</h2>
          <p className="mid">{[part.sku, part.bin ? `shelf ${part.bin}` : "", part.supplierName].filter(Boolean).join(", ")}</p>
        </div>
        <Link className="lk sm" href={`/s/${slug}/parts/${encodeURIComponent(part.sku)}`}>Open</Link>
      </div>
      <div style={{ margin: "14px 0" }}><PartFigures part={part} locale={locale} /></div>
      {part.isKit ? (
        <>
          <h3 className="eng" style={HEAD}>In the kit</h3>
          <table className={TABLE}><tbody>{part.kit.map((k) => <tr key={k.partId}><td className="b">{k.description}</td><td className="r q">{qtyText(k.qtyMilli, k.stockUnit)}</td><td className="r mid sm nw">{`${qtyText(k.freeMilli, k.stockUnit)} free`}</td></tr>)}</tbody></table>
        </>
      ) : null}
      {lots.length ? (
        <>
          <h3 className="eng" style={HEAD}>Lots, oldest first</h3>
          <table className={TABLE}><tbody>{lots.map((l) => (
            <tr key={l.id}><td className="b">{l.code}</td><td>{`${qtyText(l.onHandMilli, part.stockUnit)} left`}</td>
              <td>{l.state === "expired" ? <Flag>{`Expired ${l.expiresOn ? date(l.expiresOn, locale) : ""}`}</Flag> : l.state === "soon" ? <Flag tone="open">{l.expiresOn ? date(l.expiresOn, locale) : ""}</Flag> : <span className="mid">{l.expiresOn ? date(l.expiresOn, locale) : "no date"}</span>}</td></tr>
          ))}</tbody></table>
        </>
      ) : null}
      {part.waiting.length ? (
        <>
          <h3 className="eng" style={HEAD}>Promised to</h3>
          <table className={TABLE}><tbody>{part.waiting.slice(0, 5).map((w) => (
            <tr key={w.number}><td className="b"><Link className="lk" href={`/s/${slug}/orders/${w.number}`}>{w.number}</Link></td><td className="mid">{w.promisedOn ? shortDate(w.promisedOn, locale) : "no date"}</td><td className="r q">{qtyText(w.needMilli, part.stockUnit)}</td></tr>
          ))}</tbody></table>
        </>
      ) : null}
      {part.isKit ? null : (
        <>
          <h3 className="eng" style={HEAD}>Ledger</h3>
          <table className={TABLE}><tbody>{(data?.rows ?? []).map((r) => (
            <tr key={r.id}><td className="mid nw">{shortDate(localDate(new Date(r.at), place.zone), locale)}</td><td>{[movementWords(r.kind), r.workOrderNumber, r.lotCode].filter(Boolean).join(", ")}</td><td className="r q b nw">{signedQtyText(r.qtyMilli, part.stockUnit)}</td><td className="r q mid nw">{qtyText(r.afterMilli, part.stockUnit)}</td></tr>
          ))}</tbody></table>
        </>
      )}
      {part.valueMinor !== null && !part.isKit ? <p className="mid sm" style={{ marginTop: 14 }}>{`Worth ${amount(part.valueMinor, place)}${part.unitCost ? `, ${part.unitCost} each` : ""}`}</p> : null}
    </div>
  );
}

import type { Shop } from "@/modules/access/context";
import { amount, dateTime } from "@/modules/kernel/format";
import { TextLink } from "@/modules/ui/text-link";
import { DISPUTE_WORDS } from "../domain/dispute";
import type { DisputeView } from "../queries";

/** Charges that a customer's bank questions or took back. Evidence is handed in at the provider's own pages. */
export function DisputeList({ rows, place }: { rows: readonly DisputeView[]; place: Shop }) {
  if (rows.length === 0) return null;
  return (
    <section className="mb-6">
      <h2 className="section-h">Disputed charges</h2>
      <ul>{rows.map((d) => (
        <li key={d.id} className="flex flex-wrap items-baseline gap-3 border-b border-line py-3">
          <b className="num n-s">{amount(d.amountMinor, place)}</b>
          <span>
            <b>{d.customer}</b>, receipt {d.receiptNumber}{d.invoice ? <>, invoice <TextLink href={`/s/${place.slug}/books/invoices/${d.invoice.id}`}>{d.invoice.number}</TextLink></> : null}: {DISPUTE_WORDS[d.phase]}.
            <span className="sm mid block">Since {dateTime(d.since, place)}{d.evidenceBy ? `. Evidence (approval, photos, release, tracking) goes to the payment provider by ${dateTime(d.evidenceBy, place)}` : ""}.</span>
          </span>
        </li>
      ))}</ul>
    </section>
  );
}

import { amount, date } from "@/modules/kernel/format";
import { EmptyState } from "@/modules/ui/empty-state";
import { Lane } from "@/modules/ui/lane";
import { TextLink } from "@/modules/ui/text-link";
import type { EntryView } from "../queries";

/** Where an entry's document is read; null when it has no page of its own. */
function sourceHref(slug: string, e: EntryView): string | null {
  if (e.sourceKind === "invoice") return `/s/${slug}/books/invoices/${e.sourceId.split(":")[0] ?? ""}`;
  return e.orderNumber ? `/s/${slug}/orders/${e.orderNumber}` : null;
}

/** Entries with their lines, debit and credit apart; each opens to what it was booked from. */
export function JournalList({ rows, slug, place }: { rows: readonly EntryView[]; slug: string; place: { locale: string; currency: string } }) {
  if (rows.length === 0) return <EmptyState title="Nothing booked here">Documents post by fixed rules: an invoice when it is issued, parts when they leave the shelf.</EmptyState>;
  return (
    <Lane label="Journal">
      <table>
        <caption className="sr-only">Journal, newest first</caption>
        <thead><tr><th scope="col">No.</th><th scope="col">Date</th><th scope="col">Entry</th><th scope="col">Account</th><th scope="col" className="r">Debit</th><th scope="col" className="r">Credit</th></tr></thead>
        <tbody>
          {rows.flatMap((e) => {
            const href = sourceHref(slug, e);
            return e.lines.map((l, i) => (
              <tr key={`${e.id}${i}`}>
                <td className="q">{i === 0 ? e.number : ""}</td>
                <td className="nw">{i === 0 ? date(e.date, place.locale) : ""}</td>
                <td className="min-w-48">{i === 0 ? (href ? <TextLink href={href}>{e.text}</TextLink> : <b>{e.text}</b>) : i === 1 ? <span className="mid sm">{[e.customer, e.orderNumber, e.by].filter(Boolean).join(", ")}</span> : ""}</td>
                <td className="min-w-36"><TextLink href={`/s/${slug}/books/journal?account=${l.account}`}>{l.account}</TextLink> {l.name}</td>
                <td className="r q">{l.amountMinor > 0 ? amount(l.amountMinor, place) : ""}</td>
                <td className="r q">{l.amountMinor < 0 ? amount(-l.amountMinor, place) : ""}</td>
              </tr>
            ));
          })}
        </tbody>
      </table>
    </Lane>
  );
}

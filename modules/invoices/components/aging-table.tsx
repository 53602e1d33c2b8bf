import { amount } from "@/modules/kernel/format";
import { EmptyState } from "@/modules/ui/empty-state";
import { Lane } from "@/modules/ui/lane";
import { AGING_BUCKETS } from "../domain/aging";
import type { AgingView } from "../queries";

const HEADS = { "not due": "Not due", "1-30": "1 to 30 days", "31-60": "31 to 60", "61-90": "61 to 90", "over 90": "Over 90" } as const;

/** Who owes what for how long. Credit not used yet stands apart and is not taken off. */
export function AgingTable({ view, place }: { view: AgingView; place: { locale: string; currency: string } }) {
  const a = (minor: number) => (minor === 0 ? "" : amount(minor, place));
  if (view.rows.length === 0) return <EmptyState title="Nobody owes anything">Issued invoices stand here by customer until they are paid.</EmptyState>;
  return (
    <Lane label="Open sums by days past due">
      <table>
        <caption className="sr-only">Open sums by days past due</caption>
        <thead><tr><th scope="col">Customer</th>{AGING_BUCKETS.map((b) => <th key={b} scope="col" className="r">{HEADS[b]}</th>)}<th scope="col" className="r">Open</th><th scope="col" className="r">Credit held</th></tr></thead>
        <tbody>{view.rows.map((r) => <tr key={r.customerId}><td><b>{r.customer}</b></td>{AGING_BUCKETS.map((b) => <td key={b} className="r q">{a(r.buckets[b])}</td>)}<td className="r q b">{a(r.totalMinor)}</td><td className="r q">{a(r.creditMinor)}</td></tr>)}</tbody>
        <tfoot><tr><th scope="row">All</th>{AGING_BUCKETS.map((b) => <td key={b} className="r q b">{a(view.buckets[b])}</td>)}<td className="r q b">{amount(view.totalMinor, place)}</td><td /></tr></tfoot>
      </table>
    </Lane>
  );
}

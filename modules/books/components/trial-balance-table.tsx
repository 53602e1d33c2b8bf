import { amount } from "@/modules/kernel/format";
import { Lane } from "@/modules/ui/lane";
import { TextLink } from "@/modules/ui/text-link";
import type { TrialBalanceView } from "../queries";

/** Every account; each opens to its entries. The sum under it is 0.00. */
export function TrialBalanceTable({ view, slug, place }: { view: TrialBalanceView; slug: string; place: { locale: string; currency: string } }) {
  const a = (minor: number) => amount(minor, place);
  return (
    <Lane label="Trial balance">
      <table>
        <caption className="sr-only">Trial balance</caption>
        <thead><tr><th scope="col">Account</th><th scope="col">Name</th><th scope="col" className="r">Debit</th><th scope="col" className="r">Credit</th><th scope="col" className="r">Balance</th></tr></thead>
        <tbody>
          {view.rows.map((r) => (
            <tr key={r.code}><td className="q"><TextLink href={`/s/${slug}/books/journal?account=${r.code}`}>{r.code}</TextLink></td><td>{r.name}</td><td className="r q">{a(r.debitMinor)}</td><td className="r q">{a(r.creditMinor)}</td><td className="r q b">{a(r.balanceMinor)}</td></tr>
          ))}
        </tbody>
        <tfoot><tr><th scope="row" colSpan={2}>Sum</th><td className="r q b">{a(view.debitMinor)}</td><td className="r q b">{a(view.creditMinor)}</td><td className="r q b">{a(view.sumMinor)}</td></tr></tfoot>
      </table>
    </Lane>
  );
}

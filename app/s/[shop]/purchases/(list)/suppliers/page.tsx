import Link from "next/link";
import { ableTo } from "@/modules/access/context";
import { shopPage } from "@/modules/access/page";
import { TERMS_WORDS, type Terms } from "@/modules/customers/domain/terms";
import { findSuppliers } from "@/modules/purchasing/queries/suppliers";
import { LinkButton } from "@/modules/ui/button";
import { EmptyState } from "@/modules/ui/empty-state";
import { Lane } from "@/modules/ui/lane";
import { PageHead } from "@/modules/ui/page-head";

export const metadata = { title: "Suppliers" };

export default async function SuppliersPage({ params }: { params: Promise<{ shop: string }> }) {
  const ctx = await shopPage(params, "purchase.see");
  const rows = await findSuppliers(ctx);
  const at = `/s/${ctx.shop.slug}/purchases/suppliers`;
  const canWrite = ableTo(ctx, "purchase.write");
  return (
    <main id="main" className="page">
      <PageHead title="Suppliers" sub={<Link className="lk" href={`/s/${ctx.shop.slug}/purchases`}>Purchase orders</Link>} actions={canWrite ? <LinkButton href={`${at}/new`} size="sm">Add a supplier</LinkButton> : undefined} />
      {rows.length === 0 ? <EmptyState title="No suppliers yet" action={canWrite ? <LinkButton href={`${at}/new`}>Add a supplier</LinkButton> : undefined}>A supplier is added once, with the address orders go to.</EmptyState> : (
        <Lane label="Suppliers"><table>
          <caption className="sr-only">Suppliers</caption>
          <thead><tr><th>Name</th><th>Orders go to</th><th className="w2">Terms</th><th className="r">Takes</th><th className="r">Parts</th><th className="r">Open orders</th></tr></thead>
          <tbody>{rows.map((s) => (
            <tr key={s.id}><td className="b">{canWrite ? <Link className="lk" href={`${at}/${s.id}`}>{s.name}</Link> : s.name}{s.active ? "" : <span className="mid"> no longer used</span>}</td><td className="mid">{s.email || s.phone || "no address yet"}</td>
              <td className="mid w2">{TERMS_WORDS[s.terms as Terms] ?? s.terms}</td><td className="r q">{s.leadDays === null ? "–" : `${s.leadDays} days`}</td><td className="r q">{s.partCount}</td><td className="r q">{s.openOrders}</td></tr>
          ))}</tbody>
        </table></Lane>
      )}
    </main>
  );
}

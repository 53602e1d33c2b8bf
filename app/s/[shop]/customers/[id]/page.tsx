import Link from "next/link";
import { notFound } from "next/navigation";
import { ableTo } from "@/modules/access/context";
import { orNotFound, shopPage } from "@/modules/access/page";
import { CustomerForm } from "@/modules/customers/components/customer-form";
import { getCustomer } from "@/modules/customers/queries";
import { amount, date, shortDate } from "@/modules/kernel/format";
import { Bay, Bays } from "@/modules/ui/bay";
import { LinkButton } from "@/modules/ui/button";
import { Lane } from "@/modules/ui/lane";
import { Note } from "@/modules/ui/note";
import { PageHead } from "@/modules/ui/page-head";
import { Status } from "@/modules/ui/status";
import { ordersOfCustomer } from "@/modules/work-orders/queries/customer-orders";

export const metadata = { title: "Customer" };

export default async function CustomerPage({ params }: { params: Promise<{ shop: string; id: string }> }) {
  const ctx = await shopPage(params, "customers.see");
  const { id } = await params;
  if (!/^[0-9a-f-]{36}$/.test(id)) notFound();
  const customer = await orNotFound(getCustomer(ctx, id));
  const orders = await ordersOfCustomer(ctx, id);
  const { slug, locale } = ctx.shop;
  const open = orders.filter((o) => o.isOpen).length;
  return (
    <main id="main" className="page">
      <PageHead
        title={customer.name} sub={<>{customer.phone ? <a className="lk" href={`tel:${customer.phone}`}>{customer.phone}</a> : null} Since {date(customer.since.slice(0, 10), locale)}. {orders.length} {orders.length === 1 ? "order" : "orders"}, {open} open.</>}
        actions={ableTo(ctx, "orders.open") ? <LinkButton variant="go" icon="plus" href={`/s/${slug}/orders/new?customer=${id}`}>New work order</LinkButton> : undefined}
      />
      {customer.mailProblem ? <Note tone="warn" title="Mail comes back.">{customer.mailProblem}. Call them, and mend the address below.</Note> : null}
      <Bays className="mt-4">
        <Bay label="Orders" flush>
          {orders.length === 0 ? <p className="mid px-[18px] pb-3 pt-1">No order yet.</p> : (
            <Lane label="Orders"><table>
              <thead><tr><th scope="col">Order</th><th scope="col">Job</th><th scope="col">Status</th><th scope="col">Promised</th><th scope="col" className="r">Agreed {ctx.shop.currency}</th><th scope="col" className="r">Left</th></tr></thead>
              <tbody>{orders.map((o) => (
                <tr key={o.number}>
                  <td><Link className="ord lk" href={`/s/${slug}/orders/${o.number}`}>{o.number}</Link></td><td className="mid">{o.job}</td><td><Status dial={o.dial}>{o.word}</Status></td>
                  <td className="q">{o.promisedOn ? shortDate(o.promisedOn, locale) : "–"}</td><td className="r q">{o.totalMinor === null ? "–" : amount(o.totalMinor, ctx.shop)}</td><td className="r q">{o.leftMinor ? amount(o.leftMinor, ctx.shop) : "–"}</td>
                </tr>
              ))}</tbody>
            </table></Lane>
          )}
        </Bay>
        <Bay label="Card" className="max-w-[920px]"><CustomerForm key={customer.version} customer={customer} mayChange={ableTo(ctx, "customers.write")} /></Bay>
      </Bays>
    </main>
  );
}

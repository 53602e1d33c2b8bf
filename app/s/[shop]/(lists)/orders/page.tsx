import { ableTo } from "@/modules/access/context";
import { shopPage } from "@/modules/access/page";
import { OrdersTable } from "@/modules/work-orders/components/orders-table";
import { findOrdersInput } from "@/modules/work-orders/input";
import { findOrders } from "@/modules/work-orders/queries/orders";

export const metadata = { title: "Work orders" };

export default async function OrdersPage({ params, searchParams }: { params: Promise<{ shop: string }>; searchParams: Promise<Record<string, string | string[] | undefined>> }) {
  const ctx = await shopPage(params, "orders.see");
  const { view, q, station, person, promised, sort, descending } = await searchParams;
  // An address somebody mended by hand shows the plain list rather than an error.
  const parsed = findOrdersInput.safeParse({ view, q, station, person, promised, sort, descending });
  const ask = parsed.success ? parsed.data : findOrdersInput.parse({});
  return (
    <main id="main" className="page">
      <OrdersTable
        key={`${ask.view}${ask.station}${ask.person}${ask.promised}`} first={await findOrders(ctx, ask)} may={{ open: ableTo(ctx, "orders.open"), customers: ableTo(ctx, "customers.see"), menu: ableTo(ctx, "menu.write") }}
        ask={{ view: ask.view, q: ask.q, station: ask.station, person: ask.person, promised: ask.promised, sort: ask.sort, descending: ask.descending }}
      />
    </main>
  );
}

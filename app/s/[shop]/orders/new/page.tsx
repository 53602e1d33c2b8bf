import { orNotFound, shopPage } from "@/modules/access/page";
import { getCustomer } from "@/modules/customers/queries";
import { localDate } from "@/modules/kernel/instant";
import { PageHead } from "@/modules/ui/page-head";
import { OpenOrderForm } from "@/modules/work-orders/components/open-order-form";
import { familiesOf } from "@/modules/work-orders/queries/families";

export const metadata = { title: "New work order" };

export default async function NewOrderPage({ params, searchParams }: { params: Promise<{ shop: string }>; searchParams: Promise<{ customer?: string | string[] }> }) {
  const ctx = await shopPage(params, "orders.open");
  const { customer } = await searchParams;
  const known = typeof customer === "string" && /^[0-9a-f-]{36}$/.test(customer) ? await orNotFound(getCustomer(ctx, customer)) : null;
  return (
    <main id="main" className="page">
      <PageHead title="New work order" sub="Find or add the customer, say what is coming, price it next." />
      <OpenOrderForm
        families={await familiesOf(ctx)} today={localDate(ctx.now, ctx.shop.zone)}
        customer={known ? { id: known.id, label: known.name, detail: [known.phone, known.email].filter(Boolean).join(", ") } : null}
      />
    </main>
  );
}

import { ableTo } from "@/modules/access/context";
import { shopPage } from "@/modules/access/page";
import { localDate } from "@/modules/kernel/instant";
import { PurchasesRoom } from "@/modules/purchasing/components/purchases-room";
import { findOrdersInput, ORDER_VIEWS } from "@/modules/purchasing/input";
import { findOrders } from "@/modules/purchasing/queries/orders";
import { LinkButton } from "@/modules/ui/button";
import { PageHead } from "@/modules/ui/page-head";

export const metadata = { title: "Purchase orders" };

export default async function PurchasesPage({ params, searchParams }: { params: Promise<{ shop: string }>; searchParams: Promise<{ view?: string }> }) {
  const ctx = await shopPage(params, "purchase.see");
  const asked = (await searchParams).view;
  const view = ORDER_VIEWS.find((v) => v === asked) ?? "open";
  const first = await findOrders(ctx, findOrdersInput.parse({ view }));
  const at = `/s/${ctx.shop.slug}/purchases`;
  return (
    <main id="main" className="page">
      <PageHead title="Purchase orders" close actions={<>
        <LinkButton href={`${at}/suppliers`} variant="lo" size="sm">Suppliers</LinkButton>
        {ableTo(ctx, "purchase.write") ? <LinkButton href={`${at}/short`} size="sm">New purchase order</LinkButton> : null}
      </>} />
      <PurchasesRoom key={view} first={first} view={view} today={localDate(ctx.now, ctx.shop.zone)} />
    </main>
  );
}

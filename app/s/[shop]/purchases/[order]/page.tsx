import { ableTo } from "@/modules/access/context";
import { orNotFound, shopPage } from "@/modules/access/page";
import { CancelDialog, ExpectDialog } from "@/modules/purchasing/components/order-acts";
import { OrderBody } from "@/modules/purchasing/components/order-body";
import { OrderSide } from "@/modules/purchasing/components/order-side";
import { OrderSteps, orderSub } from "@/modules/purchasing/components/order-steps";
import { getOrder, seesPrices } from "@/modules/purchasing/queries/orders";
import { LinkButton } from "@/modules/ui/button";
import { PageHead } from "@/modules/ui/page-head";

export async function generateMetadata({ params }: { params: Promise<{ order: string }> }) {
  const { order } = await params;
  return { title: order.startsWith("PO-") ? order : "Purchase order" };
}

export default async function PurchaseOrderPage({ params }: { params: Promise<{ shop: string; order: string }> }) {
  const ctx = await shopPage(params, "purchase.see");
  const order = await orNotFound(getOrder(ctx, (await params).order));
  const canWrite = ableTo(ctx, "purchase.write");
  const isOpen = order.state === "sent" || order.state === "partly in";
  const place = { locale: ctx.shop.locale, zone: ctx.shop.zone };
  return (
    <main id="main" className="page">
      <PageHead {...(order.number ? { number: String(Number(order.number.slice(-4))), numberLabel: `${order.number}, ` } : {})} title={`Purchase order to ${order.supplier.name}`} sub={orderSub(order, place)} actions={<>
        {seesPrices(ctx) && order.lines.length > 0 ? <LinkButton href={`/s/${ctx.shop.slug}/purchases/${order.number ?? order.id}/pdf`} newTab variant="lo" icon="print">Print</LinkButton> : null}
        {canWrite && (order.state === "draft" || isOpen) ? <CancelDialog order={order} /> : null}
        {canWrite && isOpen ? <ExpectDialog order={order} /> : null}
      </>} />
      <OrderSteps order={order} place={place} />
      <div className="split" style={{ ["--side" as string]: "320px" }}>
        <OrderBody order={order} canWrite={canWrite} canReceive={ableTo(ctx, "goods.receive")} />
        <OrderSide order={order} canReceive={ableTo(ctx, "goods.receive")} />
      </div>
    </main>
  );
}

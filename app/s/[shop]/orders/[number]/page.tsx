import { ableTo } from "@/modules/access/context";
import { orNotFound, shopPage } from "@/modules/access/page";
import { FlowCheck } from "@/modules/flow/components/flow-check";
import { OrderMoney } from "@/modules/invoices/components/order-money";
import { StartInvoice } from "@/modules/invoices/components/ready-table";
import { date } from "@/modules/kernel/format";
import { JobProfitBay } from "@/modules/reports/components/job-profit-bay";
import { Bays } from "@/modules/ui/bay";
import { LinkButton } from "@/modules/ui/button";
import { Note } from "@/modules/ui/note";
import { PageHead } from "@/modules/ui/page-head";
import { BeginEstimate } from "@/modules/work-orders/components/begin-estimate";
import { FindingsBay } from "@/modules/work-orders/components/findings-bay";
import { HeadsBay } from "@/modules/work-orders/components/heads-bay";
import { CancelDialog, EditOrderDialog } from "@/modules/work-orders/components/order-dialogs";
import { OrderNextKey } from "@/modules/work-orders/components/order-next-key";
import { OrderParts } from "@/modules/work-orders/components/order-parts";
import { MailsBay, PromisesBay, TimelineBay } from "@/modules/work-orders/components/order-side-bays";
import { OrderTop } from "@/modules/work-orders/components/order-top";
import { RoutingBay } from "@/modules/work-orders/components/routing-bay";
import { VersionsBay } from "@/modules/work-orders/components/versions-bay";
import { shortNumber } from "@/modules/work-orders/domain/short-number";
import { USE_WORDS, type Use } from "@/modules/work-orders/domain/uses";
import { orderPage } from "@/modules/work-orders/queries/order-page";
import { partsOf } from "@/modules/work-orders/queries/parts";

export async function generateMetadata({ params }: { params: Promise<{ number: string }> }) {
  return { title: `Order ${(await params).number}` };
}

export default async function OrderPage({ params }: { params: Promise<{ shop: string; number: string }> }) {
  const ctx = await shopPage(params, "orders.see");
  const order = await orNotFound(orderPage(ctx, (await params).number));
  const parts = await partsOf(ctx, order.id);
  const { slug, locale } = ctx.shop;
  const at = `/s/${slug}/orders/${order.number}`;
  const isOpen = order.closedAt === null && order.cancelledAt === null;
  const pieces = order.pieces.map((p) => ({ id: p.id, label: p.tag ?? `head ${p.pieceNo}`, declaredMinor: p.declaredValueMinor }));
  const [first] = order.pieces;
  const released = order.pieces.some((p) => p.releasedAt !== null);
  const unbilled = (order.money?.invoices ?? 0) === 0;
  return (
    <main id="main" className="page">
      <PageHead
        number={shortNumber(order.number)} numberLabel={`Order ${order.number},`} title={order.customer.name}
        sub={<>{[[...new Set(order.pieces.map((p) => p.family))].join(", "), order.wants.split("\n")[0]?.replace(/[.\s]+$/, ""), `${USE_WORDS[order.use as Use] ?? order.use} use`, order.customerReference && `ref ${order.customerReference}`].filter(Boolean).join(". ")}.{order.customer.phone ? <> <a className="lk" href={`tel:${order.customer.phone}`}>{order.customer.phone}</a></> : null} {order.may.edit && isOpen ? <EditOrderDialog order={order} /> : null}</>}
        actions={<>
          <LinkButton icon="print" href={`${at}/traveler`} newTab>Traveler</LinkButton>
          {first?.tag ? <LinkButton icon="tube" href={`/s/${slug}/flow?tag=${first.tag}`}>Flow sheet</LinkButton> : null}
          <OrderNextKey order={order} slug={slug} invoice={released && unbilled && ableTo(ctx, "invoice.write") ? <StartInvoice workOrderId={order.id} /> : null} />
        </>}
      />
      {order.cancelledAt ? <Note tone="info" title="Called off.">{order.cancelReason}</Note> : null}
      {order.customer.mailProblem ? <Note tone="warn" title="Mail to this customer comes back.">{order.customer.mailProblem}. Call them, and mend the address.</Note> : null}
      {order.closedAt ? <p className="mid mb-4">Gone since {date(order.closedAt.slice(0, 10), locale)}.</p> : null}
      <OrderTop order={order} place={ctx.shop} />
      <div className="split" style={{ "--side": "328px" } as React.CSSProperties}>
        <Bays>
          <RoutingBay order={order} place={ctx.shop} />
          <div className="two">
            <Bays>
              <FlowCheck ctx={ctx} pieceIds={order.pieces.map((p) => p.id)} />
              {order.may.prices ? <VersionsBay number={order.number} versions={order.versions} aside={isOpen && order.may.estimate && order.versions.length > 0 && !order.versions.some((v) => v.state === "draft") ? <BeginEstimate orderId={order.id} number={order.number} label="Next version" /> : undefined} /> : null}
            </Bays>
            <OrderParts workOrderId={order.id} rows={parts} canIssue={ableTo(ctx, "stock.issue") && isOpen} pieces={pieces} />
          </div>
          <FindingsBay number={order.number} findings={order.findings} pieces={isOpen ? pieces.filter((_, i) => order.pieces[i]?.bookedInAt) : []} may={{ finding: order.may.finding && isOpen, estimate: order.may.estimate && isOpen, override: order.may.override && isOpen }} />
          <MailsBay order={order} place={ctx.shop} />
        </Bays>
        <Bays>
          <OrderMoney ctx={ctx} workOrderId={order.id} />
          <JobProfitBay ctx={ctx} workOrderId={order.id} />
          <HeadsBay number={order.number} orderId={order.id} pieces={order.pieces} isOpen={isOpen} may={order.may} />
          <PromisesBay order={order} place={ctx.shop} />
          <TimelineBay order={order} place={ctx.shop} />
          {isOpen && order.may.approve && order.operations.every((o) => o.state === "open") ? <CancelDialog orderId={order.id} version={order.version} number={order.number} /> : null}
        </Bays>
      </div>
    </main>
  );
}

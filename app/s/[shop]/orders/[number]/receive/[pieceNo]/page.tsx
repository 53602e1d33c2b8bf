import { notFound } from "next/navigation";
import { orNotFound, shopPage } from "@/modules/access/page";
import { LinkButton } from "@/modules/ui/button";
import { EmptyState } from "@/modules/ui/empty-state";
import { PageHead } from "@/modules/ui/page-head";
import { ReceiveForm } from "@/modules/work-orders/components/receive-form";
import { shortNumber } from "@/modules/work-orders/domain/short-number";
import { piecePage } from "@/modules/work-orders/queries/piece";

export const metadata = { title: "Book in" };

export default async function ReceivePage({ params }: { params: Promise<{ shop: string; number: string; pieceNo: string }> }) {
  const ctx = await shopPage(params, "pieces.receive");
  const { number, pieceNo } = await params;
  if (!/^\d{1,2}$/.test(pieceNo)) notFound();
  const piece = await orNotFound(piecePage(ctx, number, Number(pieceNo)));
  const order = `/s/${ctx.shop.slug}/orders/${piece.orderNumber}`;
  return (
    <main id="main" className="page">
      <PageHead
        number={shortNumber(piece.orderNumber)} numberLabel={`Book in for order ${piece.orderNumber},`} numberSize="m" title={`Book in: ${piece.family}`}
        sub={`${piece.customer}${piece.siblings.length > 1 ? `, head ${piece.pieceNo} of ${piece.siblings.length}` : ""}${piece.description ? `. ${piece.description}` : ""}`} actions={<LinkButton href={order}>The order</LinkButton>}
      />
      {piece.tag ? <EmptyState title={`Booked in under ${piece.tag}`} action={<LinkButton variant="go" href={`${order}/pieces/${piece.pieceNo}`}>Open it</LinkButton>}>A piece is booked in once.</EmptyState>
        : !piece.isOrderOpen ? <EmptyState title="This order is closed" action={<LinkButton href={`/s/${ctx.shop.slug}/orders/new`}>New work order</LinkButton>}>A piece that comes now belongs on a new one.</EmptyState>
        : <div className="max-w-[920px]"><ReceiveForm piece={piece} /></div>}
    </main>
  );
}

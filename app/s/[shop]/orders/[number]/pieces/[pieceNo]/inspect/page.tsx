import { notFound } from "next/navigation";
import { orNotFound, shopPage } from "@/modules/access/page";
import { LinkButton } from "@/modules/ui/button";
import { EmptyState } from "@/modules/ui/empty-state";
import { PageHead } from "@/modules/ui/page-head";
import { InspectForm } from "@/modules/work-orders/components/inspect-form";
import { PhotoStrip } from "@/modules/work-orders/components/photo-strip";
import { Bay } from "@/modules/ui/bay";
import { piecePage, releaseSheet } from "@/modules/work-orders/queries/piece";

export const metadata = { title: "Final inspection" };

export default async function InspectPage({ params }: { params: Promise<{ shop: string; number: string; pieceNo: string }> }) {
  const ctx = await shopPage(params, "release");
  const { number, pieceNo } = await params;
  if (!/^\d{1,2}$/.test(pieceNo)) notFound();
  const piece = await orNotFound(piecePage(ctx, number, Number(pieceNo)));
  const { facts, missing } = await releaseSheet(ctx, piece.id);
  const back = `/s/${ctx.shop.slug}/orders/${piece.orderNumber}/pieces/${piece.pieceNo}`;
  return (
    <main id="main" className="page">
      <PageHead number={piece.tag ?? "–"} numberLabel={`Final inspection of ${piece.tag ?? "a head not booked in"},`} numberSize="m" title="Final inspection" sub={`${piece.family}, ${piece.castingNumber} ${piece.serial}. ${piece.customer}, ${piece.orderNumber}`} actions={<LinkButton href={back}>The head</LinkButton>} />
      {piece.releasedAt ? <EmptyState title="Released already" action={<LinkButton href={back}>Open it</LinkButton>}>A lead opens it again, with a reason.</EmptyState> : (
        <div className="split" style={{ "--side": "340px" } as React.CSSProperties}>
          <InspectForm pieceId={piece.id} version={piece.version} tag={piece.tag ?? ""} came={facts.came} missing={missing} alone={facts.isOwnPorting && facts.isAlone} back={back} />
          <Bay label="As it came"><PhotoStrip subject={{ kind: "piece", id: piece.id }} photoIds={piece.photos.map((p) => p.id)} label="Photo of the head" mayAdd />{piece.check?.damage ? <p className="mt-2">Damage seen then: {piece.check.damage}</p> : null}</Bay>
        </div>
      )}
    </main>
  );
}

import Link from "next/link";
import { orNotFound, shopPage } from "@/modules/access/page";
import { Note } from "@/modules/ui/note";
import { PageHead } from "@/modules/ui/page-head";
import { InspectForm } from "@/modules/work-orders/components/inspect-form";
import { piecePage, releaseSheet } from "@/modules/work-orders/queries/piece";

export const metadata = { title: "Final inspection" };

export default async function InspectPage({ params }: { params: Promise<{ shop: string; number: string; pieceNo: string }> }) {
  const ctx = await shopPage(params, "release");
  const { number, pieceNo } = await params;
  const piece = await orNotFound(piecePage(ctx, decodeURIComponent(number), /^\d{1,3}$/.test(pieceNo) ? Number(pieceNo) : 0));
  const { facts, missing } = await orNotFound(releaseSheet(ctx, piece.id));
  const at = `/s/${ctx.shop.slug}/orders/${piece.orderNumber}`;
  return (
    <main id="main" className="page max-w-[880px]">
      <PageHead title="Final inspection" sub={<><Link className="lk" href={at}>{piece.orderNumber}</Link>{`  ${piece.tag ?? `head ${piece.pieceNo}`}, ${piece.family}`}</>} />
      {piece.releasedAt ? <Note tone="info" title="Released already.">A lead opens it again from the head’s page, if need be.</Note>
        : <InspectForm sheet={{ pieceId: piece.id, version: piece.version, number: piece.orderNumber, tag: piece.tag ?? `head ${piece.pieceNo}`, came: facts.came, missing }} />}
    </main>
  );
}

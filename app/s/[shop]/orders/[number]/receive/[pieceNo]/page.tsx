import Link from "next/link";
import { orNotFound, shopPage } from "@/modules/access/page";
import { PageHead } from "@/modules/ui/page-head";
import { Note } from "@/modules/ui/note";
import { ReceiveForm } from "@/modules/work-orders/components/receive-form";
import { PHOTOS_WANTED } from "@/modules/work-orders/domain/photos-wanted";
import { piecePage } from "@/modules/work-orders/queries/piece";

export const metadata = { title: "Book in" };

export default async function ReceivePage({ params }: { params: Promise<{ shop: string; number: string; pieceNo: string }> }) {
  const ctx = await shopPage(params, "pieces.receive");
  const { number, pieceNo } = await params;
  const piece = await orNotFound(piecePage(ctx, decodeURIComponent(number), /^\d{1,3}$/.test(pieceNo) ? Number(pieceNo) : 0));
  const at = `/s/${ctx.shop.slug}/orders/${piece.orderNumber}`;
  return (
    <main id="main" className="page max-w-[880px]">
      <PageHead title="Book in" sub={<><Link className="lk" href={at}>{piece.orderNumber}</Link>{`  ${piece.customer}, ${piece.family}, head ${piece.pieceNo}`}</>} />
      {piece.bookedInAt
        ? <Note tone="info" title={`Booked in under tag ${piece.tag ?? ""}.`}><Link className="lk" href={`${at}/pieces/${piece.pieceNo}`}>See the head</Link></Note>
        : <ReceiveForm sheet={{ pieceId: piece.id, version: piece.version, pieceNo: piece.pieceNo, number: piece.orderNumber, castingNumber: piece.castingNumber, serial: piece.serial, photoIds: piece.photos.map((f) => f.id), photosWanted: PHOTOS_WANTED }} />}
    </main>
  );
}

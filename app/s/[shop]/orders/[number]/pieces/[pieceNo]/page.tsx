import Link from "next/link";
import { notFound } from "next/navigation";
import { ableTo } from "@/modules/access/context";
import { orNotFound, shopPage } from "@/modules/access/page";
import { FlowCheck } from "@/modules/flow/components/flow-check";
import { dateTime, money, shortDate } from "@/modules/kernel/format";
import { Bay, Bays } from "@/modules/ui/bay";
import { LinkButton } from "@/modules/ui/button";
import { Kv } from "@/modules/ui/kv";
import { PageHead } from "@/modules/ui/page-head";
import { Status } from "@/modules/ui/status";
import { PhotoStrip } from "@/modules/work-orders/components/photo-strip";
import { MovePieceDialog, ReopenDialog } from "@/modules/work-orders/components/piece-dialogs";
import { RoutingBay } from "@/modules/work-orders/components/routing-bay";
import { trayText } from "@/modules/work-orders/domain/tray-kinds";
import { USE_WORDS, type Use } from "@/modules/work-orders/domain/uses";
import { orderPage } from "@/modules/work-orders/queries/order-page";
import { piecePage } from "@/modules/work-orders/queries/piece";

export async function generateMetadata({ params }: { params: Promise<{ number: string; pieceNo: string }> }) {
  const { number, pieceNo } = await params;
  return { title: `${number}, head ${pieceNo}` };
}

export default async function PiecePageView({ params }: { params: Promise<{ shop: string; number: string; pieceNo: string }> }) {
  const ctx = await shopPage(params, "orders.see");
  const { number, pieceNo } = await params;
  if (!/^\d{1,2}$/.test(pieceNo)) notFound();
  const piece = await orNotFound(piecePage(ctx, number, Number(pieceNo)));
  const order = await orNotFound(orderPage(ctx, number));
  const own = order.pieces.find((p) => p.id === piece.id);
  const place = ctx.shop;
  const at = `/s/${place.slug}/orders/${piece.orderNumber}`;
  const isHere = piece.bookedInAt !== null && piece.handedOverAt === null;
  return (
    <main id="main" className="page">
      <PageHead
        title={piece.tag ? <span className="num n-m">{piece.tag}</span> : `Head ${piece.pieceNo}`}
        sub={<>{piece.family}. <Link className="lk" href={at}>{piece.orderNumber}</Link>, {piece.customer}{piece.promisedOn ? `, promised ${shortDate(piece.promisedOn, place.locale)}` : ""}</>}
        actions={<>
          {piece.tag && ableTo(ctx, "pieces.receive") ? <LinkButton icon="print" href={`${at}/tag/${piece.pieceNo}`} newTab>Print tag</LinkButton> : null}
          <LinkButton icon="print" href={`${at}/traveler?head=${piece.pieceNo}`} newTab>Traveler</LinkButton>
          {piece.tag ? <LinkButton icon="tube" href={`/s/${place.slug}/flow?tag=${piece.tag}`}>Flow sheet</LinkButton> : null}
          {!piece.tag && ableTo(ctx, "pieces.receive") ? <LinkButton variant="go" icon="box" href={`${at}/receive/${piece.pieceNo}`}>Book in</LinkButton> : null}
          {isHere && !piece.releasedAt && ableTo(ctx, "release") ? <LinkButton variant="go" icon="check" href={`${at}/pieces/${piece.pieceNo}/inspect`}>Inspect</LinkButton> : null}
        </>}
      />
      <div className="split" style={{ "--side": "340px" } as React.CSSProperties}>
        <Bays>
          <RoutingBay order={{ ...order, pieces: own ? [own] : [], operations: order.operations.filter((o) => o.pieceId === piece.id) }} place={place} />
          <FlowCheck ctx={ctx} pieceIds={[piece.id]} />
          <Bay label={`Photos, ${piece.photos.length}`}><PhotoStrip subject={{ kind: "piece", id: piece.id }} photoIds={piece.photos.map((p) => p.id)} label="Photo of the head" mayAdd={piece.handedOverAt === null && ableTo(ctx, "files.add")} /></Bay>
        </Bays>
        <Bays>
          <Bay label="Head" aside={isHere ? <MovePieceDialog pieceId={piece.id} version={piece.version} place={piece.place} /> : undefined}>
            {own ? <p className="mb-3"><Status dial={own.status.dial}>{own.status.station ? `${own.status.station}, ${own.running ? own.status.word : own.status.word.toLowerCase()}` : own.status.word}</Status></p> : null}
            <Kv pairs={[["Casting", piece.castingNumber || "–"], ["Serial", piece.serial || "–"], ["Use", USE_WORDS[piece.use as Use] ?? piece.use], ["Declared", piece.declaredValueMinor === null ? "–" : money(piece.declaredValueMinor, place)], ["Lies at", piece.place || "–"], ...(piece.description ? [["Remarks", piece.description] as const] : [])]} />
          </Bay>
          {piece.check ? (
            <Bay label="Booked in">
              <Kv pairs={[["When", dateTime(piece.check.at, place)], ["By", piece.check.by], ["Parcel", piece.check.parcelCondition], ["Tray", trayText(piece.check.counts)], ["Missing", piece.check.missing || "nothing"], ["Damage", piece.check.damage || "none"], ...(piece.check.notes ? [["Note", piece.check.notes] as const] : [])]} />
            </Bay>
          ) : null}
          {piece.inspections.length > 0 ? (
            <Bay label="Final inspection">
              <ul>{piece.inspections.map((i) => <li key={i.at} className="py-1"><b className="b">{i.by}</b> {i.outcome === "released" ? `released it${i.alone ? ", alone" : ""}` : "sent it back"} <span className="mid">{dateTime(i.at, place)}{i.reason ? `: ${i.reason}` : ""}</span></li>)}</ul>
              {piece.releasedAt && isHere && ableTo(ctx, "work.override") ? <div className="mt-3"><ReopenDialog pieceId={piece.id} version={piece.version} tag={piece.tag ?? ""} /></div> : null}
            </Bay>
          ) : null}
        </Bays>
      </div>
    </main>
  );
}

import Link from "next/link";
import { ableTo } from "@/modules/access/context";
import { orNotFound, shopPage } from "@/modules/access/page";
import { date, dateTime, money } from "@/modules/kernel/format";
import { Bay, Bays } from "@/modules/ui/bay";
import { LinkButton } from "@/modules/ui/button";
import { Kv } from "@/modules/ui/kv";
import { PageHead } from "@/modules/ui/page-head";
import { PhotoStrip } from "@/modules/work-orders/components/photo-strip";
import { ReopenPiece } from "@/modules/work-orders/components/reopen-piece";
import { trayText } from "@/modules/work-orders/domain/tray-kinds";
import { piecePage } from "@/modules/work-orders/queries/piece";

export const metadata = { title: "Head" };

export default async function PiecePageView({ params }: { params: Promise<{ shop: string; number: string; pieceNo: string }> }) {
  const ctx = await shopPage(params, "orders.see");
  const { number, pieceNo } = await params;
  const p = await orNotFound(piecePage(ctx, decodeURIComponent(number), /^\d{1,3}$/.test(pieceNo) ? Number(pieceNo) : 0));
  const at = `/s/${ctx.shop.slug}/orders/${p.orderNumber}`;
  const here = `${at}/pieces/${p.pieceNo}`;
  const when = (iso: string) => dateTime(iso, ctx.shop);
  return (
    <main id="main" className="page max-w-[1080px]">
      <PageHead
        title={p.tag ?? `Head ${p.pieceNo}`}
        sub={<><Link className="lk" href={at}>{p.orderNumber}</Link>{`  ${p.customer}, ${p.family}`}</>}
        actions={<>
          {!p.bookedInAt && ableTo(ctx, "pieces.receive") ? <LinkButton variant="go" icon="box" href={`${at}/receive/${p.pieceNo}`}>Book in</LinkButton> : null}
          {p.tag && ableTo(ctx, "pieces.receive") ? <LinkButton icon="print" href={`${here}/tag`} newTab>Print tag</LinkButton> : null}
          {p.bookedInAt && !p.releasedAt && ableTo(ctx, "release") ? <LinkButton icon="check" href={`${here}/inspect`}>Inspect</LinkButton> : null}
          {p.releasedAt && !p.handedOverAt && ableTo(ctx, "work.override") ? <ReopenPiece pieceId={p.id} version={p.version} tag={p.tag ?? ""} /> : null}
        </>}
      />
      <Bays>
        <Bay label="The head">
          <Kv pairs={[
            ["Casting", p.castingNumber || "not given"], ["Serial", p.serial || "not given"], ["Owner", p.ownerKind === "shop" ? "the shop" : p.customer],
            ["Insured value", p.declaredValueMinor === null ? "not given" : money(p.declaredValueMinor, ctx.shop)], ["Place", p.place || "not here yet"],
            ["Promised", p.promisedOn ? date(p.promisedOn, ctx.shop.locale) : "open"],
            ...(p.releasedAt ? [["Released", when(p.releasedAt)] as const] : []), ...(p.handedOverAt ? [["Left", when(p.handedOverAt)] as const] : []),
          ]} />
        </Bay>
        <Bay label="Photos">
          <PhotoStrip subject={{ kind: "piece", id: p.id }} photoIds={p.photos.map((f) => f.id)} label="Photo of the head" mayAdd={ableTo(ctx, "files.add")} />
        </Bay>
        <Bay label="As it came in">
          {p.check ? <Kv pairs={[
            ["Booked in", `${when(p.check.at)}, ${p.check.by}`], ["Parcel", p.check.parcelCondition], ["Tray", trayText(p.check.counts)],
            ["Missing", p.check.missing || "none"], ["Damage", p.check.damage || "none seen"], ...(p.check.notes ? [["Notes", p.check.notes] as const] : []),
          ]} /> : <p className="mid">Not booked in yet. Its parcel can be scanned by the order number.</p>}
        </Bay>
        {p.inspections.length ? (
          <Bay label="Inspections">
            <Kv pairs={p.inspections.map((i) => [when(i.at), `${i.outcome === "released" ? "Released" : "Sent back"}, ${i.by}${i.reason ? `: ${i.reason}` : ""}${i.alone ? ", alone" : ""}`] as const)} />
          </Bay>
        ) : null}
      </Bays>
    </main>
  );
}

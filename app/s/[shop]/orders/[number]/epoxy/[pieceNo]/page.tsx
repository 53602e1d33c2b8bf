import Link from "next/link";
import { orNotFound, shopPage } from "@/modules/access/page";
import { localMinute } from "@/modules/kernel/instant";
import { EpoxyForm } from "@/modules/work-orders/components/epoxy-form";
import { epoxySheetFor } from "@/modules/work-orders/queries/parts";
import { PageHead } from "@/modules/ui/page-head";

export const metadata = { title: "Epoxy fill" };

export default async function EpoxyPage({ params }: { params: Promise<{ shop: string; number: string; pieceNo: string }> }) {
  const ctx = await shopPage(params, "work.record");
  const { number, pieceNo } = await params;
  const sheet = await orNotFound(epoxySheetFor(ctx, decodeURIComponent(number), /^\d{1,3}$/.test(pieceNo) ? Number(pieceNo) : 0));
  return (
    <main id="main" className="page">
      <PageHead title="Epoxy fill" sub={<><Link className="lk" href={`/s/${ctx.shop.slug}/orders/${sheet.number}`}>{sheet.number}</Link>{`  ${[sheet.tag ?? `head ${sheet.pieceNo}`, sheet.family].join(", ")}`}</>} />
      <EpoxyForm sheet={sheet} now={localMinute(ctx.now, ctx.shop.zone)} />
    </main>
  );
}

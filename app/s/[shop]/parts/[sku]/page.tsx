import Link from "next/link";
import { ableTo } from "@/modules/access/context";
import { orNotFound, shopPage } from "@/modules/access/page";
import { PartFacts } from "@/modules/stock/components/part-facts";
import { KitForm } from "@/modules/stock/components/kit-form";
import { OpeningDialog, PartLedger, ScrapDialog } from "@/modules/stock/components/shelf-acts";
import { getPart } from "@/modules/stock/queries/get-part";
import { ledgerOf } from "@/modules/stock/queries/ledger";
import { Bay, Bays } from "@/modules/ui/bay";
import { LinkButton } from "@/modules/ui/button";
import { PageHead } from "@/modules/ui/page-head";

export async function generateMetadata({ params }: { params: Promise<{ sku: string }> }) {
  return { title: `Part ${decodeURIComponent((await params).sku)}` };
}

export default async function PartPage({ params }: { params: Promise<{ shop: string; sku: string }> }) {
  const ctx = await shopPage(params, "stock.see");
  const part = await orNotFound(getPart(ctx, decodeURIComponent((await params).sku)));
  const first = await ledgerOf(ctx, { part: part.id, limit: 40 });
  const at = `/s/${ctx.shop.slug}/parts`;
  return (
    <main id="main" className="page">
      <PageHead title={part.description} sub={<><Link className="lk" href={at}>Parts</Link>{`  ${[part.sku, part.bin ? `shelf ${part.bin}` : "no shelf", part.partClass].join(", ")}`}</>} actions={<>
        {ableTo(ctx, "cost.see") && !part.isKit ? <OpeningDialog part={part} /> : null}
        {ableTo(ctx, "stock.write-off") && !part.isKit && part.onHandMilli > 0 ? <ScrapDialog part={part} /> : null}
        {ableTo(ctx, "stock.adjust") && !part.isKit ? <LinkButton href={`${at}/count?part=${encodeURIComponent(part.sku)}`} variant="lo" size="sm">Count</LinkButton> : null}
        {ableTo(ctx, "parts.write") ? <LinkButton href={`${at}/${encodeURIComponent(part.sku)}/edit`} size="sm">Change part</LinkButton> : null}
      </>} />
      <div className="split" style={{ ["--side" as string]: "420px" }}>
        <Bays className="min-w-0">
          {part.isKit && ableTo(ctx, "parts.write") ? <Bay label="In one kit"><KitForm key={part.version} kit={part} /></Bay> : null}
          {part.isKit ? null : <Bay label="Ledger" flush><PartLedger part={part} first={first} seesCost={ableTo(ctx, "cost.see")} canReverse={ableTo(ctx, "stock.write-off")} /></Bay>}
        </Bays>
        <PartFacts part={part} seesOrders={ableTo(ctx, "purchase.see")} />
      </div>
    </main>
  );
}

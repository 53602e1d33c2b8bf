import { ableTo } from "@/modules/access/context";
import { shopPage } from "@/modules/access/page";
import { PartsRoom } from "@/modules/stock/components/parts-room";
import { PART_VIEWS, partsAsk } from "@/modules/stock/input";
import { findParts } from "@/modules/stock/queries/find-parts";
import { LinkButton } from "@/modules/ui/button";
import { PageHead } from "@/modules/ui/page-head";

export const metadata = { title: "Parts" };

export default async function PartsPage({ params, searchParams }: { params: Promise<{ shop: string }>; searchParams: Promise<{ view?: string }> }) {
  const ctx = await shopPage(params, "stock.see");
  const asked = (await searchParams).view;
  const view = PART_VIEWS.find((v) => v === asked) ?? "all";
  const first = await findParts(ctx, partsAsk({ view }));
  const at = `/s/${ctx.shop.slug}`;
  return (
    <main id="main" className="page">
      <PageHead title="Parts" close actions={<>
        {ableTo(ctx, "stock.adjust") ? <LinkButton href={`${at}/parts/count`} variant="lo" size="sm">Count a shelf</LinkButton> : null}
        {ableTo(ctx, "goods.receive") ? <LinkButton href={`${at}/purchases`} variant="lo" size="sm">Take in delivery</LinkButton> : ableTo(ctx, "purchase.see") ? <LinkButton href={`${at}/purchases`} variant="lo" size="sm">Purchase orders</LinkButton> : null}
        {ableTo(ctx, "parts.write") ? <LinkButton href={`${at}/parts/new`} variant="lo" size="sm">Add a part</LinkButton> : null}
        {ableTo(ctx, "purchase.write") ? <LinkButton href={`${at}/purchases/short`} size="sm">New purchase order</LinkButton> : null}
      </>} />
      <PartsRoom key={view} first={first} view={view} canBuy={ableTo(ctx, "purchase.write")} />
    </main>
  );
}

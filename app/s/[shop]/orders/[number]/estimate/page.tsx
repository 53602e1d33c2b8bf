import { ableTo } from "@/modules/access/context";
import { orNotFound, shopPage } from "@/modules/access/page";
import { EmptyState } from "@/modules/ui/empty-state";
import { LinkButton } from "@/modules/ui/button";
import { PageHead } from "@/modules/ui/page-head";
import { BeginEstimate } from "@/modules/work-orders/components/begin-estimate";
import { EstimateBuilder } from "@/modules/work-orders/components/estimate-builder";
import { shortNumber } from "@/modules/work-orders/domain/short-number";
import { estimateEditor } from "@/modules/work-orders/queries/estimates";
import { menuOf } from "@/modules/work-orders/queries/menu";

export async function generateMetadata({ params }: { params: Promise<{ number: string }> }) {
  return { title: `Estimate ${(await params).number}` };
}

export default async function EstimatePage({ params }: { params: Promise<{ shop: string; number: string }> }) {
  const ctx = await shopPage(params, "estimate.write");
  const { number } = await params;
  const editor = await orNotFound(estimateEditor(ctx, number));
  const back = `/s/${ctx.shop.slug}/orders/${editor.number}`;
  return (
    <main id="main" className="page">
      <PageHead
        number={shortNumber(editor.number)} numberLabel={`Estimate for order ${editor.number},`} numberSize="m" title={editor.customer}
        sub={`${editor.pieces.map((p) => p.family).join(", ")}${editor.agreed ? `. Version ${editor.agreed.estimateNo} stands agreed.` : ""}`}
        actions={<LinkButton href={back}>The order</LinkButton>}
      />
      {editor.draft ? <EstimateBuilder key={editor.draft.estimateId} editor={{ ...editor, draft: editor.draft }} menu={await menuOf(ctx)} maySend={ableTo(ctx, "estimate.send")} />
        : <EmptyState title="No version is being written" action={editor.isClosed ? undefined : <BeginEstimate orderId={editor.orderId} number={editor.number} label={editor.agreed ? "Write the next version" : "Write the first version"} variant="go" />}>{editor.isClosed ? "This order is closed." : "A version that was sent is fixed. A change is the next one."}</EmptyState>}
    </main>
  );
}

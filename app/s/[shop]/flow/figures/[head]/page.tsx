import { orNotFound, shopPage } from "@/modules/access/page";
import { HeadEstimates } from "@/modules/flow/components/head-estimates";
import { EstimatesSwitch } from "@/modules/flow/components/head-estimates-switch";
import { HeadViews } from "@/modules/flow/components/head-views";
import { headFigures } from "@/modules/flow/queries/head-figures";
import { Bay } from "@/modules/ui/bay";
import { LinkButton } from "@/modules/ui/button";
import { EmptyState } from "@/modules/ui/empty-state";
import { PageHead } from "@/modules/ui/page-head";

export const metadata = { title: "Coefficients and noise" };

export default async function FiguresPage({ params }: { params: Promise<{ shop: string; head: string }> }) {
  const ctx = await shopPage(params, "flow.see");
  const { head, ports, estimates, settingsVersion, maySwitch } = await orNotFound(headFigures(ctx, (await params).head));
  const base = `/s/${ctx.shop.slug}/flow`;
  return (
    <main id="main" className="page">
      <PageHead title={<>Coefficients and noise <span className="dim">{head.mark}</span></>} sub={head.family} actions={<><LinkButton href={`${base}/${head.id}`}>Flow sheet</LinkButton><LinkButton href={`${base}/measure/${head.id}`}>Measurements</LinkButton></>} />
      {ports.length === 0 ? <EmptyState title="No finished test yet" action={<LinkButton href={`${base}/${head.id}`}>Flow sheet</LinkButton>}>Figures appear when a test is finished.</EmptyState> : <HeadViews ports={ports} />}
      {estimates === null && !maySwitch ? null : (
        <div className="mt-7"><Bay label="Estimates from airflow">
          {estimates === null ? <p className="mid">Off in this shop.</p> : <HeadEstimates facts={estimates} />}
          {maySwitch ? <EstimatesSwitch on={estimates !== null} version={settingsVersion} /> : null}
        </Bay></div>
      )}
    </main>
  );
}

import { orNotFound, shopPage } from "@/modules/access/page";
import { HeadEstimates } from "@/modules/flow/components/head-estimates";
import { EstimatesSwitch } from "@/modules/flow/components/head-estimates-switch";
import { CURVE_VIEWS, curveViewAsked } from "@/modules/flow/components/curve-views";
import { HeadViews } from "@/modules/flow/components/head-views";
import { IssuedReports } from "@/modules/flow/components/issued-reports";
import { UnitSwitch } from "@/modules/flow/components/unit-switch";
import { unitsAsked, unitViews } from "@/modules/flow/components/unit-words";
import type { Units } from "@/modules/flow/domain/curve-measure";
import { headFigures } from "@/modules/flow/queries/head-figures";
import { Bay } from "@/modules/ui/bay";
import { LinkButton } from "@/modules/ui/button";
import { EmptyState } from "@/modules/ui/empty-state";
import { PageHead } from "@/modules/ui/page-head";
import { Views } from "@/modules/ui/views";

export const metadata = { title: "Coefficients and noise" };

export default async function FiguresPage({ params, searchParams }: { params: Promise<{ shop: string; head: string }>; searchParams: Promise<Record<string, string | string[] | undefined>> }) {
  const ctx = await shopPage(params, "flow.see");
  const asked = await searchParams;
  const view = curveViewAsked(asked.view);
  const { head, ports, ratios, reports, estimates, settingsVersion, maySwitch } = await orNotFound(headFigures(ctx, (await params).head));
  const { slug, locale, zone } = ctx.shop;
  const base = `/s/${slug}/flow`;
  const href = (u: Units, v: string) => { const query = new URLSearchParams([...(u === "read" ? [] : [["units", u]]), ...(v === "flow" ? [] : [["view", v]])]).toString(); return `${base}/figures/${head.id}${query ? `?${query}` : ""}`; };
  const unitChoices = unitViews(ports[0]?.liftUnit ?? "in", (u) => href(u, view));
  const units = unitChoices.find((v) => v.key === unitsAsked(asked.units))?.key ?? "read";
  return (
    <main id="main" className="page">
      <PageHead title={<>Coefficients and noise <span className="dim">{head.mark}</span></>} sub={head.family} actions={<><LinkButton href={`${base}/${head.id}`}>Flow sheet</LinkButton><LinkButton href={`${base}/measure/${head.id}`}>Measurements</LinkButton></>} />
      {ports.length === 0 ? <EmptyState title="No finished test yet" action={<LinkButton href={`${base}/${head.id}`}>Flow sheet</LinkButton>}>Figures appear when a test is finished.</EmptyState> : (
        <>
          <Views label="Curve of" current={view} views={CURVE_VIEWS.map((v) => ({ ...v, href: href(units, v.key) }))} />
          <UnitSwitch current={units} choices={unitChoices} />
          <HeadViews ports={ports} ratios={ratios} units={units} view={view} />
        </>
      )}
      {reports.length === 0 ? null : <div className="mt-7"><Bay label="Reports"><IssuedReports reports={reports} slug={slug} locale={locale} zone={zone} /></Bay></div>}
      {estimates === null && !maySwitch ? null : (
        <div className="mt-7"><Bay label="Estimates from airflow">
          {estimates === null ? <p className="mid">Off in this shop.</p> : <HeadEstimates facts={estimates} />}
          {maySwitch ? <EstimatesSwitch on={estimates !== null} version={settingsVersion} /> : null}
        </Bay></div>
      )}
    </main>
  );
}

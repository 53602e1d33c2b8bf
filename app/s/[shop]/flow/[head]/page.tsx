import { orNotFound, shopPage } from "@/modules/access/page";
import { FlowSheetScreen } from "@/modules/flow/components/sheet/flow-sheet";
import { HeadWork } from "@/modules/flow/components/head-work";
import { PortNav } from "@/modules/flow/components/port-nav";
import { sheetSubtitle } from "@/modules/flow/components/sheet-subtitle";
import { sheetInput } from "@/modules/flow/input";
import { flowSheetFor, gearOf } from "@/modules/flow/queries/sheet";
import { DarkGround } from "@/modules/ui/theme";
import { PageHead } from "@/modules/ui/page-head";
import { Tag } from "@/modules/ui/tag";
import { TextLink } from "@/modules/ui/text-link";
import { notFound } from "next/navigation";

export const metadata = { title: "Flow sheet" };

export default async function FlowSheetPage({ params, searchParams }: { params: Promise<{ shop: string; head: string }>; searchParams: Promise<Record<string, string | string[] | undefined>> }) {
  const ctx = await shopPage(params, "flow.see");
  const { port = "1", bench } = await searchParams;
  const ask = sheetInput.safeParse({ headId: (await params).head, cylinder: port });
  if (!ask.success) notFound();
  const sheet = await orNotFound(flowSheetFor(ctx, ask.data.headId, ask.data.cylinder));
  const gear = await gearOf(ctx);
  const isBench = bench === "1";
  const at = `/s/${ctx.shop.slug}/flow/${sheet.head.id}`;
  const isOpen = sheet.tests.some((t) => t.state === "draft");
  const page = (
    <main id="main" className="page">
      <PageHead title={<>Flow sheet&ensp;<Tag running={isOpen} runningWord="on the bench">{sheet.head.mark}</Tag></>} sub={sheetSubtitle(sheet)} close={isBench}>
        <PortNav ports={sheet.ports} current={sheet.cylinder} href={(n) => `${at}?port=${n}${isBench ? "&bench=1" : ""}`} />
      </PageHead>
      {isBench ? null : (
        <nav aria-label="More of this head" className="bar">
          <TextLink href={`/s/${ctx.shop.slug}/flow/measure/${sheet.head.id}`}>Measurements</TextLink>
          <TextLink href={`/s/${ctx.shop.slug}/flow/figures/${sheet.head.id}`}>Coefficients and noise</TextLink>
          <TextLink href={`/s/${ctx.shop.slug}/flow/library?family=${encodeURIComponent(sheet.head.family)}`}>Library of {sheet.head.family}</TextLink>
          {sheet.canRecord ? <TextLink href={`/s/${ctx.shop.slug}/flow/upload?head=${sheet.head.id}`}>Read from a file</TextLink> : null}
        </nav>
      )}
      {isBench ? null : <div className="mb-4 noprint"><HeadWork head={sheet.head} mayChange={sheet.canRecord} /></div>}
      <FlowSheetScreen key={`${sheet.cylinder}:${sheet.tests.map((t) => `${t.id}${t.version}${t.state}`).join()}`} sheet={sheet} gear={gear} isBench={isBench} />
    </main>
  );
  return isBench ? <DarkGround>{page}</DarkGround> : page;
}

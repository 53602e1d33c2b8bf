import { orNotFound, shopPage } from "@/modules/access/page";
import { CautionNote } from "@/modules/flow/components/caution-note";
import { HeadWork } from "@/modules/flow/components/head-work";
import { MeasureSheet } from "@/modules/flow/components/measure-sheet";
import { seatCaution } from "@/modules/flow/domain/cautions";
import { cautionsOfOwnHead, cautionsToShow } from "@/modules/flow/queries/job-cautions";
import { measurementSheet } from "@/modules/flow/queries/measurements";
import { LinkButton } from "@/modules/ui/button";
import { PageHead } from "@/modules/ui/page-head";

export const metadata = { title: "Measurement sheet" };
const STEP = "measurement sheet";

export default async function MeasurePage({ params }: { params: Promise<{ shop: string; head: string }> }) {
  const ctx = await shopPage(params, "flow.see");
  const sheet = await orNotFound(measurementSheet(ctx, (await params).head));
  const words = ["springs", "clearance", ...seatCaution(sheet.head.seatMaterial)];
  const hazards = sheet.orderId ? await cautionsToShow(ctx, { workOrderId: sheet.orderId, step: STEP, hazards: words }) : await cautionsOfOwnHead(ctx, { headId: sheet.head.id, step: STEP, hazards: words });
  const base = `/s/${ctx.shop.slug}`;
  return (
    <main id="main" className="page">
      <PageHead title={<>Measurement sheet <span className="dim">{sheet.head.mark}</span></>} sub={`${sheet.head.family}. Limits are the shop's, with their source; where none is entered, defer to the service manual.`}
        actions={<><LinkButton href={`${base}/flow/${sheet.head.id}`}>Flow sheet</LinkButton><LinkButton href={`${base}/flow/workings`}>Workings</LinkButton>{sheet.orderNumber ? <LinkButton href={`${base}/orders/${sheet.orderNumber}`}>Order</LinkButton> : null}</>} />
      {sheet.canRecord ? <div className="mb-4"><CautionNote hazards={hazards} workOrderId={sheet.orderId} headId={sheet.head.id} step={STEP} /></div> : null}
      <div className="mb-4 noprint"><HeadWork head={sheet.head} mayChange={sheet.canRecord} /></div>
      <MeasureSheet sheet={sheet} />
    </main>
  );
}

import { shopPage } from "@/modules/access/page";
import { LadderPaper } from "@/modules/flow/components/ladder-paper";
import { gearRoom } from "@/modules/flow/queries/gear";
import { settingsOf } from "@/modules/access/context";
import { LinkButton } from "@/modules/ui/button";
import { PageHead } from "@/modules/ui/page-head";

export const metadata = { title: "Ladder for paper" };

export default async function LadderPage({ params }: { params: Promise<{ shop: string }> }) {
  const ctx = await shopPage(params, "flow.see");
  const [room, settings] = [await gearRoom(ctx), await settingsOf(ctx)];
  return (
    <main id="main" className="page">
      <div className="noprint"><PageHead title="Ladder for paper" sub="An empty flow sheet to fill in by hand; a photograph of it can be kept with the head." actions={<LinkButton href={`/s/${ctx.shop.slug}/flow`}>Flow room</LinkButton>} /></div>
      <LadderPaper shopName={ctx.shop.name} nominal={settings.nominalPressureInH2O} families={room.families.map((f) => ({ name: f.name, camLiftIntakeUm: f.camLiftIntakeUm, camLiftExhaustUm: f.camLiftExhaustUm }))} />
    </main>
  );
}

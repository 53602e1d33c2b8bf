import { shopPage } from "@/modules/access/page";
import { WorkingsDesk } from "@/modules/flow/components/workings/workings-desk";
import { workingsShop } from "@/modules/flow/workings-queries";
import { LinkButton } from "@/modules/ui/button";
import { PageHead } from "@/modules/ui/page-head";

export const metadata = { title: "Workings" };

export default async function WorkingsPage({ params }: { params: Promise<{ shop: string }> }) {
  const ctx = await shopPage(params, "flow.see");
  const { estimatesOn } = await workingsShop(ctx);
  return (
    <main id="main" className="page">
      <PageHead title="Workings" sub="A bench operator's arithmetic, each with its source. Nothing typed here is kept with a head." actions={<LinkButton href={`/s/${ctx.shop.slug}/flow`}>Flow room</LinkButton>} />
      <WorkingsDesk estimatesOn={estimatesOn} />
    </main>
  );
}

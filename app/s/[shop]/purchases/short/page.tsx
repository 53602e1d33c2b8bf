import { shopPage } from "@/modules/access/page";
import { Suggestions } from "@/modules/purchasing/components/suggestions";
import { suggestionsFor } from "@/modules/purchasing/queries/suggestions";
import { findSuppliers } from "@/modules/purchasing/queries/suppliers";
import { PageHead } from "@/modules/ui/page-head";

export const metadata = { title: "What to buy" };

export default async function ShortPage({ params }: { params: Promise<{ shop: string }> }) {
  const ctx = await shopPage(params, "purchase.write");
  const [groups, suppliers] = [await suggestionsFor(ctx), await findSuppliers(ctx)];
  return (
    <main id="main" className="page">
      <PageHead title="What to buy" sub="Short for an order, or at the reorder mark, and not on its way yet. Tick what you want." />
      <Suggestions groups={groups} suppliers={suppliers.filter((s) => s.active)} />
    </main>
  );
}

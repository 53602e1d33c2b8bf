import { ableTo } from "@/modules/access/context";
import { shopPage } from "@/modules/access/page";
import { supplierNames } from "@/modules/purchasing/queries/suppliers";
import { AddPartForm } from "@/modules/stock/components/part-form";
import { PageHead } from "@/modules/ui/page-head";

export const metadata = { title: "Add a part" };

export default async function NewPartPage({ params }: { params: Promise<{ shop: string }> }) {
  const ctx = await shopPage(params, "parts.write");
  return (
    <main id="main" className="page">
      <PageHead title="Add a part" sub="Its number is for ever; the rest can be changed." />
      <div style={{ maxWidth: 920 }}><AddPartForm suppliers={await supplierNames(ctx)} seesPrice={ableTo(ctx, "prices.see")} /></div>
    </main>
  );
}

import { ableTo } from "@/modules/access/context";
import { orNotFound, shopPage } from "@/modules/access/page";
import { supplierNames } from "@/modules/purchasing/queries/suppliers";
import { ChangePartForm } from "@/modules/stock/components/part-form";
import { getPart } from "@/modules/stock/queries/get-part";
import { PageHead } from "@/modules/ui/page-head";

export const metadata = { title: "Change part" };

export default async function ChangePartPage({ params }: { params: Promise<{ shop: string; sku: string }> }) {
  const ctx = await shopPage(params, "parts.write");
  const part = await orNotFound(getPart(ctx, decodeURIComponent((await params).sku)));
  return (
    <main id="main" className="page">
      <PageHead title={`Change ${part.sku}`} sub="The number stays." />
      <div style={{ maxWidth: 920 }}><ChangePartForm part={part} suppliers={await supplierNames(ctx)} seesPrice={ableTo(ctx, "prices.see")} /></div>
    </main>
  );
}

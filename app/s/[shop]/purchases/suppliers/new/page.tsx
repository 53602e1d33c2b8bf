import { shopPage } from "@/modules/access/page";
import { AddSupplierForm } from "@/modules/purchasing/components/supplier-form";
import { PageHead } from "@/modules/ui/page-head";

export const metadata = { title: "Add a supplier" };

export default async function NewSupplierPage({ params }: { params: Promise<{ shop: string }> }) {
  await shopPage(params, "purchase.write");
  return <main id="main" className="page"><PageHead title="Add a supplier" /><div style={{ maxWidth: 920 }}><AddSupplierForm /></div></main>;
}

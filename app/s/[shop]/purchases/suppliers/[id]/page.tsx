import { notFound } from "next/navigation";
import { orNotFound, shopPage } from "@/modules/access/page";
import { isUuid } from "@/modules/kernel/id";
import { ChangeSupplierForm } from "@/modules/purchasing/components/supplier-form";
import { getSupplier } from "@/modules/purchasing/queries/suppliers";
import { PageHead } from "@/modules/ui/page-head";

export const metadata = { title: "Change supplier" };

export default async function SupplierPage({ params }: { params: Promise<{ shop: string; id: string }> }) {
  const ctx = await shopPage(params, "purchase.write");
  const { id } = await params;
  if (!isUuid(id)) notFound();
  const supplier = await orNotFound(getSupplier(ctx, id));
  return <main id="main" className="page"><PageHead title={supplier.name} /><div style={{ maxWidth: 920 }}><ChangeSupplierForm supplier={supplier} /></div></main>;
}

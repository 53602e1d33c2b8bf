import { shopPage } from "@/modules/access/page";
import { CustomerForm } from "@/modules/customers/components/customer-form";
import { PageHead } from "@/modules/ui/page-head";

export const metadata = { title: "New customer" };

export default async function NewCustomerPage({ params }: { params: Promise<{ shop: string }> }) {
  await shopPage(params, "customers.write");
  return (
    <main id="main" className="page">
      <PageHead title="New customer" />
      <div className="max-w-[820px]"><CustomerForm customer={null} mayChange /></div>
    </main>
  );
}

import { ableTo } from "@/modules/access/context";
import { shopPage } from "@/modules/access/page";
import { CustomersTable } from "@/modules/customers/components/customers-table";
import { findCustomers } from "@/modules/customers/queries";

export const metadata = { title: "Customers" };

export default async function CustomersPage({ params }: { params: Promise<{ shop: string }> }) {
  const ctx = await shopPage(params, "customers.see");
  return <main id="main" className="page"><CustomersTable first={await findCustomers(ctx, { q: "", limit: 50 })} mayAdd={ableTo(ctx, "customers.write")} /></main>;
}

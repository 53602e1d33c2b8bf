import { shopPage } from "@/modules/access/page";
import { MenuTable } from "@/modules/work-orders/components/menu-table";
import { menuOf } from "@/modules/work-orders/queries/menu";
import { SettingsHead } from "../settings-head";

export const metadata = { title: "Menu of operations" };

export default async function MenuPage({ params }: { params: Promise<{ shop: string }> }) {
  const ctx = await shopPage(params, "menu.write");
  return (
    <main id="main" className="page">
      <SettingsHead ctx={ctx} current="menu" title="Menu of operations" sub="Codes, book hours and prices that estimates are written from." />
      <MenuTable rows={await menuOf(ctx, { withRetired: true })} />
    </main>
  );
}

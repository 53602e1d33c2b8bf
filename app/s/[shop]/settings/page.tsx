import { shopPage } from "@/modules/access/page";
import { ShopSettingsForm } from "@/modules/books/components/shop-settings-form";
import { shopSettingsView } from "@/modules/books/settings";
import { Bay, Bays } from "@/modules/ui/bay";
import { Kv } from "@/modules/ui/kv";
import { SettingsHead } from "./settings-head";

export const metadata = { title: "Shop settings" };

export default async function SettingsPage({ params }: { params: Promise<{ shop: string }> }) {
  const ctx = await shopPage(params, "settings.write");
  const { values, series } = await shopSettingsView(ctx);
  return (
    <main id="main" className="page">
      <SettingsHead ctx={ctx} current="shop" title="Shop settings" sub={`${ctx.shop.name}, ${ctx.shop.currency}, ${ctx.shop.zone}`} />
      <div className="split">
        <ShopSettingsForm values={values} />
        <Bays>
          <Bay label="Numbers">{series.length === 0 ? <p className="mid sm">Nothing was numbered yet. Each series starts at 1.</p> : <Kv end pairs={series.map((s) => [s.series, `next ${s.next}`])} />}</Bay>
        </Bays>
      </div>
    </main>
  );
}

import { env } from "@/modules/access/env";
import { shopPage } from "@/modules/access/page";
import { BenchComputerGuide } from "@/modules/flow/components/bench-computer-guide";
import { gearOf } from "@/modules/flow/queries/sheet";
import { DeviceList } from "@/modules/time/components/device-list";
import { deviceList } from "@/modules/time/queries/settings-lists";
import { SettingsHead } from "../settings-head";

export const metadata = { title: "Tablets" };

export default async function DevicesPage({ params }: { params: Promise<{ shop: string }> }) {
  const ctx = await shopPage(params, "devices.write");
  const [devices, gear] = [await deviceList(ctx), await gearOf(ctx)];
  const facts = {
    origin: env().VK_APP_URL.replace(/\/$/, ""), slug: ctx.shop.slug, benchId: gear.benches[0]?.id ?? "ID-OF-THE-BENCH", fixtureId: gear.fixtures[0]?.id ?? "ID-OF-THE-BORE-ADAPTER",
    operatorId: gear.operators[0]?.id ?? "ID-OF-THE-OPERATOR", tag: "TAG-OF-THE-HEAD", testId: "ID-OF-THE-OPEN-TEST",
  };
  return (
    <main id="main" className="page">
      <SettingsHead ctx={ctx} current="tablets" title="Tablets" sub="Shop clocks and bench computers" />
      <DeviceList devices={devices} />
      <div className="mt-8"><BenchComputerGuide facts={facts} documentHref="/api/v1/openapi.json" /></div>
    </main>
  );
}

import { shopPage } from "@/modules/access/page";
import { DeviceList } from "@/modules/time/components/device-list";
import { deviceList } from "@/modules/time/queries/settings-lists";
import { SettingsHead } from "../settings-head";

export const metadata = { title: "Tablets" };

export default async function DevicesPage({ params }: { params: Promise<{ shop: string }> }) {
  const ctx = await shopPage(params, "devices.write");
  return (
    <main id="main" className="page">
      <SettingsHead ctx={ctx} current="tablets" title="Tablets" sub="Shop clocks and bench computers" />
      <DeviceList devices={await deviceList(ctx)} />
    </main>
  );
}

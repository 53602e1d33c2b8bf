import type { ReactNode } from "react";
import { ableTo, type ShopContext } from "@/modules/access/context";
import { PageHead } from "@/modules/ui/page-head";
import { Views } from "@/modules/ui/views";

const PAGES = [
  { key: "shop", label: "Shop", path: "/settings", act: "settings.write" },
  { key: "people", label: "People", path: "/settings/people", act: "devices.write" },
  { key: "tablets", label: "Tablets", path: "/settings/devices", act: "devices.write" },
  { key: "menu", label: "Menu of operations", path: "/settings/menu", act: "menu.write" },
] as const;

/** Settings this person may open, in their order. */
export const settingsFor = (ctx: ShopContext) => PAGES.filter((p) => ableTo(ctx, p.act)).map((p) => ({ key: p.key, label: p.label, href: `/s/${ctx.shop.slug}${p.path}` }));

/** Head of the settings with their tabs; those a role may not open are not there. */
export function SettingsHead({ ctx, title, sub, current }: { ctx: ShopContext; title: string; sub: ReactNode; current: (typeof PAGES)[number]["key"] }) {
  return (
    <>
      <PageHead title={title} sub={sub} close />
      <Views className="mb-5" label="Settings" current={current} views={settingsFor(ctx)} />
    </>
  );
}

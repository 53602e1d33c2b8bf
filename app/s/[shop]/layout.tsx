import type { ReactNode } from "react";
import { ableTo } from "@/modules/access/context";
import { shopPage } from "@/modules/access/page";
import { shortRoleWords } from "@/modules/time/role-words";
import { PlaceProvider } from "@/modules/ui/place";
import { settingsFor } from "./settings/settings-head";
import { ShopRail } from "./shop-rail";

export default async function ShopLayout({ children, params }: { children: ReactNode; params: Promise<{ shop: string }> }) {
  const ctx = await shopPage(params);
  const { shop, actor } = ctx;
  return (
    <PlaceProvider place={{ slug: shop.slug, locale: shop.locale, currency: shop.currency, zone: shop.zone }}>
      <ShopRail
        slug={shop.slug} shopName={shop.name}
        person={{ name: actor.name, initials: actor.name.split(/\s+/).map((w) => w[0] ?? "").join("").slice(0, 2).toUpperCase(), role: shortRoleWords(actor.kind === "person" ? actor.roles : []) }}
        may={{ open: ableTo(ctx, "orders.open"), books: ableTo(ctx, "books.see"), settings: settingsFor(ctx)[0]?.href ?? null }}
      />
      {children}
    </PlaceProvider>
  );
}

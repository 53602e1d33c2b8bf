"use client";
import { signOut } from "next-auth/react";
import { usePathname } from "next/navigation";
import { Rail, type Room } from "@/modules/ui/rail";

const ROOMS: readonly [key: string, label: string, path: string][] = [
  ["floor", "Floor", ""], ["orders", "Orders", "/orders"], ["flow", "Flow", "/flow"], ["parts", "Parts", "/parts"], ["time", "Time", "/time"], ["books", "Books", "/books"],
];

/** The rail of a shop's pages; the room is read from the address. */
export function ShopRail({ slug, shopName, person, may }: {
  slug: string; shopName: string; person: { name: string; initials: string; role: string }; may: { open: boolean; books: boolean; settings: string | null };
}) {
  const at = usePathname().split("/")[3] ?? "";
  const rooms: Room[] = ROOMS.filter(([key]) => key !== "books" || may.books).map(([key, label, path]) => ({ key, label, href: `/s/${slug}${path}` }));
  const current = ({ "": "floor", orders: "orders", customers: "orders", flow: "flow", parts: "parts", purchases: "parts", time: "time", books: "books" } as Record<string, string>)[at];
  return (
    <Rail
      shopName={shopName} homeHref={`/s/${slug}`} rooms={rooms} {...(current ? { current } : {})}
      find={{ label: "Find", more: " order, tag, name", description: "Find an order, tag, customer or part", href: `/s/${slug}/find` }}
      {...(may.open ? { create: { label: "New", more: " work order", href: `/s/${slug}/orders/new` } } : {})}
      person={{
        ...person,
        menu: [
          ...(may.settings ? [{ key: "settings", label: "Shop settings", href: may.settings }] : []),
          { key: "sign-out", label: "Sign out", onSelect: () => void signOut({ callbackUrl: "/sign-in" }) },
        ],
      }}
    />
  );
}

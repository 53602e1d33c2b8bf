import { and, eq } from "drizzle-orm";
import { links } from "@/db/schema";
import { withShop } from "@/db/scope";
import type { ShopContext } from "@/modules/access/context";
import type { TestShop } from "./shop";

/** Context of a customer who holds the standing link to a matter: what opening the page would make. */
export async function openLinkContextFor(shop: TestShop, customerId: string, subjectId: string, at: string): Promise<ShopContext> {
  const [link] = await withShop(shop.shop.id, (tx) => tx.select().from(links).where(and(eq(links.shopId, shop.shop.id), eq(links.subjectId, subjectId))));
  if (!link) throw new Error("there is no link to this");
  return {
    shop: shop.shop, actor: { kind: "customer", id: customerId, name: "customer", linkId: link.id, purpose: link.purpose, subjectId }, now: new Date(at),
    request: { ip: "203.0.113.9", agent: "a telephone" },
  };
}

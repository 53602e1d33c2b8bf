import type { ShopContext } from "@/modules/access/context";
import type { Role } from "@/modules/access/roles";
import { instantOf } from "@/modules/kernel/instant";
import type { Result } from "@/modules/kernel/result";
import { foundShop, type NewShop } from "./found-shop";

/** A founded shop and the people who act in its story. Times are wall clock in the shop's zone: `2026-02-18T10:42`. */
export interface Cast {
  readonly shop: ShopContext["shop"];
  readonly people: Readonly<Record<string, string>>;
  as(shortName: string, local: string): ShopContext;
  system(local: string): ShopContext;
}

const REQUEST = { ip: "", agent: "demo story" };

/** Founds a shop and returns its cast. */
export async function castOf(ownerUrl: string, pinPepper: string, facts: NewShop): Promise<Cast> {
  const { shopId, people } = await foundShop(ownerUrl, pinPepper, facts);
  const shop = { id: shopId, slug: facts.slug, name: facts.name, zone: facts.zone, currency: facts.currency, locale: facts.locale };
  const roles = new Map<string, { name: string; roles: readonly Role[] }>(facts.people.map((p) => [p.shortName, { name: p.shortName, roles: p.roles }]));
  return {
    shop,
    people,
    as(shortName, local) {
      const who = roles.get(shortName);
      const id = people[shortName];
      if (!who || !id) throw new Error(`nobody called ${shortName} in ${shop.name}`);
      return { shop, actor: { kind: "person", id, name: who.name, roles: who.roles, sessionId: null }, now: instantOf(local, shop.zone), request: REQUEST };
    },
    system: (local) => ({ shop, actor: { kind: "system", id: "story", name: "Valvekeeper" }, now: instantOf(local, shop.zone), request: REQUEST }),
  };
}

/** The value, or the refusal as an error: a story that the product refuses is a wrong story. */
export function must<T>(result: Result<T>, what = ""): T {
  if (!result.ok) throw new Error(`${what} refused: ${JSON.stringify(result.refusal)}`);
  return result.value;
}

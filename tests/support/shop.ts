import { randomUUID } from "node:crypto";
import type { ShopContext } from "@/modules/access/context";
import type { Role } from "@/modules/access/roles";
import type { Result } from "@/modules/kernel/result";
import { foundShop, type NewPerson } from "@/seed/found-shop";
import { currentDatabase } from "./database";

export interface TestShop {
  shop: ShopContext["shop"];
  /** Context of the person with that short name, at an instant (ISO); default 2026-02-18T17:00Z. */
  as(shortName: string, at?: string): ShopContext;
  system(at?: string): ShopContext;
  people: Record<string, string>;
}

/** One person a role, named by the role; `owner`, `counter`, `tech`, `lead`, `insp`, `rcv`, `book`, `mgr`. */
const STAFF: NewPerson[] = [
  { name: "Olive Owner", shortName: "owner", roles: ["owner"], badge: "B-01", pin: "480131", rateMinor: 4000 },
  { name: "Cory Counter", shortName: "counter", roles: ["counter"], badge: "B-02", pin: "480132", rateMinor: 2200 },
  { name: "Tess Technician", shortName: "tech", roles: ["technician"], badge: "B-03", pin: "480133", rateMinor: 3800 },
  { name: "Lee Lead", shortName: "lead", roles: ["lead", "technician"], badge: "B-04", pin: "480134", rateMinor: 3100 },
  { name: "Ivy Inspector", shortName: "insp", roles: ["inspector", "technician"], badge: "B-05", pin: "480135", rateMinor: 3000 },
  { name: "Ray Receiving", shortName: "rcv", roles: ["receiving", "technician"], badge: "B-06", pin: "480136", rateMinor: 1900 },
  { name: "Bea Books", shortName: "book", roles: ["bookkeeper"], badge: "B-07", pin: "480137", rateMinor: 2700 },
  { name: "Mia Manager", shortName: "mgr", roles: ["manager"], badge: "B-08", pin: "480138", rateMinor: 3500 },
];

/** Founds a shop in the test file's database. Call it twice for the other shop. */
export async function testShop(slug = "first", more: Partial<Parameters<typeof foundShop>[2]> = {}): Promise<TestShop> {
  const facts = { slug, name: `${slug[0]?.toUpperCase()}${slug.slice(1)} Headworks`, zone: "America/Denver", currency: "USD", locale: "en-US", ...more };
  const roles = new Map<string, { name: string; roles: Role[] }>();
  const staff = more.people ?? STAFF;
  for (const p of staff) roles.set(p.shortName, { name: p.name, roles: p.roles });
  const { shopId, people } = await foundShop(currentDatabase().ownerUrl, process.env.VK_PIN_PEPPER ?? "", {
    settings: {
      email: `counter@${slug}.example`, address: "1 Bench Lane\nPell", taxMode: "sales", taxName: "Pell County tax", taxRateText: "7.35", suppliesBasisPoints: 400, suppliesCapMinor: 6000,
      depositBasisPoints: 3000, burdenBasisPoints: 1800, billRateMinor: 11000,
    },
    ratesFrom: "2025-05-01",
    ...facts,
    people: staff,
  });
  const shop = { id: shopId, slug: facts.slug, name: facts.name, zone: facts.zone, currency: facts.currency, locale: facts.locale };
  const request = { ip: "127.0.0.1", agent: "test" };
  return {
    shop,
    people,
    as(shortName, at = "2026-02-18T17:00:00Z") {
      const p = roles.get(shortName);
      const id = people[shortName];
      if (!p || !id) throw new Error(`nobody called ${shortName}`);
      return { shop, actor: { kind: "person", id, name: p.name, roles: p.roles, sessionId: null }, now: new Date(at), request };
    },
    system: (at = "2026-02-18T17:00:00Z") => ({ shop, actor: { kind: "system", id: "test", name: "Test" }, now: new Date(at), request }),
  };
}

/** The value of a result, or the refusal as an error: for arranging. */
export function must<T>(result: Result<T>): T {
  if (!result.ok) throw new Error(`refused: ${JSON.stringify(result.refusal)}`);
  return result.value;
}

export const requestId = (): string => randomUUID();

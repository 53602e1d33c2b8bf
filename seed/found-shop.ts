import { randomUUID } from "node:crypto";
import { sql } from "drizzle-orm";
import { drizzle } from "drizzle-orm/node-postgres";
import pg from "pg";
import * as schema from "@/db/schema";
import { hashSecret } from "@/modules/access/password";
import type { Role } from "@/modules/access/roles";
import { ACCOUNTS } from "@/modules/books/domain/accounts";

export interface NewPerson {
  name: string;
  shortName: string;
  roles: Role[];
  skills?: string[];
  email?: string;
  /** Sets up a sign-in for the office; without one the person has only the clock. */
  password?: string;
  badge?: string;
  pin?: string;
  rateMinor?: number;
}

export interface NewShop {
  slug: string;
  name: string;
  zone: string;
  currency: string;
  locale: string;
  settings: Partial<Omit<schema.ShopSettings, "shopId" | "version">>;
  people: NewPerson[];
  /** First number of a series when the shop brings its own: `{ "WO-2026": 118 }`. */
  numbersFrom?: Record<string, number>;
  ratesFrom: string;
}

/** Founds a shop with its people and chart of accounts. The owner of the database does it, never the application. Returns ids by short name. */
export async function foundShop(ownerUrl: string, pinPepper: string, shop: NewShop): Promise<{ shopId: string; people: Record<string, string> }> {
  const client = new pg.Client({ connectionString: ownerUrl });
  await client.connect();
  const db = drizzle(client, { schema });
  const shopId = randomUUID();
  const ids: Record<string, string> = {};
  try {
    await db.transaction(async (tx) => {
      await tx.execute(sql`select set_config('app.shop_id', ${shopId}, true)`);
      await tx.insert(schema.shops).values({ id: shopId, slug: shop.slug, name: shop.name, zone: shop.zone, currency: shop.currency, locale: shop.locale });
      await tx.insert(schema.shopSettings).values({ shopId, ...shop.settings });
      for (const p of shop.people) {
        let userId: string | null = null;
        if (p.email && p.password) {
          userId = randomUUID();
          await tx.insert(schema.users).values({ id: userId, email: p.email.toLowerCase(), name: p.name, passwordHash: await hashSecret(p.password) });
        }
        const id = randomUUID();
        ids[p.shortName] = id;
        await tx.insert(schema.people).values({
          shopId, id, userId, name: p.name, shortName: p.shortName, email: p.email ?? null, roles: p.roles, skills: p.skills ?? [],
          badgeCode: p.badge ?? null, pinHash: p.pin ? await hashSecret(p.pin + pinPepper) : null,
        });
        if (p.rateMinor) await tx.insert(schema.payRates).values({ shopId, id: randomUUID(), personId: id, validFrom: shop.ratesFrom, rateMinor: p.rateMinor });
      }
      for (const a of ACCOUNTS) await tx.insert(schema.accounts).values({ shopId, code: a.code, name: a.name, kind: a.kind });
      for (const [series, next] of Object.entries(shop.numbersFrom ?? {})) await tx.insert(schema.counters).values({ shopId, series, next });
    });
    return { shopId, people: ids };
  } finally {
    await client.end();
  }
}

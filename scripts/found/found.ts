import pg from "pg";
import type { ShopContext } from "@/modules/access/context";
import { emailText } from "@/modules/customers/input";
import { z } from "@/modules/kernel/zod";
import { invitationFor } from "@/modules/time/identity/invitation";
import { foundShop } from "@/seed/found-shop";

const isZone = (zone: string): boolean => {
  try {
    return new Intl.DateTimeFormat("en", { timeZone: zone }).resolvedOptions().timeZone !== "";
  } catch {
    return false;
  }
};
const isLocale = (locale: string): boolean => {
  try {
    return Intl.getCanonicalLocales(locale).length === 1;
  } catch {
    return false;
  }
};

const newShopInput = z.strictObject({
  slug: z.string().regex(/^[a-z0-9](?:[a-z0-9-]{1,38}[a-z0-9])$/, "--slug: lower-case letters, digits and dashes, 3 to 40 of them, such as ninebark."),
  name: z.string().trim().min(2, "--name: the name on papers.").max(80),
  zone: z.string().refine(isZone, "--zone: a time zone such as America/Denver."),
  currency: z.string().refine((c) => Intl.supportedValuesOf("currency").includes(c), "--currency: three capital letters, such as USD."),
  locale: z.string().refine(isLocale, "--locale: such as en-US."),
  owner: z.string().trim().min(2, "--owner: the owner's name.").max(80),
  email: emailText.refine((e) => e !== "", "--email: one e-mail address, such as name@shop.example.").transform((e) => e.toLowerCase()),
});

export class NotFounded extends Error {}
export interface Founded { readonly slug: string; readonly address: string; readonly until: string }

async function ask<T>(ownerUrl: string, text: string, values: unknown[], shopId?: string): Promise<T[]> {
  const client = new pg.Client({ connectionString: ownerUrl, connectionTimeoutMillis: 10_000 });
  await client.connect();
  try {
    await client.query("begin");
    if (shopId) await client.query("select set_config('app.shop_id', $1, true)", [shopId]);
    return (await client.query(text, values)).rows as T[];
  } finally {
    await client.query("rollback");
    await client.end();
  }
}

/** A link for the owner of a shop who has no password yet: good once, for three days. @throws NotFounded */
export async function ownersLink(ownerUrl: string, slug: string, now: Date): Promise<Founded> {
  const [shop] = await ask<ShopContext["shop"]>(ownerUrl, "select id, slug, name, zone, currency, locale from shops where slug = $1", [slug]);
  if (!shop) throw new NotFounded(`There is no shop "${slug}".`);
  const [owner] = await ask<{ id: string; name: string; version: number }>(ownerUrl,
    "select id, name, version::int from people where shop_id = $1 and 'owner' = any(roles) and user_id is null and left_at is null and email is not null order by created_at limit 1", [shop.id], shop.id);
  if (!owner) throw new NotFounded(`The owner of ${shop.name} has set a password already. An owner makes further invitations in the shop's settings.`);
  const ctx: ShopContext = { shop, actor: { kind: "person", id: owner.id, name: owner.name, roles: ["owner"], sessionId: null }, now, request: { ip: "", agent: "shop:found" } };
  return { slug, ...invitationFor(ctx, owner) };
}

/** Founds a shop whose only person is its owner, without a password. @throws NotFounded in words that say what is wrong */
export async function foundWithOwner(ownerUrl: string, pinPepper: string, typed: unknown, now: Date): Promise<Founded> {
  const parsed = newShopInput.safeParse(typed);
  if (!parsed.success) throw new NotFounded(parsed.error.issues.map((i) => i.message).join("\n"));
  const { owner, email, ...shop } = parsed.data;
  const [taken] = await ask<{ slug: string }>(ownerUrl, "select slug from shops where slug = $1", [shop.slug]);
  if (taken) throw new NotFounded(`There is a shop "${shop.slug}" already. Choose another short name, or ask for another link with --again ${shop.slug}.`);
  await foundShop(ownerUrl, pinPepper, { ...shop, settings: { email }, people: [{ name: owner, shortName: owner.split(/\s+/)[0] ?? owner, roles: ["owner"], email }], ratesFrom: now.toISOString().slice(0, 10) });
  return ownersLink(ownerUrl, shop.slug, now);
}

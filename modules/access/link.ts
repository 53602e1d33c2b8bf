import "server-only";
import { randomUUID } from "node:crypto";
import { and, eq, gt, isNull } from "drizzle-orm";
import { customers, links, shops } from "@/db/schema";
import { withSecret, withShop } from "@/db/scope";
import { now } from "./clock";
import type { ShopContext, TxContext } from "./context";
import { env } from "./env";
import { allowed } from "./rate-limit";
import { hashToken, linkToken } from "./secret-token";
import { requestFacts } from "./session";

export type LinkPurpose = "estimate" | "invoice" | "gain";

export interface CustomerLink {
  readonly ctx: ShopContext;
  readonly purpose: LinkPurpose;
  readonly subjectId: string;
  readonly workOrderId: string | null;
  readonly customerId: string;
}

/** What a customer's link opens, or null: unknown, expired, revoked and wrong look alike. Looking changes nothing the shop relies on. */
export async function openLink(token: string): Promise<CustomerLink | null> {
  if (!/^[\w-]{40,50}$/.test(token)) return null;
  const facts = await requestFacts();
  if (!(await allowed(`link:${facts.ip}`, 120, 60))) return null;
  const linkHash = hashToken(token);
  const at = now();
  const found = await withSecret({ linkHash }, async (tx) => {
    const [row] = await tx.select({ link: links, shop: shops }).from(links).innerJoin(shops, eq(shops.id, links.shopId))
      .where(and(eq(links.tokenHash, linkHash), isNull(links.revokedAt), gt(links.expiresAt, at)));
    return row;
  });
  if (!found) return null;
  const { link } = found;
  const { createdAt: _, ...shop } = found.shop;
  const name = await withShop(shop.id, async (tx) => {
    await tx.update(links).set({ lastOpenedAt: at, ...(link.firstOpenedAt ? {} : { firstOpenedAt: at }) }).where(and(eq(links.shopId, shop.id), eq(links.id, link.id)));
    const [c] = await tx.select({ name: customers.name }).from(customers).where(and(eq(customers.shopId, shop.id), eq(customers.id, link.customerId)));
    return c?.name ?? "";
  });
  return {
    ctx: { shop, actor: { kind: "customer", id: link.customerId, name, linkId: link.id, purpose: link.purpose, subjectId: link.subjectId }, now: at, request: facts },
    purpose: link.purpose as LinkPurpose,
    subjectId: link.subjectId,
    workOrderId: link.workOrderId,
    customerId: link.customerId,
  };
}

/** For actions on a customer page: the context alone. */
export const linkContext = async (token: string): Promise<ShopContext | null> => (await openLink(token))?.ctx ?? null;

const DAYS: Record<LinkPurpose, number> = { estimate: 30, invoice: 365, gain: 180 };

/** The address of a link for one matter and purpose: the standing one, or a new one. Revoke to end it. */
export async function linkFor(
  ctx: TxContext, matter: { purpose: LinkPurpose; subjectId: string; customerId: string; workOrderId: string | null },
): Promise<string> {
  const [standing] = await ctx.tx.select({ id: links.id }).from(links).where(and(
    eq(links.shopId, ctx.shop.id), eq(links.subjectId, matter.subjectId), eq(links.purpose, matter.purpose), isNull(links.revokedAt), gt(links.expiresAt, ctx.now)));
  const id = standing?.id ?? randomUUID();
  if (!standing) {
    await ctx.tx.insert(links).values({
      shopId: ctx.shop.id, id, tokenHash: hashToken(linkToken(id)), ...matter, expiresAt: new Date(ctx.now.getTime() + DAYS[matter.purpose] * 86_400_000),
    });
  }
  return linkAddress(id);
}

export const linkAddress = (linkId: string): string => `${env().VK_APP_URL}/l/${linkToken(linkId)}`;

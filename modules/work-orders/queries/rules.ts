import "server-only";
import { and, eq, gte, lte } from "drizzle-orm";
import { taxCertificates } from "@/db/schema";
import { inShop, settingsOf, type ShopContext } from "@/modules/access/context";
import { rulesFrom, type DocumentRules } from "../domain/document-rules";

/** The money rules of a document for a customer on a tax date: the shop's settings, and a certificate if one is valid that day. */
export async function rulesFor(ctx: ShopContext, customerId: string, taxDate: string): Promise<DocumentRules> {
  const settings = await settingsOf(ctx);
  const [certificate] = await inShop(ctx, (tx) => tx.select({ number: taxCertificates.number }).from(taxCertificates).where(and(
    eq(taxCertificates.shopId, ctx.shop.id), eq(taxCertificates.customerId, customerId), lte(taxCertificates.validFrom, taxDate), gte(taxCertificates.validTo, taxDate))).limit(1));
  return rulesFrom(settings, certificate?.number ?? null);
}

import "server-only";
import { and, eq, sql } from "drizzle-orm";
import { counters, shopSettings } from "@/db/schema";
import { changedMeanwhile, defineCommand } from "@/modules/access/command";
import { inShop, mustBeAble, settingsOf, type ShopContext } from "@/modules/access/context";
import { minorText } from "@/modules/kernel/money";
import { ok } from "@/modules/kernel/result";
import { shopSettingsInput } from "./settings-input";

/** Money rules of the shop, for new documents. What was issued keeps the rules it was made by. */
export const changeShopSettings = defineCommand({
  name: "shop.settings",
  act: "settings.write",
  input: shopSettingsInput,
  async run(ctx, { version, supplies, suppliesCap, deposit, burden, billRate, writeOffLimit, ...rest }) {
    const [row] = await ctx.tx.update(shopSettings).set({
      ...rest, suppliesBasisPoints: supplies, suppliesCapMinor: suppliesCap, depositBasisPoints: deposit, burdenBasisPoints: burden, billRateMinor: billRate, writeOffLimitMinor: writeOffLimit, version: sql`${shopSettings.version} + 1`,
    }).where(and(eq(shopSettings.shopId, ctx.shop.id), eq(shopSettings.version, version))).returning({ version: shopSettings.version });
    return row ? ok({ version: row.version }) : changedMeanwhile("The shop's settings");
  },
  subject: () => ({ kind: "shop", id: "settings" }),
});

const percentText = (bp: number) => minorText(bp).replace(/\.?0+$/, "") || "0";

/** The settings as text for their form, and where each number series stands. */
export async function shopSettingsView(ctx: ShopContext) {
  mustBeAble(ctx, "settings.write");
  return inShop(ctx, async (tx) => {
    const s = await settingsOf({ ...ctx, tx });
    const series = await tx.select({ series: counters.series, next: counters.next }).from(counters).where(eq(counters.shopId, ctx.shop.id));
    const oneOf = <T extends string>(value: string, all: readonly [T, ...T[]]): T => all.find((x) => x === value) ?? all[0];
    return {
      series: series.filter((x) => x.series !== "JOURNAL").sort((x, y) => x.series.localeCompare(y.series)),
      values: {
        version: s.version, address: s.address, phone: s.phone, email: s.email, taxNumber: s.taxNumber, taxMode: oneOf(s.taxMode, ["sales", "vat"]), taxName: s.taxName, taxRateText: s.taxRateText,
        taxBasis: oneOf(s.taxBasis, ["invoice", "line"]), laborTaxable: s.laborTaxable, partsTaxable: s.partsTaxable, suppliesTaxable: s.suppliesTaxable, freightTaxable: s.freightTaxable, taxDecidedBy: s.taxDecidedBy,
        supplies: percentText(s.suppliesBasisPoints), suppliesCap: s.suppliesCapMinor === null ? "" : minorText(s.suppliesCapMinor), deposit: percentText(s.depositBasisPoints), burden: percentText(s.burdenBasisPoints),
        billRate: minorText(s.billRateMinor), writeOffLimit: minorText(s.writeOffLimitMinor), estimateValidDays: s.estimateValidDays, referencePrefix: s.referencePrefix, invoiceWords: s.invoiceWords,
      },
    };
  });
}
export type ShopSettingsValues = Awaited<ReturnType<typeof shopSettingsView>>["values"];

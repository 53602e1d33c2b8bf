import "server-only";
import { and, eq, sql } from "drizzle-orm";
import { shopSettings } from "@/db/schema";
import { changedMeanwhile, defineCommand } from "@/modules/access/command";
import { ok } from "@/modules/kernel/result";
import { flowLimitsInput, ownOf } from "../limits-input";

/** The owner sets what the checks of readings and tests are held against. Figures do not change, only what is doubted. */
export const setFlowLimits = defineCommand({
  name: "flow.set-limits",
  act: "settings.write",
  input: flowLimitsInput,
  async run(ctx, { version, ...typed }) {
    const [row] = await ctx.tx.update(shopSettings).set({ flowLimits: ownOf(typed), version: sql`${shopSettings.version} + 1` })
      .where(and(eq(shopSettings.shopId, ctx.shop.id), eq(shopSettings.version, version))).returning({ version: shopSettings.version });
    return row ? ok({ version: row.version }) : changedMeanwhile("The shop's settings");
  },
  subject: () => ({ kind: "shop-settings", id: "flow" }),
});

import "server-only";
import { and, eq, sql } from "drizzle-orm";
import { shopSettings } from "@/db/schema";
import { changedMeanwhile, defineCommand } from "@/modules/access/command";
import { ok } from "@/modules/kernel/result";
import { showEstimatesInput } from "../estimate-input";

/** The owner switches engine estimates beside the curves on or off. They are never on an invoice, whatever this says. */
export const showFlowEstimates = defineCommand({
  name: "flow.show-estimates",
  act: "settings.write",
  input: showEstimatesInput,
  async run(ctx, input) {
    const [row] = await ctx.tx.update(shopSettings).set({ showFlowEstimates: input.show, version: sql`${shopSettings.version} + 1` })
      .where(and(eq(shopSettings.shopId, ctx.shop.id), eq(shopSettings.version, input.version))).returning({ version: shopSettings.version });
    return row ? ok({ show: input.show, version: row.version }) : changedMeanwhile("The shop's settings");
  },
  subject: () => ({ kind: "shop-settings", id: "flow" }),
});

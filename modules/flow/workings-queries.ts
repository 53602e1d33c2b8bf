import "server-only";
import { mustBeAble, settingsOf, type ShopContext } from "@/modules/access/context";

/** What the workings need to know of the shop: whether its owner switched engine estimates on. */
export async function workingsShop(ctx: ShopContext): Promise<{ estimatesOn: boolean }> {
  mustBeAble(ctx, "flow.see");
  const settings = await settingsOf(ctx);
  return { estimatesOn: settings.showFlowEstimates };
}

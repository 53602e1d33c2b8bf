import "server-only";
import { and, eq, inArray } from "drizzle-orm";
import { camshafts } from "@/db/schema";
import { inShop, type ShopContext } from "@/modules/access/context";
import type { CamPoint } from "../domain/cam-table";
import type { NamedCam } from "../domain/comparison-means";
import type { RawTest } from "../domain/raw-test";

/** The camshafts named on tests, by id, with what is known of their lift. No rights are asked here: callers do. */
export async function camsOf(ctx: ShopContext, tests: readonly Pick<RawTest, "camshaft">[]): Promise<Map<string, NamedCam>> {
  const ids = [...new Set(tests.flatMap((t) => t.camshaft?.id ?? []))];
  if (ids.length === 0) return new Map();
  const rows = await inShop(ctx, (tx) => tx.select({ id: camshafts.id, label: camshafts.label, maxLiftUm: camshafts.maxLiftUm, durationDeg: camshafts.durationDeg, profile: camshafts.profile }).from(camshafts).where(and(eq(camshafts.shopId, ctx.shop.id), inArray(camshafts.id, ids))));
  return new Map(rows.map(({ id, ...cam }) => [id, { ...cam, profile: cam.profile as CamPoint[] }]));
}

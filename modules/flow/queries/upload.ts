import "server-only";
import { desc, eq, sql } from "drizzle-orm";
import { heads } from "@/db/schema";
import { filesOf, type FileView } from "@/modules/documents/files";
import { inShop, mustBeAble, type ShopContext } from "@/modules/access/context";

export interface UploadHead { id: string; mark: string; family: string; cylinders: number }

/** Heads a file may belong to, newest first; the asked one is among them. */
export async function uploadHeads(ctx: ShopContext, wantedId?: string): Promise<UploadHead[]> {
  mustBeAble(ctx, "flow.see");
  return inShop(ctx, (tx) => tx.select({ id: heads.id, mark: heads.mark, family: heads.family, cylinders: heads.cylinders }).from(heads).where(eq(heads.shopId, ctx.shop.id))
    .orderBy(...(wantedId ? [desc(sql`${heads.id} = ${wantedId}`)] : []), desc(heads.createdAt)).limit(200));
}

/** Files a head's readings came from and photographs of its paper sheets. */
export async function flowFilesOf(ctx: ShopContext, headId: string): Promise<{ files: FileView[]; photos: FileView[] }> {
  mustBeAble(ctx, "flow.see");
  return { files: await filesOf(ctx, "flow-readings", [headId]), photos: await filesOf(ctx, "flow-sheet", [headId]) };
}

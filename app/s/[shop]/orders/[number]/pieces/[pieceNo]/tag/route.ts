import { NotFound } from "@/modules/access/context";
import { shopContextOrNull } from "@/modules/access/session";
import { fileResponse } from "@/modules/documents/files";
import { printTag } from "@/modules/work-orders/commands/receive-piece";
import { tagPdf } from "@/modules/work-orders/queries/papers";

/** The tag as a label. Each print is written into the trail. */
export async function GET(_: Request, { params }: { params: Promise<{ shop: string; number: string; pieceNo: string }> }): Promise<Response> {
  const { shop, number, pieceNo } = await params;
  try {
    const ctx = await shopContextOrNull(shop);
    if (!ctx) return new Response("Sign in first.", { status: 401 });
    const file = await tagPdf(ctx, decodeURIComponent(number), /^\d{1,3}$/.test(pieceNo) ? Number(pieceNo) : 0);
    await printTag(ctx, { pieceId: file.pieceId });
    return fileResponse(file);
  } catch (error) {
    if (error instanceof NotFound) return new Response("Not found.", { status: 404 });
    throw error;
  }
}

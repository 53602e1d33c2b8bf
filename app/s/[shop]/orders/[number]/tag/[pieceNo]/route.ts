import { printTag } from "@/modules/work-orders/commands/receive-piece";
import { paperResponse } from "@/modules/work-orders/paper-response";
import { tagPaper } from "@/modules/work-orders/queries/papers";

/** The tag as a label; every print is written down, because a tag is the key to somebody's property. */
export async function GET(_: Request, { params }: { params: Promise<{ shop: string; number: string; pieceNo: string }> }): Promise<Response> {
  const { shop, number, pieceNo } = await params;
  return paperResponse(shop, async (ctx) => {
    const paper = await tagPaper(ctx, number, Number(pieceNo));
    const noted = await printTag(ctx, { pieceId: paper.pieceId });
    return noted.ok ? paper : new Response(noted.refusal.message, { status: 422 });
  });
}

import { fileResponse, readFile } from "@/modules/documents/files";
import { paperResponse } from "@/modules/work-orders/paper-response";
import { estimatePaperOf } from "@/modules/work-orders/queries/papers";

/** The paper of a sent version: the one on file, or while the worker has not made it yet, the same made now. */
export async function GET(_: Request, { params }: { params: Promise<{ shop: string; number: string; version: string }> }): Promise<Response> {
  const { shop, number, version } = await params;
  return paperResponse(shop, async (ctx) => {
    const paper = await estimatePaperOf(ctx, number, Number(version));
    return paper.fileId ? fileResponse(await readFile(ctx, paper.fileId)) : paper;
  });
}

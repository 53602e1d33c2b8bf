import { NotFound } from "@/modules/access/context";
import { shopContextOrNull } from "@/modules/access/session";
import { fileResponse } from "@/modules/documents/files";
import { travelerPdf } from "@/modules/work-orders/queries/papers";

/** The sheet that walks with the heads, as it is now. */
export async function GET(_: Request, { params }: { params: Promise<{ shop: string; number: string }> }): Promise<Response> {
  const { shop, number } = await params;
  try {
    const ctx = await shopContextOrNull(shop);
    return ctx ? fileResponse(await travelerPdf(ctx, decodeURIComponent(number))) : new Response("Sign in first.", { status: 401 });
  } catch (error) {
    if (error instanceof NotFound) return new Response("Not found.", { status: 404 });
    throw error;
  }
}

import { shopContextOrNull } from "@/modules/access/session";
import { plainProblemOf } from "@/modules/access/problem";
import { fileResponse } from "@/modules/documents/files";
import { orderPdf } from "@/modules/purchasing/paper-job";
import { getOrder } from "@/modules/purchasing/queries/orders";

/** The paper of a purchase order as it stands. */
export async function GET(_: Request, { params }: { params: Promise<{ shop: string; order: string }> }): Promise<Response> {
  const { shop, order } = await params;
  try {
    const ctx = await shopContextOrNull(shop);
    if (!ctx) return new Response("Sign in first.", { status: 401 });
    return fileResponse(await orderPdf(ctx, (await getOrder(ctx, order)).id));
  } catch (error) {
    return plainProblemOf("purchase order paper", error, "The paper could not be made.");
  }
}

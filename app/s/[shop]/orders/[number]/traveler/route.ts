import { paperResponse } from "@/modules/work-orders/paper-response";
import { travelerPaper } from "@/modules/work-orders/queries/papers";

/** The traveler of the order, or with `?head=2` of one head. */
export async function GET(request: Request, { params }: { params: Promise<{ shop: string; number: string }> }): Promise<Response> {
  const { shop, number } = await params;
  const head = new URL(request.url).searchParams.get("head");
  return paperResponse(shop, (ctx) => travelerPaper(ctx, number, head !== null && /^\d{1,2}$/.test(head) ? Number(head) : null));
}

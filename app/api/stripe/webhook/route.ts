import { RETRY_AFTER_S } from "@/modules/kernel/away";
import { receiveEvent } from "@/modules/payments/events";

/** Events of the payment provider, signed by it. They come from another machine, so no origin is asked for here. */
export async function POST(request: Request): Promise<Response> {
  const declared = Number(request.headers.get("content-length") ?? 0);
  if (declared > 1_000_000) return new Response(null, { status: 413 });
  const body = new Uint8Array(await request.arrayBuffer());
  if (body.byteLength > 1_000_000) return new Response(null, { status: 413 });
  const status = await receiveEvent(body, request.headers.get("stripe-signature"));
  return new Response(null, { status, headers: status === 503 ? { "retry-after": String(RETRY_AFTER_S) } : {} });
}

import { plainProblemOf } from "@/modules/access/problem";
import { shopContextOrNull } from "@/modules/access/session";
import { fileResponse } from "@/modules/documents/files";
import { invoicePdf } from "@/modules/invoices/queries";

/** The stored paper, byte for byte as it was issued. */
export async function GET(_: Request, { params }: { params: Promise<{ shop: string; id: string }> }): Promise<Response> {
  const { shop, id } = await params;
  try {
    const ctx = await shopContextOrNull(shop);
    return ctx && /^[0-9a-f-]{36}$/.test(id) ? fileResponse(await invoicePdf(ctx, id)) : new Response("Not found.", { status: 404 });
  } catch (error) {
    return plainProblemOf("invoice paper", error, "The paper could not be read.");
  }
}

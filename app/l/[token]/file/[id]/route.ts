import { openLink } from "@/modules/access/link";
import { plainProblemOf } from "@/modules/access/problem";
import { fileResponse } from "@/modules/documents/files";
import { customerFile } from "@/modules/work-orders/queries/customer-view";

/** A photo of the order behind the link. */
export async function GET(request: Request, { params }: { params: Promise<{ token: string; id: string }> }): Promise<Response> {
  const nothing = () => new Response("Not found.", { status: 404, headers: { "cache-control": "no-store" } });
  try {
    const { token, id } = await params;
    const link = await openLink(token);
    if (!link || !/^[0-9a-f-]{36}$/.test(id)) return nothing();
    return fileResponse(await customerFile(link.ctx, id, new URL(request.url).searchParams.has("thumb")));
  } catch (error) {
    return plainProblemOf("link file", error, "This file cannot be read just now.");
  }
}

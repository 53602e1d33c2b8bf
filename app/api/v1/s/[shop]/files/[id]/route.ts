import { plainProblemOf } from "@/modules/access/problem";
import { can, type Act } from "@/modules/access/roles";
import { shopContextOrNull } from "@/modules/access/session";
import { fileResponse, readFile } from "@/modules/documents/files";

/** Who may look at what kind of file; kinds that are not named are opened by their own rooms. */
const ACT_OF: Record<string, Act> = { photo: "orders.see", estimate: "prices.see", tag: "orders.see", "flow-readings": "flow.see", "flow-sheet": "flow.see" };

export async function GET(request: Request, { params }: { params: Promise<{ shop: string; id: string }> }): Promise<Response> {
  const nothing = () => new Response("Not found.", { status: 404, headers: { "cache-control": "no-store" } });
  try {
    const { shop, id } = await params;
    if (!/^[0-9a-f-]{36}$/.test(id)) return nothing();
    const ctx = await shopContextOrNull(shop);
    if (!ctx) return new Response("Sign in first.", { status: 401 });
    const file = await readFile(ctx, id, new URL(request.url).searchParams.has("thumb"));
    const act = ACT_OF[file.kind];
    return act && can(ctx.actor, act) ? fileResponse(file) : nothing();
  } catch (error) {
    return plainProblemOf("files read", error, "This file cannot be read just now.");
  }
}

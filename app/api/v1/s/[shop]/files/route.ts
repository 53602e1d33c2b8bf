import { isOwnOrigin } from "@/modules/access/origin";
import { problem, problemOf } from "@/modules/access/problem";
import { can } from "@/modules/access/roles";
import { shopContextOrNull } from "@/modules/access/session";
import { uploadInput, uploadPhoto } from "@/modules/work-orders/upload-photo";


/** Takes one photo as the raw body of the request, so that a phone can show how far it is. */
export async function POST(request: Request, { params }: { params: Promise<{ shop: string }> }): Promise<Response> {
  try {
    if (!isOwnOrigin(request.headers)) return problem(403, "This came from another site.");
    const ctx = await shopContextOrNull((await params).shop);
    if (!ctx) return problem(401, "Sign in first.");
    if (!can(ctx.actor, "files.add")) return problem(404, "Not found.");
    const parsed = uploadInput.safeParse(Object.fromEntries(new URL(request.url).searchParams));
    if (!parsed.success) return problem(422, "Say what the photo belongs to.");
    const result = await uploadPhoto(ctx, parsed.data, request.body);
    return result.ok ? Response.json(result.value, { headers: { "cache-control": "no-store" } }) : problem(422, result.refusal.message, { code: result.refusal.code });
  } catch (error) {
    return problemOf("files upload", error, "Something broke on our side. The photo is still on your device; send it again.");
  }
}

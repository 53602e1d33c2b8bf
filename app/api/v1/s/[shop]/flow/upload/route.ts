import { isOwnOrigin } from "@/modules/access/origin";
import { problem, problemOf } from "@/modules/access/problem";
import { can } from "@/modules/access/roles";
import { shopContextOrNull } from "@/modules/access/session";
import { uploadReadings, uploadSheetPhoto } from "@/modules/flow/upload-file";

const MOST_BYTES = 26 * 1024 * 1024;

/** Takes a file of readings (`file` and `ask`) or a photograph of a paper sheet (`photo` and `head`) as form data. */
export async function POST(request: Request, { params }: { params: Promise<{ shop: string }> }): Promise<Response> {
  try {
    if (!isOwnOrigin(request.headers)) return problem(403, "This came from another site.");
    const ctx = await shopContextOrNull((await params).shop);
    if (!ctx) return problem(401, "Sign in first.");
    if (!can(ctx.actor, "flow.record")) return problem(404, "Not found.");
    const size = Number(request.headers.get("content-length"));
    if (!(size > 0) || size > MOST_BYTES) return problem(413, "The file is too long; at most 25 MB.");
    const form = await request.formData();
    const [file, photo, ask, head] = [form.get("file"), form.get("photo"), form.get("ask"), form.get("head")];
    const requestId = request.headers.get("idempotency-key") ?? "";
    if (!/^[0-9a-f]{8}(-[0-9a-f]{4}){3}-[0-9a-f]{12}$/.test(requestId)) return problem(400, "Send an Idempotency-Key header: a UUID made once for this act.");
    const result = file instanceof File && typeof ask === "string" ? await uploadReadings(ctx, file, ask, requestId)
      : photo instanceof File && typeof head === "string" && /^[0-9a-f-]{36}$/.test(head) ? await uploadSheetPhoto(ctx, head, photo) : null;
    if (!result) return problem(422, "Send a file of readings with its mapping, or a photograph with its head.");
    if (result.ok) return Response.json(result.value, { headers: { "cache-control": "no-store" } });
    const { code, message, field, fields, data } = result.refusal;
    return problem(422, message, { code, field, fields, data });
  } catch (error) {
    return problemOf("flow upload", error, "Something broke on our side. The file is still on your machine; send it again.");
  }
}

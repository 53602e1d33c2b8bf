import { plainProblemOf } from "@/modules/access/problem";
import { shopContextOrNull } from "@/modules/access/session";
import { fileResponse } from "@/modules/documents/files";
import { flowReportPdf } from "@/modules/flow/queries/report";
import { isUuid } from "@/modules/kernel/id";

/** The paper of an issued comparison. */
export async function GET(_: Request, { params }: { params: Promise<{ shop: string; comparison: string }> }): Promise<Response> {
  const { shop, comparison } = await params;
  try {
    const ctx = await shopContextOrNull(shop);
    if (!ctx || !isUuid(comparison)) return new Response("Not found.", { status: 404 });
    return fileResponse(await flowReportPdf(ctx, comparison));
  } catch (error) {
    return plainProblemOf("flow report", error, "The report could not be made.");
  }
}

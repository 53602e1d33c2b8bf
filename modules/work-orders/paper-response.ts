import "server-only";
import type { TDocumentDefinitions } from "pdfmake/interfaces";
import type { ShopContext } from "@/modules/access/context";
import { plainProblemOf } from "@/modules/access/problem";
import { shopContextOrNull } from "@/modules/access/session";
import { fileResponse } from "@/modules/documents/files";
import { renderPdf } from "@/modules/outbound/pdf/render";

export interface MadePaper { readonly name: string; readonly madeAt: Date; readonly definition: TDocumentDefinitions }

/** Renders a described paper and streams it; what may not be seen does not exist. */
export async function paperResponse(shop: string, make: (ctx: ShopContext) => Promise<MadePaper | Response>): Promise<Response> {
  try {
    const ctx = await shopContextOrNull(shop);
    if (!ctx) return new Response("Sign in first.", { status: 401 });
    const made = await make(ctx);
    if (made instanceof Response) return made;
    return fileResponse({ name: made.name, mime: "application/pdf", bytes: await renderPdf(made.definition, { creationDate: made.madeAt }) });
  } catch (error) {
    return plainProblemOf("paper", error, "The paper could not be made.");
  }
}

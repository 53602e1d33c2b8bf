import { openLink } from "@/modules/access/link";
import { plainProblemOf } from "@/modules/access/problem";
import { fileResponse, filesOf, readFile } from "@/modules/documents/files";
import { invoiceForCustomer } from "@/modules/invoices/queries";
import { customerFile, customerPaperId } from "@/modules/work-orders/queries/customer-view";

/** The paper of the link's own matter: the estimate's version, or the invoice. */
export async function GET(_: Request, { params }: { params: Promise<{ token: string }> }): Promise<Response> {
  const nothing = () => new Response("Not found.", { status: 404, headers: { "cache-control": "no-store" } });
  try {
    const link = await openLink((await params).token);
    if (!link) return nothing();
    if (link.purpose === "estimate") return fileResponse(await customerFile(link.ctx, await customerPaperId(link.ctx), false));
    if (link.purpose !== "invoice") return nothing();
    const invoice = await invoiceForCustomer(link.ctx);
    const paper = (await filesOf(link.ctx, "invoice", [invoice.id])).at(-1);
    return paper ? fileResponse(await readFile(link.ctx, paper.id)) : nothing();
  } catch (error) {
    return plainProblemOf("link paper", error, "This paper cannot be read just now.");
  }
}

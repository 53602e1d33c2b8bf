import { BooksHead } from "@/modules/books/components/books-head";
import { ableTo } from "@/modules/access/context";
import { shopPage } from "@/modules/access/page";
import { InvoiceViews } from "@/modules/invoices/components/invoice-views";
import { InvoicesTable } from "@/modules/invoices/components/invoices-table";
import { ReadyTable } from "@/modules/invoices/components/ready-table";
import { INVOICE_VIEWS } from "@/modules/invoices/domain/invoice-views";
import { findInvoicesInput } from "@/modules/invoices/input";
import { findInvoices, findReadyToBill } from "@/modules/invoices/queries";

export const metadata = { title: "Invoices" };

export default async function BooksPage({ params, searchParams }: { params: Promise<{ shop: string }>; searchParams: Promise<{ view?: string }> }) {
  const ctx = await shopPage(params, "books.see");
  const { view: asked } = await searchParams;
  const view = INVOICE_VIEWS.find((v) => v === asked) ?? "open";
  const first = await findInvoices(ctx, findInvoicesInput.parse({ view }));
  return (
    <main id="main" className="page">
      <BooksHead slug={ctx.shop.slug} title="Invoices" current="invoices" mayMatch={ableTo(ctx, "bank.match")} />
      {asked === "ready" ? (
        <>
          <div className="bar"><InvoiceViews slug={ctx.shop.slug} current="ready" counts={first.counts} /></div>
          <ReadyTable rows={await findReadyToBill(ctx)} mayWrite={ableTo(ctx, "invoice.write")} />
        </>
      ) : <InvoicesTable key={view} view={view} first={first} />}
    </main>
  );
}

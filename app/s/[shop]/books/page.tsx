import { BooksHead } from "@/modules/books/components/books-head";
import { ableTo } from "@/modules/access/context";
import { shopPage } from "@/modules/access/page";
import { InvoicesTable, INVOICE_VIEWS } from "@/modules/invoices/components/invoices-table";
import { ReadyTable } from "@/modules/invoices/components/ready-table";
import { findInvoicesInput } from "@/modules/invoices/input";
import { findInvoices, findReadyToBill } from "@/modules/invoices/queries";
import { Views } from "@/modules/ui/views";

export const metadata = { title: "Invoices" };

export default async function BooksPage({ params, searchParams }: { params: Promise<{ shop: string }>; searchParams: Promise<{ view?: string }> }) {
  const ctx = await shopPage(params, "books.see");
  const { view: asked } = await searchParams;
  const view = INVOICE_VIEWS.find((v) => v === asked) ?? "open";
  const first = await findInvoices(ctx, findInvoicesInput.parse({ view }));
  const base = `/s/${ctx.shop.slug}/books`;
  return (
    <main id="main" className="page">
      <BooksHead slug={ctx.shop.slug} title="Invoices" current="invoices" mayMatch={ableTo(ctx, "bank.match")} />
      {asked === "ready" ? (
        <>
          <Views label="Saved views" current="ready" views={[{ key: "open", label: "Open", href: base, count: first.counts.open }, { key: "overdue", label: "Overdue", href: `${base}?view=overdue`, count: first.counts.overdue }, { key: "paid", label: "Paid", href: `${base}?view=paid` }, { key: "draft", label: "Drafts", href: `${base}?view=draft`, count: first.counts.draft }, { key: "all", label: "All", href: `${base}?view=all` }, { key: "ready", label: "Ready to bill", href: `${base}?view=ready`, count: first.counts.ready }]} />
          <ReadyTable rows={await findReadyToBill(ctx)} mayWrite={ableTo(ctx, "invoice.write")} />
        </>
      ) : <InvoicesTable key={view} view={view} first={first} />}
    </main>
  );
}

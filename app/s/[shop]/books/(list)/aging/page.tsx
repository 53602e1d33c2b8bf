import { BooksHead } from "@/modules/books/components/books-head";
import { ableTo } from "@/modules/access/context";
import { shopPage } from "@/modules/access/page";
import { AgingTable } from "@/modules/invoices/components/aging-table";
import { agingView } from "@/modules/invoices/queries";
import { date } from "@/modules/kernel/format";

export const metadata = { title: "Who owes" };

export default async function AgingPage({ params }: { params: Promise<{ shop: string }> }) {
  const ctx = await shopPage(params, "books.see");
  const view = await agingView(ctx);
  return (
    <main id="main" className="page">
      <BooksHead slug={ctx.shop.slug} title={`Who owes, as of ${date(view.asOf, ctx.shop.locale)}`} current="aging" mayMatch={ableTo(ctx, "bank.match")} />
      <AgingTable view={view} place={ctx.shop} />
    </main>
  );
}

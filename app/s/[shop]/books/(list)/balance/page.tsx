import { BooksHead } from "@/modules/books/components/books-head";
import { ableTo } from "@/modules/access/context";
import { shopPage } from "@/modules/access/page";
import { TrialBalanceTable } from "@/modules/books/components/trial-balance-table";
import { trialBalanceView } from "@/modules/books/queries";
import { date } from "@/modules/kernel/format";

export const metadata = { title: "Trial balance" };

export default async function BalancePage({ params, searchParams }: { params: Promise<{ shop: string }>; searchParams: Promise<{ to?: string }> }) {
  const ctx = await shopPage(params, "books.see");
  const { to } = await searchParams;
  const day = to && /^\d{4}-\d{2}-\d{2}$/.test(to) ? to : null;
  const view = await trialBalanceView(ctx, day);
  return (
    <main id="main" className="page">
      <BooksHead slug={ctx.shop.slug} title={day ? `Trial balance to ${date(day, ctx.shop.locale)}` : "Trial balance"} current="balance" mayMatch={ableTo(ctx, "bank.match")}>
        <form className="flex items-end gap-2"><div className="field"><label htmlFor="to">Up to</label><div className="in"><input id="to" name="to" type="date" defaultValue={day ?? ""} /></div></div><button className="btn lo" type="submit">Show</button></form>
      </BooksHead>
      <TrialBalanceTable view={view} slug={ctx.shop.slug} place={ctx.shop} />
    </main>
  );
}

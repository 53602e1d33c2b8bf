import { BooksHead } from "@/modules/books/components/books-head";
import { ableTo } from "@/modules/access/context";
import { shopPage } from "@/modules/access/page";
import { DisputeList } from "@/modules/payments/components/dispute-list";
import { SetAsideList, WaitingRefunds } from "@/modules/payments/components/set-aside-list";
import { findDisputes, findSetAside, findWaitingRefunds } from "@/modules/payments/queries";

export const metadata = { title: "Set aside" };

export default async function SetAsidePage({ params }: { params: Promise<{ shop: string }> }) {
  const ctx = await shopPage(params, "books.see");
  return (
    <main id="main" className="page">
      <BooksHead slug={ctx.shop.slug} title="Set aside" current="set-aside" mayMatch={ableTo(ctx, "bank.match")} />
      <WaitingRefunds rows={await findWaitingRefunds(ctx)} />
      <DisputeList rows={await findDisputes(ctx)} place={ctx.shop} />
      <SetAsideList rows={await findSetAside(ctx)} mayAct={ableTo(ctx, "bank.match")} />
    </main>
  );
}

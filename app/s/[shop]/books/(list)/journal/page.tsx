import { BooksHead } from "@/modules/books/components/books-head";
import { ableTo } from "@/modules/access/context";
import { shopPage } from "@/modules/access/page";
import { JournalList } from "@/modules/books/components/journal-list";
import { accountOf } from "@/modules/books/domain/accounts";
import { findEntries } from "@/modules/books/queries";
import { LinkButton } from "@/modules/ui/button";

export const metadata = { title: "Journal" };

export default async function JournalPage({ params, searchParams }: { params: Promise<{ shop: string }>; searchParams: Promise<{ account?: string; before?: string }> }) {
  const ctx = await shopPage(params, "books.see");
  const { account: code, before } = await searchParams;
  const account = accountOf(code ?? "");
  const { rows, next } = await findEntries(ctx, { account: account?.code, before: before && /^\d{1,12}$/.test(before) ? Number(before) : undefined });
  const base = `/s/${ctx.shop.slug}/books/journal`;
  return (
    <main id="main" className="page">
      <BooksHead slug={ctx.shop.slug} title={account ? `Journal, ${account.code} ${account.name}` : "Journal"} current="journal" mayMatch={ableTo(ctx, "bank.match")} />
      <JournalList rows={rows} slug={ctx.shop.slug} place={ctx.shop} />
      <div className="bar">
        {account ? <LinkButton variant="lo" href={base}>All accounts</LinkButton> : null}
        {next ? <LinkButton variant="lo" href={`${base}?${new URLSearchParams({ ...(account ? { account: account.code } : {}), before: String(next) })}`}>Older entries</LinkButton> : null}
      </div>
    </main>
  );
}

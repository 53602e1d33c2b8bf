import { BooksHead } from "@/modules/books/components/books-head";
import { shopPage } from "@/modules/access/page";
import { amount } from "@/modules/kernel/format";
import { matchBoard } from "@/modules/payments/bank-board";
import { BankFileDialog } from "@/modules/payments/components/bank-file-dialog";
import { MatchBoard } from "@/modules/payments/components/match-board";
import { Figures } from "@/modules/ui/kv";
import { Tube } from "@/modules/ui/tube";

export const metadata = { title: "Match bank" };

export default async function MatchPage({ params }: { params: Promise<{ shop: string }> }) {
  const ctx = await shopPage(params, "bank.match");
  const board = await matchBoard(ctx);
  const a = (minor: number) => amount(minor, ctx.shop);
  return (
    <main id="main" className="page">
      <BooksHead slug={ctx.shop.slug} title="Payments" current="match" counts={{ match: board.lineCount - board.lockedCount }} mayMatch>
        <div className="flex flex-wrap items-start gap-6">
          <Figures figures={[...(board.bankMinor === null ? [] : [{ value: a(board.bankMinor), unit: "Bank" }]), { value: a(board.booksMinor), unit: "Books" }, { value: a(board.notLockedMinor), unit: "Not locked yet" }]} keep />
          {board.lineCount > 0 ? <div className="hide-s w-[150px]"><span className="eng">{board.lockedCount} of {board.lineCount} lines locked</span><Tube value={board.lockedCount} mark={board.lineCount} label={`${board.lockedCount} of ${board.lineCount} lines locked`} /></div> : null}
          <BankFileDialog />
        </div>
      </BooksHead>
      <MatchBoard board={board} />
    </main>
  );
}

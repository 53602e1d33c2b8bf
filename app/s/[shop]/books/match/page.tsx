import { BooksHead } from "@/modules/books/components/books-head";
import { shopPage } from "@/modules/access/page";
import { amount } from "@/modules/kernel/format";
import { matchBoard } from "@/modules/payments/bank-board";
import { BankFileDialog } from "@/modules/payments/components/bank-file-dialog";
import { MatchBoard } from "@/modules/payments/components/match-board";
import { Tube } from "@/modules/ui/tube";

export const metadata = { title: "Match bank" };

export default async function MatchPage({ params }: { params: Promise<{ shop: string }> }) {
  const ctx = await shopPage(params, "bank.match");
  const board = await matchBoard(ctx);
  const a = (minor: number) => amount(minor, ctx.shop);
  return (
    <main id="main" className="page">
      <BooksHead slug={ctx.shop.slug} title="Payments" current="match" counts={{ match: board.lineCount - board.lockedCount }} mayMatch>
        <div className="jb-sums">
          {board.bankMinor === null ? null : <div><span className="eng">Bank</span><span className="num n-s">{a(board.bankMinor)}</span></div>}
          <div><span className="eng">Books</span><span className="num n-s">{a(board.booksMinor)}</span></div>
          <div><span className="eng">Not locked yet</span><span className="num n-s">{a(board.notLockedMinor)}</span></div>
          {board.lineCount > 0 ? <div className="hide-s w-[150px]"><span className="eng">{board.lockedCount} of {board.lineCount} lines locked</span><Tube value={board.lockedCount} mark={board.lineCount} /></div> : null}
          <BankFileDialog />
        </div>
      </BooksHead>
      <MatchBoard board={board} />
    </main>
  );
}

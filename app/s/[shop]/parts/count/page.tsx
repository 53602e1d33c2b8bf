import Link from "next/link";
import { shopPage } from "@/modules/access/page";
import { localMinute } from "@/modules/kernel/instant";
import { CountSheet } from "@/modules/stock/components/count-sheet";
import { countSheetFor } from "@/modules/stock/queries/count-sheet";
import { EmptyState } from "@/modules/ui/empty-state";
import { PageHead } from "@/modules/ui/page-head";

export const metadata = { title: "Count a shelf" };

export default async function CountPage({ params, searchParams }: { params: Promise<{ shop: string }>; searchParams: Promise<{ bin?: string; part?: string }> }) {
  const ctx = await shopPage(params, "stock.adjust");
  const { bin, part } = await searchParams;
  const sheet = await countSheetFor(ctx, { bin, part });
  const at = `/s/${ctx.shop.slug}/parts/count`;
  return (
    <main id="main" className="page">
      <PageHead title={bin !== undefined ? `Count shelf ${bin || "without a name"}` : part !== undefined ? `Count ${part}` : "Count a shelf"} sub="Count what lies there. The sheet does not say what should." />
      {bin === undefined && part === undefined ? (
        <ul className="grid gap-2" style={{ gridTemplateColumns: "repeat(auto-fill, minmax(120px, 1fr))" }} aria-label="Shelves">
          {[...sheet.bins, ""].map((b) => <li key={b}><Link className="btn lo full" href={`${at}?bin=${encodeURIComponent(b)}`}>{b || "No shelf"}</Link></li>)}
        </ul>
      ) : sheet.lines.length === 0 ? (
        <EmptyState title="Nothing to count here" action={<Link className="btn" href={at}>Choose a shelf</Link>}>No part has this shelf, or its lots are all gone.</EmptyState>
      ) : (
        <CountSheet lines={sheet.lines} now={localMinute(ctx.now, ctx.shop.zone)} />
      )}
    </main>
  );
}

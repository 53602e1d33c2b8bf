import Link from "next/link";
import type { InvoicesPage } from "../queries";

const WORDS = [["open", "Open"], ["overdue", "Overdue"], ["paid", "Paid"], ["draft", "Drafts"], ["ready", "Ready to bill"], ["all", "All"]] as const;

/** The views of the invoice list in one row, with how many wait in each. */
export function InvoiceViews({ slug, current, counts }: { slug: string; current: string; counts: InvoicesPage["counts"] }) {
  const base = `/s/${slug}/books`;
  return (
    <nav className="flex flex-wrap gap-2" aria-label="Saved views">
      {WORDS.map(([key, label]) => {
        const count = key === "open" || key === "overdue" || key === "draft" || key === "ready" ? counts[key] : null;
        return (
          <Link key={key} href={key === "open" ? base : `${base}?view=${key}`} scroll={false} className="chip" aria-current={key === current ? "page" : undefined} data-on={key === current ? true : undefined}>
            {label}{count === null ? null : <span className="num">{count}</span>}
          </Link>
        );
      })}
    </nav>
  );
}

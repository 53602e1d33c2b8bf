import type { ReactNode } from "react";
import { PageHead } from "@/modules/ui/page-head";
import { Views } from "@/modules/ui/views";

const TABS = [["invoices", "Invoices", ""], ["match", "Match bank", "/match"], ["journal", "Journal", "/journal"], ["balance", "Trial balance", "/balance"], ["aging", "Who owes", "/aging"], ["set-aside", "Set aside", "/set-aside"]] as const;

/** Head of the Books room with its tabs; those a role may not open are not there. */
export function BooksHead({ slug, title, current, counts = {}, mayMatch, children }: {
  slug: string; title: string; current: (typeof TABS)[number][0]; counts?: Partial<Record<string, number>>; mayMatch: boolean; children?: ReactNode;
}) {
  return (
    <>
      <PageHead title={title} close>{children}</PageHead>
      <Views
        className="mb-5" label="Books" current={current}
        views={TABS.filter(([key]) => key !== "match" || mayMatch).map(([key, label, path]) => ({ key, label, href: `/s/${slug}/books${path}`, ...(counts[key] ? { count: counts[key] } : {}) }))}
      />
    </>
  );
}

import { redirect } from "next/navigation";
import { shopPage } from "@/modules/access/page";
import { PageHead } from "@/modules/ui/page-head";
import { FindBox } from "@/modules/work-orders/components/find-box";
import { findAnything } from "@/modules/work-orders/queries/find";

export const metadata = { title: "Find" };

export default async function FindPage({ params, searchParams }: { params: Promise<{ shop: string }>; searchParams: Promise<{ q?: string | string[] }> }) {
  const ctx = await shopPage(params, "orders.see");
  const { q } = await searchParams;
  const text = typeof q === "string" ? q.slice(0, 100) : "";
  const answers = await findAnything(ctx, text);
  // Scanned into an address: the tag's square code lands here and goes on to its head.
  if (answers.exact) redirect(answers.exact);
  return (
    <main id="main" className="page">
      <PageHead title="Find" />
      <FindBox initial={text} answers={answers} />
    </main>
  );
}

import { ableTo } from "@/modules/access/context";
import { shopPage } from "@/modules/access/page";
import { LibraryList } from "@/modules/flow/components/library-list";
import { OwnHeadDialog } from "@/modules/flow/components/library-own-head";
import { libraryInput } from "@/modules/flow/library-input";
import { familyNames, libraryTests } from "@/modules/flow/queries/library";
import { LinkButton } from "@/modules/ui/button";
import { PageHead } from "@/modules/ui/page-head";

export const metadata = { title: "Flow library" };

export default async function LibraryPage({ params, searchParams }: { params: Promise<{ shop: string }>; searchParams: Promise<Record<string, string | string[] | undefined>> }) {
  const ctx = await shopPage(params, "flow.see");
  const asked = await searchParams;
  const one = Object.fromEntries(Object.keys(libraryInput.shape).flatMap((k) => (typeof asked[k] === "string" && k !== "limit" && k !== "after" ? [[k, asked[k]]] : [])));
  // A filter mistyped in the address shows everything instead of nothing.
  const parsed = libraryInput.safeParse(one);
  const ask = parsed.success ? parsed.data : libraryInput.parse({});
  const [first, families] = [await libraryTests(ctx, ask), await familyNames(ctx)];
  const { limit: _, after: __, ...filters } = ask;
  const base = `/s/${ctx.shop.slug}/flow`;
  const names = families.map((f) => f.name);
  return (
    <main id="main" className="page">
      <PageHead title="Flow library" sub="Every finished test of every head. Figures as measured on our bench."
        actions={<>
          <LinkButton href={base}>Flow room</LinkButton>
          <LinkButton href={`${base}/library/family${ask.family ? `?family=${encodeURIComponent(ask.family)}` : ""}`}>What a family did</LinkButton>
          {ableTo(ctx, "flow.record") ? <><LinkButton href={`${base}/upload`}>Read from a file</LinkButton><OwnHeadDialog families={families} /></> : null}
        </>} />
      <LibraryList key={JSON.stringify(filters)} first={first} filters={filters} families={names} />
    </main>
  );
}

"use client";

import { useInfiniteQuery } from "@tanstack/react-query";
import { useDeferredValue, useMemo, useState } from "react";
import { Button, LinkButton } from "@/modules/ui/button";
import { DataTable } from "@/modules/ui/data-table";
import type { DataColumn } from "@/modules/ui/data-table-columns";
import { EmptyState, ErrorState } from "@/modules/ui/empty-state";
import { getJson } from "@/modules/ui/fetch-json";
import { PageHead } from "@/modules/ui/page-head";
import { usePlace } from "@/modules/ui/place";
import { SearchWell } from "@/modules/ui/search-well";
import { TERMS_WORDS, type Terms } from "../domain/terms";
import type { CustomerRow } from "../queries";

interface Page { rows: CustomerRow[]; next: string | null }

const columns: DataColumn<CustomerRow>[] = [
  { id: "name", head: "Customer", primary: true, cell: (c) => <b className="b">{c.name}</b> },
  { id: "phone", head: "Telephone", figures: true, cell: (c) => c.phone ?? "–" },
  { id: "email", head: "E-mail", cell: (c) => <span className="mid">{c.email ?? "–"}</span> },
  { id: "terms", head: "Pays", cell: (c) => <span className="mid">{TERMS_WORDS[c.terms as Terms] ?? c.terms}</span>, desktopOnly: true },
  { id: "off", head: "Off labor", align: "end", figures: true, cell: (c) => (c.laborDiscountBasisPoints === 0 ? "–" : `${c.laborDiscountBasisPoints / 100} %`), desktopOnly: true },
];

/** Everybody the shop works for, by any scrap. */
export function CustomersTable({ first, mayAdd }: { first: Page; mayAdd: boolean }) {
  const { slug } = usePlace();
  const [q, setQ] = useState("");
  const words = useDeferredValue(q.trim());
  const { data, isError, isPending, hasNextPage, fetchNextPage, isFetchingNextPage, refetch } = useInfiniteQuery({
    queryKey: ["customers", slug, "table", words], queryFn: ({ pageParam, signal }) => getJson<Page>(`/api/v1/s/${slug}/customers`, { q: words, limit: 50, after: pageParam ?? undefined }, signal),
    initialPageParam: null as string | null, getNextPageParam: (p: Page) => p.next, ...(words === "" ? { initialData: { pages: [first], pageParams: [null] } } : {}),
  });
  const rows = useMemo(() => (data?.pages ?? []).flatMap((p) => p.rows), [data]);
  return (
    <>
      <PageHead title="Customers" actions={mayAdd ? <LinkButton variant="go" icon="plus" href={`/s/${slug}/customers/new`}>New customer</LinkButton> : undefined} />
      <div className="bar"><SearchWell label="Narrow the list" placeholder="Name, telephone or e-mail" value={q} onChange={(e) => setQ(e.target.value)} /></div>
      <DataTable
        caption="Customers" columns={columns} rows={rows} rowKey={(c) => c.id} hrefOf={(c) => `/s/${slug}/customers/${c.id}`} state={isError && rows.length === 0 ? "error" : isPending ? "loading" : "ready"} loadingLabel="Fetching customers."
        compact={(c) => <span className="row2"><b style={{ gridColumn: "1 / 3" }}>{c.name}</b><span className="q at-r">{c.phone ?? ""}</span><span className="mid" style={{ gridColumn: "1 / 4" }}>{c.email ?? ""}</span></span>}
        error={<ErrorState title="The list did not come" action={<Button onClick={() => void refetch()}>Try again</Button>}>Nothing is lost.</ErrorState>}
        empty={<EmptyState title={words === "" ? "Nobody yet" : "Nobody of that name or number"}>{words === "" ? "Customers come with their first work order." : "Type less of it."}</EmptyState>}
      />
      {hasNextPage ? <div className="mt-3 text-center"><Button onClick={() => void fetchNextPage()} pending={isFetchingNextPage} pendingText="Fetching…">Show more</Button></div> : null}
    </>
  );
}

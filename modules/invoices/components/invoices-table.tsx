"use client";
import { useInfiniteQuery } from "@tanstack/react-query";
import { useDeferredValue, useMemo, useState } from "react";
import { amount, date, money } from "@/modules/kernel/format";
import { Button } from "@/modules/ui/button";
import { DataTable } from "@/modules/ui/data-table";
import type { DataColumn } from "@/modules/ui/data-table-columns";
import { EmptyState, ErrorState } from "@/modules/ui/empty-state";
import { getJson } from "@/modules/ui/fetch-json";
import { Flag } from "@/modules/ui/flag";
import { usePlace, type PlaceFacts } from "@/modules/ui/place";
import { SearchWell } from "@/modules/ui/search-well";
import { Status } from "@/modules/ui/status";
import type { InvoiceView } from "../domain/invoice-views";
import type { InvoiceRow, InvoicesPage } from "../queries";
import { InvoiceViews } from "./invoice-views";

const WORDS: Record<InvoiceView, string> = { open: "Open", overdue: "Overdue", paid: "Paid", draft: "Drafts", all: "All" };

const stateOf = (r: InvoiceRow) => r.state === "draft" ? <Status dial="draft">Draft</Status>
  : r.kind === "credit" ? <Status dial="out">Credit note</Status>
  : r.openMinor <= 0 ? <Status dial="ready">Paid</Status>
  : r.daysLate > 0 ? <Flag>{r.daysLate} {r.daysLate === 1 ? "day" : "days"} late</Flag> : <Status dial="wait">To pay</Status>;

const columnsFor = (place: PlaceFacts): DataColumn<InvoiceRow>[] => [
  { id: "number", head: "Invoice", primary: true, cell: (r) => <span className="ord">{r.number ?? "Draft"}</span>, sortBy: (r) => r.number ?? "" },
  { id: "customer", head: "Customer", cell: (r) => <b>{r.customer}</b>, sortBy: (r) => r.customer },
  { id: "order", head: "Order", desktopOnly: true, cell: (r) => r.orderNumber, sortBy: (r) => r.orderNumber },
  { id: "issued", head: "Dated", cell: (r) => (r.issuedOn ? date(r.issuedOn, place.locale) : ""), sortBy: (r) => r.issuedOn, highFirst: true },
  { id: "due", head: "Due", cell: (r) => (r.dueOn && r.kind === "invoice" ? date(r.dueOn, place.locale) : ""), sortBy: (r) => r.dueOn },
  { id: "state", head: "State", cell: stateOf },
  { id: "total", head: "Total", align: "end", figures: true, cell: (r) => (r.state === "draft" ? "" : amount(r.totalMinor, place)), sortBy: (r) => r.totalMinor, highFirst: true },
  { id: "open", head: "Open", align: "end", figures: true, cell: (r) => (r.openMinor > 0 ? <b>{amount(r.openMinor, place)}</b> : ""), sortBy: (r) => r.openMinor, highFirst: true },
];

/** Invoices by view; found by number, order, name or exact sum. */
export function InvoicesTable({ view, first }: { view: InvoiceView; first: InvoicesPage }) {
  const place = usePlace();
  const [q, setQ] = useState("");
  const words = useDeferredValue(q);
  const { data, isError, isPending, hasNextPage, fetchNextPage, isFetchingNextPage, refetch } = useInfiniteQuery({
    queryKey: ["invoices", place.slug, view, words],
    queryFn: ({ pageParam, signal }) => getJson<InvoicesPage>(`/api/v1/s/${place.slug}/invoices`, { view, q: words, after: pageParam ?? undefined }, signal),
    initialPageParam: null as string | null, getNextPageParam: (page: InvoicesPage) => page.next,
    ...(words === "" ? { initialData: { pages: [first], pageParams: [null] } } : {}),
  });
  const rows = useMemo(() => (data?.pages ?? []).flatMap((p) => p.rows), [data]);
  const counts = data?.pages[0]?.counts ?? first.counts;
  const columns = useMemo(() => columnsFor(place), [place]);
  const base = `/s/${place.slug}/books`;
  return (
    <>
      <div className="bar">
        <InvoiceViews slug={place.slug} current={view} counts={counts} />
        <SearchWell label="Find an invoice" placeholder="Number, name or sum" value={q} onChange={(e) => setQ(e.target.value)} />
        <span className="bar-r mid sm">{money(data?.pages[0]?.openMinor ?? first.openMinor, place)} open</span>
      </div>
      <DataTable
        caption={`${WORDS[view]} invoices`} columns={columns} rows={rows} rowKey={(r) => r.id} hrefOf={(r) => `${base}/invoices/${r.id}`}
        state={isError ? "error" : isPending ? "loading" : "ready"} loadingLabel="Fetching invoices."
        error={<ErrorState title="The invoices could not be fetched" action={<Button onClick={() => void refetch()}>Try again</Button>}>Nothing was changed.</ErrorState>}
        empty={<EmptyState title={words ? "Nothing of that name or sum" : `No ${WORDS[view].toLowerCase()} invoices`}>{view === "open" ? "Issued invoices stand here until they are paid." : "Nothing to see in this view."}</EmptyState>}
        compact={(r) => (
          <span className="row2 wide"><b>{r.customer}</b><span className="q at-r">{amount(r.openMinor > 0 ? r.openMinor : r.totalMinor, place)}</span><span className="l2"><span className="ord nw">{r.number ?? "Draft"}</span> {stateOf(r)}</span><span className="at-r sm mid">{r.dueOn ? date(r.dueOn, place.locale) : ""}</span></span>
        )}
      />
      {hasNextPage ? <div className="bar"><Button variant="lo" pending={isFetchingNextPage} pendingText="Fetching…" onClick={() => void fetchNextPage()}>Show more</Button></div> : null}
    </>
  );
}

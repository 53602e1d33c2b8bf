"use client";
import { keepPreviousData, useInfiniteQuery } from "@tanstack/react-query";
import { useDeferredValue, useMemo, useState } from "react";
import { amount, shortDate } from "@/modules/kernel/format";
import { localDate } from "@/modules/kernel/instant";
import { Button, LinkButton } from "@/modules/ui/button";
import { DataTable } from "@/modules/ui/data-table";
import type { DataColumn } from "@/modules/ui/data-table-columns";
import { EmptyState, ErrorState } from "@/modules/ui/empty-state";
import { getJson } from "@/modules/ui/fetch-json";
import { Flag } from "@/modules/ui/flag";
import { usePlace } from "@/modules/ui/place";
import { SearchWell } from "@/modules/ui/search-well";
import { Status } from "@/modules/ui/status";
import { Views } from "@/modules/ui/views";
import type { OrderView } from "../input";
import type { OrderRow } from "../queries/orders";

interface Page { rows: OrderRow[]; next: string | null; counts: Record<OrderView, number> }
const VIEWS: readonly [OrderView, string][] = [["open", "Open"], ["drafts", "Not sent"], ["in", "Taken in"], ["all", "All"]];

function OrderState({ order, today, locale }: { order: OrderRow; today: string; locale: string }) {
  switch (order.state) {
    case "draft": return <Status dial="draft">Not sent</Status>;
    case "cancelled": return <Status dial="out" dim>Cancelled</Status>;
    case "in": return <Status dial="ready">Taken in</Status>;
    case "partly in":
    case "sent":
      if (order.expectedOn && order.expectedOn < today) return <Flag>{`Late, due ${shortDate(order.expectedOn, locale)}`}</Flag>;
      return order.state === "sent" ? <Status dial="wait">On its way</Status> : <Status dial="work">{`${order.openCount} of ${order.lineCount} lines open`}</Status>;
  }
}

/** Purchase orders with saved views and search. */
export function PurchasesRoom({ first, view, today }: { first: Page; view: OrderView; today: string }) {
  const place = usePlace();
  const { slug, locale } = place;
  const [text, setText] = useState("");
  const q = useDeferredValue(text.trim());
  const query = useInfiniteQuery({
    queryKey: ["purchases", slug, view, q],
    queryFn: ({ pageParam, signal }) => getJson<Page>(`/api/v1/s/${slug}/purchases`, { q, view, after: pageParam ?? undefined }, signal),
    initialPageParam: null as string | null, getNextPageParam: (last) => last.next, placeholderData: keepPreviousData,
    ...(q === "" ? { initialData: { pages: [first], pageParams: [null] } } : {}),
  });
  const rows = query.data?.pages.flatMap((p) => p.rows) ?? [];
  const counts = query.data?.pages[0]?.counts ?? first.counts;
  const seesPrice = rows.some((r) => r.totalMinor !== null);
  const columns = useMemo<DataColumn<OrderRow>[]>(() => [
    { id: "no", head: "No.", primary: true, cell: (o) => <span className="ord nw">{o.number ?? "Draft"}</span> },
    { id: "supplier", head: "Supplier", cell: (o) => <b>{o.supplierName}</b> },
    { id: "for", head: "For", desktopOnly: true, cell: (o) => <span className="mid">{o.forOrders.length ? o.forOrders.join(", ") : "Stock"}</span> },
    { id: "written", head: "Written", align: "end", desktopOnly: true, cell: (o) => <span className="mid nw">{shortDate(localDate(new Date(o.orderedAt ?? o.createdAt), place.zone), locale)}</span> },
    { id: "due", head: "Due", align: "end", cell: (o) => <span className="nw">{o.expectedOn ? shortDate(o.expectedOn, locale) : "–"}</span> },
    { id: "lines", head: "Lines", align: "end", figures: true, cell: (o) => String(o.lineCount) },
    ...(seesPrice ? [{ id: "total", head: `Cost ${place.currency}`, align: "end", figures: true, cell: (o: OrderRow) => (o.totalMinor === null ? "" : amount(o.totalMinor, place)) } satisfies DataColumn<OrderRow>] : []),
    { id: "state", head: "State", cell: (o) => <OrderState order={o} today={today} locale={locale} /> },
  ], [place, locale, seesPrice, today]);
  return (
    <>
      <Views label="Saved views" current={view} views={VIEWS.map(([key, label]) => ({ key, label, href: `/s/${slug}/purchases${key === "open" ? "" : `?view=${key}`}`, count: counts[key] }))} />
      <div className="bar"><SearchWell label="Narrow the list" placeholder="Number, supplier or part" value={text} onChange={(e) => setText(e.target.value)} /></div>
      <DataTable
        caption="Purchase orders" columns={columns} rows={rows} rowKey={(o) => o.id} hrefOf={(o) => `/s/${slug}/purchases/${o.number ?? o.id}`}
        compact={(o) => <span className="row2 wide"><b>{o.supplierName}</b><span className="q at-r">{o.expectedOn ? shortDate(o.expectedOn, locale) : "–"}</span><span className="l2"><span className="ord nw">{o.number ?? "Draft"}</span> <OrderState order={o} today={today} locale={locale} /></span><span className="q at-r">{o.totalMinor === null ? "" : amount(o.totalMinor, place)}</span></span>}
        state={query.isPending ? "loading" : query.isError && rows.length === 0 ? "error" : "ready"} loadingLabel="Fetching purchase orders."
        error={<ErrorState title="The purchase orders could not be fetched" action={<Button onClick={() => void query.refetch()}>Try again</Button>}>Nothing was changed.</ErrorState>}
        empty={<EmptyState title={q ? "No purchase order like that" : "No purchase orders here"} action={q ? undefined : <LinkButton href={`/s/${slug}/purchases/short`}>See what is short</LinkButton>}>{q ? "Try the number, the supplier or a part's number." : "They are written from what is short, or by hand."}</EmptyState>}
      />
      {query.hasNextPage ? <div style={{ padding: "14px 0" }}><Button variant="lo" pending={query.isFetchingNextPage} pendingText="Fetching…" onClick={() => void query.fetchNextPage()}>More</Button></div> : null}
    </>
  );
}

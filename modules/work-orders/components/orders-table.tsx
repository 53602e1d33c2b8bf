"use client";

import { useInfiniteQuery } from "@tanstack/react-query";
import { useRouter } from "next/navigation";
import { useDeferredValue, useEffect, useMemo, useState } from "react";
import { amount, hours, shortDate } from "@/modules/kernel/format";
import { Button, LinkButton } from "@/modules/ui/button";
import { FilterChip } from "@/modules/ui/chip";
import { DataTable } from "@/modules/ui/data-table";
import type { DataColumn, Sort } from "@/modules/ui/data-table-columns";
import { Dial } from "@/modules/ui/dial";
import { EmptyState, ErrorState } from "@/modules/ui/empty-state";
import { getJson } from "@/modules/ui/fetch-json";
import { Flag } from "@/modules/ui/flag";
import { KeyHints } from "@/modules/ui/key-hints";
import { PageHead } from "@/modules/ui/page-head";
import { usePlace, type PlaceFacts } from "@/modules/ui/place";
import { SearchWell } from "@/modules/ui/search-well";
import { Status } from "@/modules/ui/status";
import { Tube } from "@/modules/ui/tube";
import { Views } from "@/modules/ui/views";
import { age } from "../domain/age";
import { STATIONS } from "../domain/floor-station";
import { shortNumber } from "../domain/short-number";
import type { OrderRow, OrdersPage, OrderView } from "../queries/orders";

const VIEW_WORDS: readonly [OrderView, string][] = [
  ["open", "Open"], ["due", "Due this week"], ["approval", "Waiting for approval"], ["short", "Parts short"], ["over", "Over book hours"], ["to-invoice", "To invoice"], ["gone", "Gone"],
];
const PROMISED = [["", "any"], ["today", "today"], ["week", "this week"], ["late", "late"], ["none", "not set"]] as const;
const SORT_OF: Record<string, "number" | "promised" | "customer"> = { number: "number", customer: "customer", promised: "promised" };
const POLL_MS = 30_000;

export interface OrdersAskText { view: OrderView; q: string; station: string; person: string; promised: string; sort: string; descending: string }

/** The open orders and their saved views; what is picked lives in the address, so that Back and bookmarks work. */
export function OrdersTable({ ask, first, may }: { ask: OrdersAskText; first: OrdersPage; may: { open: boolean; customers: boolean; menu: boolean } }) {
  const place = usePlace();
  const router = useRouter();
  const [q, setQ] = useState(ask.q);
  const words = useDeferredValue(q);
  const [sort, setSort] = useState<Sort>({ column: ask.sort === "number" ? "number" : ask.sort, descending: ask.descending === "true" });
  const key = { ...ask, q: words, sort: SORT_OF[sort.column] ?? "number", descending: String(sort.descending) };
  const isFirst = key.q === ask.q && key.sort === ask.sort && key.descending === ask.descending;
  const { data, isError, isPending, hasNextPage, fetchNextPage, isFetchingNextPage, refetch } = useInfiniteQuery({
    queryKey: ["orders", place.slug, key],
    queryFn: ({ pageParam, signal }) => getJson<OrdersPage>(`/api/v1/s/${place.slug}/orders`, { ...key, after: pageParam ?? undefined }, signal),
    initialPageParam: null as string | null, getNextPageParam: (page: OrdersPage) => page.next, refetchInterval: POLL_MS,
    ...(isFirst ? { initialData: { pages: [first], pageParams: [null] } } : {}),
  });
  const newest = data?.pages[0] ?? first;
  const rows = useMemo(() => (data?.pages ?? []).flatMap((p) => p.rows), [data]);

  const href = (change: Partial<OrdersAskText>) => {
    const next = { ...ask, q, sort: key.sort, descending: key.descending, ...change };
    const search = new URLSearchParams(Object.entries(next).filter(([k, v]) => v !== "" && !(k === "view" && v === "open") && !(k === "sort" && v === "number") && !(k === "descending" && v === "true")));
    return `/s/${place.slug}/orders${search.size ? `?${search}` : ""}`;
  };
  // The address follows the words typed, without a step in the history for each letter.
  useEffect(() => {
    if (words !== ask.q) window.history.replaceState(null, "", href({ q: words }));
    // eslint-disable-next-line react-hooks/exhaustive-deps
  }, [words]);

  const columns = useMemo(() => columnsFor(place, newest.now), [place, newest.now]);
  const label = VIEW_WORDS.find(([v]) => v === ask.view)?.[1] ?? "Orders";
  const narrowed = words !== "" || ask.station !== "" || ask.person !== "" || ask.promised !== "";
  const order = sort.column === "number" ? (sort.descending ? "newest first" : "oldest first") : sort.column === "promised" ? "by promise" : "by customer";
  return (
    <>
      <PageHead title="Work orders" close actions={<>{may.customers ? <LinkButton href={`/s/${place.slug}/customers`}>Customers</LinkButton> : null}{may.menu ? <LinkButton className="hide-s" href={`/s/${place.slug}/settings/menu`}>Menu</LinkButton> : null}<Button className="hide-s" icon="print" onClick={() => window.print()}>Print list</Button></>} />
      <Views label="Saved views" current={ask.view} views={VIEW_WORDS.map(([v, text]) => ({ key: v, label: text, href: href({ view: v }), count: newest.counts[v] }))} />
      <div className="bar">
        <SearchWell label="Narrow the list" placeholder="Narrow by name, engine or tag" value={q} onChange={(e) => setQ(e.target.value)} />
        <FilterChip label="Station" value={ask.station} options={[{ value: "", label: "any", href: href({ station: "" }) }, ...STATIONS.map((s) => ({ value: s, label: s, href: href({ station: s }) }))]} />
        <FilterChip label="Tech" value={ask.person} options={[{ value: "", label: "any", href: href({ person: "" }) }, ...newest.people.map((p) => ({ value: p, label: p, href: href({ person: p }) }))]} />
        <FilterChip label="Promised" value={ask.promised} options={PROMISED.map(([value, text]) => ({ value, label: text, href: href({ promised: value }) }))} />
        <span className="bar-r sm dim hide-s" role="status">{`${rows.length}${hasNextPage ? "+" : ""} ${rows.length === 1 ? "order" : "orders"}, ${order}`}</span>
      </div>
      <DataTable
        caption={`${label} orders`} columns={columns} rows={rows} rowKey={(o) => o.number} hrefOf={(o) => `/s/${place.slug}/orders/${o.number}`}
        compact={(o) => <CompactRow order={o} place={place} now={newest.now} />} sort={sort} onSortChange={(s) => setSort(s ?? { column: "number", descending: true })}
        state={isError && rows.length === 0 ? "error" : isPending ? "loading" : "ready"} loadingLabel="Fetching orders."
        error={<ErrorState title="The list did not come" action={<Button onClick={() => void refetch()}>Try again</Button>}>Nothing is lost. The shop&rsquo;s records did not answer.</ErrorState>}
        empty={<EmptyState title={narrowed ? "No order fits" : `No orders here`} action={narrowed ? <LinkButton href={`/s/${place.slug}/orders`}>Show all open orders</LinkButton> : may.open && ask.view === "open" ? <Button variant="go" onClick={() => router.push(`/s/${place.slug}/orders/new`)}>New work order</Button> : undefined}>{narrowed ? "Take a filter off, or type less." : EMPTY_WORDS[ask.view]}</EmptyState>}
      />
      {hasNextPage ? <div className="mt-3 text-center noprint"><Button onClick={() => void fetchNextPage()} pending={isFetchingNextPage} pendingText="Fetching…">Show more</Button></div> : null}
      <div className="foot hide-s">
        <KeyHints hints={[{ keys: ["↑", "↓"], does: "row" }, { keys: ["Enter"], does: "open" }]} />
        <span className="sm dim flex items-center gap-1"><Dial name="late" size={14} /> due or late &ensp; hatched tube: past book hours</span>
      </div>
    </>
  );
}

const EMPTY_WORDS: Record<OrderView, string> = {
  open: "An order begins with a call or a parcel.", due: "Nothing is promised for the next seven days.", approval: "Estimates land here while the customer thinks.", short: "Orders land here when the shelf has too little for them.",
  over: "Orders land here when the bench took longer than the book.", "to-invoice": "Orders land here when final inspection passed and no invoice is issued.", gone: "Orders land here when their last head has left.",
};

const promise = (o: OrderRow, place: PlaceFacts) => (o.promisedOn === null ? <span className="dim">Not set</span> : o.due ? <Flag>{shortDate(o.promisedOn, place.locale)}</Flag> : shortDate(o.promisedOn, place.locale));
const wordOf = (o: OrderRow) => (o.dial === "work" ? "In work" : o.word === "Approval" ? "Waiting for approval" : o.word);

function columnsFor(place: PlaceFacts, now: string): DataColumn<OrderRow>[] {
  return [
    { id: "number", head: "Order", primary: true, highFirst: true, sortBy: (o) => o.number, cell: (o) => <span className="ord">{o.number}</span> },
    { id: "customer", head: "Customer", sortBy: (o) => o.customer, cell: (o) => <b className="b">{o.customer}</b> },
    { id: "job", head: "Job", cell: (o) => <span className="mid">{o.job}</span>, desktopOnly: true },
    { id: "station", head: "Station", cell: (o) => <span className="mid">{o.station ?? "–"}</span> },
    { id: "status", head: "Status", cell: (o) => <Status dial={o.dial}>{wordOf(o)}</Status> },
    { id: "more", head: <span className="sr-only">Who or how long</span>, cell: (o) => <span className="dim sm">{o.person ?? (o.since && o.since <= now ? age(o.since, now) : "–")}</span>, desktopOnly: true },
    { id: "promised", head: "Promised", sortBy: (o) => o.promisedOn, cell: (o) => promise(o, place), figures: true },
    { id: "worked", head: "Worked", align: "end", figures: true, cell: (o) => hours(o.workedMinutes, place.locale), desktopOnly: true },
    { id: "book", head: "Book", align: "end", figures: true, cell: (o) => <span className="mid">{o.bookMinutes === 0 ? "–" : hours(o.bookMinutes, place.locale)}</span>, desktopOnly: true },
    { id: "tube", head: <span className="sr-only">Worked of book hours</span>, width: 100, cell: (o) => (o.bookMinutes === 0 ? null : <Tube value={o.workedMinutes} mark={o.bookMinutes} label={`${hours(o.workedMinutes, place.locale)} of ${hours(o.bookMinutes, place.locale)} hours`} />), desktopOnly: true },
    { id: "total", head: `Estimate ${place.currency}`, align: "end", figures: true, cell: (o) => (o.totalMinor === null ? "–" : amount(o.totalMinor, place)) },
    { id: "by", head: "By", cell: (o) => <span className="dim sm">{o.by}</span>, desktopOnly: true },
  ];
}

function CompactRow({ order: o, place, now }: { order: OrderRow; place: PlaceFacts; now: string }) {
  return (
    <span className="row2">
      <b className="ord">{shortNumber(o.number)}</b>
      <b>{o.customer}</b>
      <span className="q at-r">{promise(o, place)}</span>
      <span className="l2"><Status dial={o.dial}>{wordOf(o)}{o.person ? `, ${o.person}` : o.since && o.since <= now ? `, ${age(o.since, now)}` : ""}</Status></span>
      <span className="q at-r">{o.totalMinor === null ? "" : amount(o.totalMinor, place)}</span>
    </span>
  );
}

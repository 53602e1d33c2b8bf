"use client";
import { keepPreviousData, useInfiniteQuery, useQuery } from "@tanstack/react-query";
import Link from "next/link";
import { useDeferredValue, useMemo, useState } from "react";
import { amount, date } from "@/modules/kernel/format";
import { Button, LinkButton } from "@/modules/ui/button";
import { DataTable } from "@/modules/ui/data-table";
import type { DataColumn } from "@/modules/ui/data-table-columns";
import { EmptyState, ErrorState } from "@/modules/ui/empty-state";
import { getJson } from "@/modules/ui/fetch-json";
import { usePlace } from "@/modules/ui/place";
import { SearchWell } from "@/modules/ui/search-well";
import { Views } from "@/modules/ui/views";
import { qtyText } from "../domain/qty-text";
import type { PartView } from "../input";
import type { PartRow } from "../queries/find-parts";
import { PartPanel } from "./part-panel";
import { PartState } from "./part-state";

interface Page { rows: PartRow[]; next: string | null; counts: Record<PartView, number> }
const VIEWS: readonly [PartView, string][] = [["all", "All"], ["short", "Short"], ["reorder", "Reorder"], ["expiring", "Expiring"], ["on-order", "On order"], ["kits", "Kits"], ["lots", "Lots"]];
const EMPTY: Record<PartView, [title: string, words: string]> = {
  all: ["No parts yet", "A part is added once, with its own number, and then taken in or counted."], short: ["Nothing is short", "Parts land here when an order needs more than the shelf has."],
  reorder: ["Nothing to reorder", "Parts land here at their reorder mark."], expiring: ["Nothing expires soon", "Lots land here thirty days before their date."],
  "on-order": ["Nothing on order", "Parts land here when a purchase order is sent."], kits: ["No kits yet", "A kit is sold as one and issued as its parts."], lots: ["Nothing kept by lot", "Epoxy and sealant are kept by lot and date."],
};

/** The list of parts with saved views and search; the picked one stands open at the side. */
export function PartsRoom({ first, view, canBuy }: { first: Page; view: PartView; canBuy: boolean }) {
  const place = usePlace();
  const { slug, locale } = place;
  const [text, setText] = useState("");
  const q = useDeferredValue(text.trim());
  const [picked, setPicked] = useState<string | null>(null);
  const query = useInfiniteQuery({
    queryKey: ["parts", slug, "list", view, q],
    queryFn: ({ pageParam, signal }) => getJson<Page>(`/api/v1/s/${slug}/parts`, { q, view, after: pageParam ?? undefined }, signal),
    initialPageParam: null as string | null,
    getNextPageParam: (last) => last.next,
    placeholderData: keepPreviousData,
    ...(q === "" ? { initialData: { pages: [first], pageParams: [null] } } : {}),
  });
  const rows = query.data?.pages.flatMap((p) => p.rows) ?? [];
  const counts = query.data?.pages[0]?.counts ?? first.counts;
  const pickedId = picked ?? rows[0]?.id ?? null;
  const panel = useQuery({
    queryKey: ["part", slug, pickedId], enabled: pickedId !== null, placeholderData: keepPreviousData,
    queryFn: ({ signal }) => getJson<Parameters<typeof PartPanel>[0]["part"]>(`/api/v1/s/${slug}/parts/${pickedId ?? ""}`, {}, signal),
  });
  const seesPrice = rows.some((r) => r.salePriceMinor !== null);
  const columns = useMemo<DataColumn<PartRow>[]>(() => [
    { id: "sku", head: "No.", primary: true, cell: (p) => <span className="q mid nw">{p.sku}</span> },
    { id: "part", head: "Part", cell: (p) => <b>{p.description}</b> },
    { id: "bin", head: "Shelf", desktopOnly: true, cell: (p) => <span className="mid nw">{p.bin}</span> },
    { id: "hand", head: "On shelf", align: "end", figures: true, cell: (p) => (p.isKit ? "–" : qtyText(p.onHandMilli, p.stockUnit)) },
    { id: "promised", head: "Promised", align: "end", figures: true, cell: (p) => <span className="mid">{p.isKit ? "–" : qtyText(p.promisedMilli, p.stockUnit)}</span> },
    { id: "free", head: "Free", align: "end", cell: (p) => <b className="num" style={{ fontSize: "1.0625rem", lineHeight: 1 }}>{qtyText(p.freeMilli, p.isKit ? "each" : p.stockUnit)}</b> },
    { id: "reorder", head: "Reorder at", align: "end", figures: true, desktopOnly: true, cell: (p) => <span className="mid">{p.reorderPointMilli === null ? "" : qtyText(p.reorderPointMilli, p.stockUnit)}</span> },
    ...(view === "on-order" || view === "short" ? [{ id: "arrives", head: "Arrives", align: "end", cell: (p: PartRow) => <span className="nw">{p.nextArrival ? date(p.nextArrival, locale) : p.onOrderMilli > 0 ? "no date" : "–"}</span> } satisfies DataColumn<PartRow>] : []),
    ...(seesPrice && view === "all" ? [{ id: "price", head: `Price ${place.currency}`, align: "end", figures: true, desktopOnly: true, cell: (p: PartRow) => (p.salePriceMinor === null ? "" : amount(p.salePriceMinor, place)) } satisfies DataColumn<PartRow>] : []),
    { id: "state", head: "State", cell: (p) => <PartState part={p} locale={locale} /> },
  ], [locale, place, seesPrice, view]);

  return (
    <>
      <Views label="Saved views" current={view} views={VIEWS.map(([key, label]) => ({ key, label, href: `/s/${slug}/parts${key === "all" ? "" : `?view=${key}`}`, count: counts[key] }))} />
      <div className="split" style={{ ["--side" as string]: "420px" }}>
        <div className="min-w-0">
          <div className="bar"><SearchWell label="Narrow the list" placeholder="Number, words or family" value={text} onChange={(e) => setText(e.target.value)} /></div>
          <DataTable
            caption="Parts" columns={columns} rows={rows} rowKey={(p) => p.id} hrefOf={(p) => `/s/${slug}/parts/${encodeURIComponent(p.sku)}`} picked={pickedId} onPick={(p) => setPicked(p.id)}
            compact={(p) => <span className="row2" style={{ gridTemplateColumns: "1fr auto 128px", alignItems: "center" }}><b>{p.description}</b><span><b className="num" style={{ fontSize: "1.0625rem" }}>{qtyText(p.freeMilli, p.isKit ? "each" : p.stockUnit)}</b> <span className="dim sm">free</span></span><PartState part={p} locale={locale} /></span>}
            state={query.isPending ? "loading" : query.isError && rows.length === 0 ? "error" : "ready"} loadingLabel="Fetching parts."
            error={<ErrorState title="The parts could not be fetched" action={<Button onClick={() => void query.refetch()}>Try again</Button>}>Nothing was changed.</ErrorState>}
            empty={<EmptyState title={q ? "No part of that number or name" : EMPTY[view][0]} action={q ? undefined : <LinkButton href={`/s/${slug}/parts/new`}>Add a part</LinkButton>}>{q ? "Try fewer letters, or the supplier's number." : EMPTY[view][1]}</EmptyState>}
          />
          {query.hasNextPage ? <div style={{ padding: "14px 0" }}><Button variant="lo" pending={query.isFetchingNextPage} pendingText="Fetching…" onClick={() => void query.fetchNextPage()}>More parts</Button></div> : null}
          {view === "short" && canBuy && rows.length > 0 ? <p style={{ paddingTop: 14 }}><Link className="lk" href={`/s/${slug}/purchases/short`}>Buy what is short</Link></p> : null}
        </div>
        <aside className="hide-s">{panel.data && rows.length > 0 ? <PartPanel part={panel.data} /> : null}</aside>
      </div>
    </>
  );
}

"use client";

import { useInfiniteQuery } from "@tanstack/react-query";
import { useRouter, useSearchParams } from "next/navigation";
import { useDeferredValue, useMemo, useState } from "react";
import { date, decimal } from "@/modules/kernel/format";
import { localDate } from "@/modules/kernel/instant";
import { Button, LinkButton } from "@/modules/ui/button";
import { FilterChip } from "@/modules/ui/chip";
import { DataTable } from "@/modules/ui/data-table";
import type { DataColumn } from "@/modules/ui/data-table-columns";
import { EmptyState } from "@/modules/ui/empty-state";
import { getJson } from "@/modules/ui/fetch-json";
import { Icon } from "@/modules/ui/icon";
import { usePlace, type PlaceFacts } from "@/modules/ui/place";
import { SearchWell } from "@/modules/ui/search-well";
import type { LibraryRow } from "../queries/library";
import { flowText, liftWords } from "./flow-words";
import { PURPOSE_WORDS, portWords, WORK_KINDS } from "./library-words";

export interface LibraryPage { rows: LibraryRow[]; next: string | null }
/** Filters as they stand in the address. */
export interface LibraryFilters { q: string; family: string; side: string; purpose: string; owner: string; work: string; valve: string; seat: string; from: string; to: string }

const peak = (r: LibraryRow, locale: string) => (r.peakCfm === null || r.peakLiftUm === null ? "—" : `${flowText(r.peakCfm, locale)} at ${liftWords(r.peakLiftUm, r.liftUnit, locale)}`);

function columnsFor({ locale, zone }: PlaceFacts): DataColumn<LibraryRow>[] {
  const day = (iso: string) => date(localDate(new Date(iso), zone), locale);
  return [
    { id: "mark", head: "Head", primary: true, cell: (r) => <span className="ord">{r.mark}</span> },
    { id: "family", head: "Family", cell: (r) => r.family },
    { id: "port", head: "Port", cell: (r) => portWords(r.cylinder, r.side) },
    { id: "what", head: "Test", cell: (r) => <>{PURPOSE_WORDS[r.purpose]}{r.purpose === "interim" ? ` ${r.runNo}` : ""}{r.ownerKind === "development" ? <span className="dim sm"> own head</span> : null}</> },
    { id: "valve", head: "Valve mm", align: "end", figures: true, cell: (r) => (r.valveMm === null ? "—" : decimal(r.valveMm, 1, locale)) },
    { id: "work", head: "Seat and work", desktopOnly: true, cell: (r) => <span className="sm">{[r.seatNote, ...r.workDone].filter(Boolean).join(", ") || "—"}</span> },
    { id: "peak", head: "Most CFM", align: "end", figures: true, cell: (r) => <span className="nw">{peak(r, locale)}</span> },
    { id: "mean", head: "Mean to cam", align: "end", figures: true, cell: (r) => (r.meanToCamCfm === null ? "—" : flowText(r.meanToCamCfm, locale)) },
    { id: "at", head: "Stated at", align: "end", figures: true, desktopOnly: true, cell: (r) => <span className="nw">{r.atInH2O} in H₂O{r.isConverted ? ", converted" : ""}</span> },
    { id: "doubt", head: "Doubts", align: "end", desktopOnly: true, cell: (r) => (r.doubts === 0 ? "" : <span className="nw"><Icon name="warn" size={14} /> {r.doubts}</span>) },
    { id: "day", head: "Flowed", align: "end", cell: (r) => <span className="nw">{day(r.startedAt)}</span> },
  ];
}

/** Every test of every head. Filters stand in the address; two ticked rows can be laid over each other. */
export function LibraryList({ first, filters, families }: { first: LibraryPage; filters: LibraryFilters; families: readonly string[] }) {
  const place = usePlace();
  const { slug, locale, zone } = place;
  const router = useRouter();
  const address = useSearchParams();
  const [q, setQ] = useState(filters.q);
  const [ticked, setTicked] = useState<ReadonlySet<string>>(new Set());
  const ask = { ...filters, q: useDeferredValue(q) };
  const isFirst = (Object.keys(ask) as (keyof LibraryFilters)[]).every((k) => ask[k] === filters[k]);
  const list = useInfiniteQuery({
    queryKey: ["flow-library", slug, ask],
    queryFn: ({ pageParam, signal }) => getJson<LibraryPage>(`/api/v1/s/${slug}/flow/library`, { ...ask, after: pageParam || undefined }, signal),
    initialPageParam: "", getNextPageParam: (last: LibraryPage) => last.next ?? undefined,
    ...(isFirst ? { initialData: { pages: [first], pageParams: [""] } } : {}), placeholderData: (old) => old,
  });
  const columns = useMemo(() => columnsFor(place), [place]);
  const rows = list.data?.pages.flatMap((p) => p.rows) ?? [];
  const set = (key: keyof LibraryFilters, value: string) => {
    const next = new URLSearchParams(address);
    if (value) next.set(key, value); else next.delete(key);
    router.replace(`/s/${slug}/flow/library${next.size ? `?${next}` : ""}`, { scroll: false });
  };
  const chip = (key: keyof LibraryFilters, label: string, options: readonly { value: string; label: string }[]) => (
    <FilterChip label={label} value={filters[key]} options={[{ value: "", label: "Any" }, ...options]} onChange={(v) => set(key, v)} />
  );
  const [a, b] = [...ticked];
  const day = (iso: string) => date(localDate(new Date(iso), zone), locale);
  return (
    <>
      <div className="bar">
        <SearchWell label="Find in the library" placeholder="Mark, casting or family" value={q} onChange={(e) => setQ(e.target.value)} onBlur={() => set("q", q)} />
        {chip("family", "Family", families.map((f) => ({ value: f, label: f })))}
        {chip("side", "Side", [{ value: "intake", label: "Intake" }, { value: "exhaust", label: "Exhaust" }])}
        {chip("purpose", "Test", [{ value: "baseline", label: "Before" }, { value: "after", label: "After" }, { value: "interim", label: "Pass" }])}
        {chip("work", "Work", WORK_KINDS.map((w) => ({ value: w, label: w })))}
        {chip("owner", "Owner", [{ value: "customer", label: "Customer" }, { value: "development", label: "Shop's own" }])}
        <TypedFilter label="Valve mm" value={filters.valve} onSet={(v) => set("valve", v)} inputMode="decimal" />
        <TypedFilter label="Seat" value={filters.seat} onSet={(v) => set("seat", v)} />
        {/* The two ends of one span wrap together. */}
        <span className="inline-flex flex-wrap gap-x-2.5 gap-y-2">
          <TypedFilter label="From" value={filters.from} onSet={(v) => set("from", v)} type="date" />
          <TypedFilter label="To" value={filters.to} onSet={(v) => set("to", v)} type="date" />
        </span>
      </div>
      <DataTable
        caption="Finished flow tests, newest first" columns={columns} rows={rows} rowKey={(r) => r.testId} hrefOf={(r) => `/s/${slug}/flow/${r.headId}${r.cylinder > 1 ? `?port=${r.cylinder}` : ""}`}
        ticked={ticked} onTickedChange={(next) => setTicked(new Set([...next].slice(-2)))} tickLabel={(r) => `Lay ${r.mark} ${portWords(r.cylinder, r.side)} ${PURPOSE_WORDS[r.purpose]} over another`}
        state={list.isError ? "error" : list.isPending ? "loading" : "ready"}
        error={<EmptyState title="The library cannot be read just now" action={<Button onClick={() => void list.refetch()}>Try again</Button>}>Nothing is lost.</EmptyState>}
        empty={<EmptyState title="No finished test fits">Tests land here when they are finished on the flow sheet or read from a file.</EmptyState>}
        compact={(r) => (
          <span className="row2 marked">
            <b className="ord nw">{r.mark}</b><b>{portWords(r.cylinder, r.side)}, {PURPOSE_WORDS[r.purpose]}</b><span className="q at-r">{r.peakCfm === null ? "—" : flowText(r.peakCfm, locale)}</span>
            <span className="l2">{r.family}{r.valveMm === null ? "" : `, ${decimal(r.valveMm, 1, locale)} mm`}</span><span className="q at-r">{day(r.startedAt)}</span>
          </span>
        )}
      />
      {a && b ? (
        <div className="commit-bar" role="status"><b>Two tests picked.</b><LinkButton variant="go" href={`/s/${slug}/flow/library/overlay?a=${a}&b=${b}`}>Lay them over each other</LinkButton></div>
      ) : ticked.size === 1 ? <p className="hint mt-3" role="status">Tick one more to lay the two over each other.</p> : null}
      {list.hasNextPage ? <div className="mt-4"><Button pending={list.isFetchingNextPage} pendingText="Fetching…" onClick={() => void list.fetchNextPage()}>Older tests</Button></div> : null}
    </>
  );
}

function TypedFilter({ label, value, onSet, type = "text", inputMode }: { label: string; value: string; onSet: (value: string) => void; type?: "text" | "date"; inputMode?: "decimal" }) {
  const [text, setText] = useState(value);
  const send = () => { if (text.trim() !== value) onSet(text.trim()); };
  return (
    <label className="in sm !w-auto"><span className="dim sm">{label}</span>
      <input className={type === "date" ? "!w-32" : "!w-16"} type={type} inputMode={inputMode} value={text} onChange={(e) => setText(e.target.value)} onBlur={send} onKeyDown={(e) => { if (e.key === "Enter") send(); }} />
    </label>
  );
}

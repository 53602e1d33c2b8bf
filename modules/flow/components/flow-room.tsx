"use client";
import { useInfiniteQuery } from "@tanstack/react-query";
import Link from "next/link";
import { useRouter } from "next/navigation";
import { useDeferredValue, useState } from "react";
import { dateTime } from "@/modules/kernel/format";
import { Button } from "@/modules/ui/button";
import type { DialName } from "@/modules/ui/dial";
import { DataTable } from "@/modules/ui/data-table";
import type { DataColumn } from "@/modules/ui/data-table-columns";
import { EmptyState, ErrorState } from "@/modules/ui/empty-state";
import { getJson } from "@/modules/ui/fetch-json";
import { usePlace, type PlaceFacts } from "@/modules/ui/place";
import { QueryProvider } from "@/modules/ui/query-provider";
import { SearchWell } from "@/modules/ui/search-well";
import { Status } from "@/modules/ui/status";
import { Tag } from "@/modules/ui/tag";
import { ToggleChip } from "@/modules/ui/chip";
import type { RoomPage, RoomRow, RoomState } from "../queries/room";

const STATES: Record<RoomState, { words: string; dial: DialName }> = {
  bench: { words: "On the bench", dial: "work" }, before: { words: "Waiting for before", dial: "wait" }, after: { words: "Waiting for after", dial: "queue" }, proved: { words: "Proved", dial: "ready" },
};
const ORDER: readonly RoomState[] = ["bench", "before", "after", "proved"];

const columnsFor = (place: PlaceFacts): DataColumn<RoomRow>[] => [
  { id: "mark", head: "Head", primary: true, cell: (r) => <Tag running={r.state === "bench"} runningWord="on the bench">{r.mark}</Tag> },
  { id: "family", head: "Family", cell: (r) => <b>{r.family}</b> },
  { id: "order", head: "Order", cell: (r) => <span className="mid">{[r.orderNumber, r.customerName].filter(Boolean).join(", ") || "the shop's own"}</span> },
  { id: "state", head: "Where it stands", cell: (r) => <Status dial={STATES[r.state].dial}>{STATES[r.state].words}</Status> },
  { id: "tests", head: "Tests", align: "end", figures: true, cell: (r) => (r.tests === 0 ? "–" : r.tests) },
  { id: "last", head: "Last read", align: "end", cell: (r) => (r.lastAt ? <span className="mid nw">{dateTime(r.lastAt, place)} {r.lastBy ?? ""}</span> : <span className="dim">not yet</span>) },
];

function Room({ first }: { first: RoomPage }) {
  const place = usePlace();
  const router = useRouter();
  const [typed, setTyped] = useState("");
  const [state, setState] = useState<RoomState | "">("");
  const q = useDeferredValue(typed);
  const isFirst = q === "" && state === "";
  const query = useInfiniteQuery({
    queryKey: ["flow-room", place.slug, q, state],
    queryFn: ({ pageParam, signal }) => getJson<RoomPage>(`/api/v1/s/${place.slug}/flow/heads`, { q, state, ...(pageParam ? { after: pageParam } : {}) }, signal),
    initialPageParam: "",
    getNextPageParam: (page) => page.next ?? undefined,
    ...(isFirst ? { initialData: { pages: [first], pageParams: [""] } } : {}),
    placeholderData: (before) => before,
    refetchInterval: 30_000,
  });
  const pages = query.data?.pages ?? [];
  const rows = pages.flatMap((p) => p.rows);
  const counts = pages[0]?.counts ?? first.counts;
  const [columns] = useState(() => columnsFor(place));
  const href = (r: RoomRow) => `/s/${place.slug}/flow/${r.headId}`;
  return (
    <>
      <div className="bar">
        <SearchWell label="Find a head by tag, family, order" placeholder="Tag, family, order" value={typed} onChange={(e) => setTyped(e.target.value)} onKeyDown={(e) => { if (e.key === "Enter" && rows.length === 1 && rows[0]) router.push(href(rows[0])); }} />
        {ORDER.map((s) => <ToggleChip key={s} on={state === s} onChange={() => setState(state === s ? "" : s)}>{`${STATES[s].words} ${counts?.[s] ?? 0}`}</ToggleChip>)}
      </div>
      <DataTable
        caption="Heads of the flow room" columns={columns} rows={rows} rowKey={(r) => r.headId} hrefOf={href}
        state={query.isError ? "error" : query.isPending ? "loading" : "ready"} loadingLabel="Fetching heads."
        compact={(r) => <span className="row2 wide"><b>{r.mark} {r.family}</b><span className="q at-r">{r.tests === 0 ? "" : r.tests}</span><span className="l2"><Status dial={STATES[r.state].dial}>{STATES[r.state].words}</Status></span></span>}
        empty={<EmptyState title={isFirst ? "No head is here yet" : "No head like that"}>Heads land here when they are booked in under a tag.</EmptyState>}
        error={<ErrorState title="The list could not be fetched" action={<Button onClick={() => void query.refetch()}>Try again</Button>}>Readings are safe.</ErrorState>}
      />
      {query.hasNextPage ? <div className="foot"><Button pending={query.isFetchingNextPage} pendingText="Fetching…" onClick={() => void query.fetchNextPage()}>More heads</Button></div> : null}
      <p className="hint mt-4">A sheet is opened from its head. <Link className="lk" href={`/s/${place.slug}/orders`}>Book a head in</Link> to give it a tag.</p>
    </>
  );
}

/** The flow room: heads on the bench now, waiting for before, waiting for after, proved. */
export const FlowRoom = ({ first }: { first: RoomPage }) => <QueryProvider><Room first={first} /></QueryProvider>;

"use client";
import { useInfiniteQuery } from "@tanstack/react-query";
import { useMemo, type ReactNode } from "react";
import { amount, dateTime, shortDate } from "@/modules/kernel/format";
import { localDate } from "@/modules/kernel/instant";
import { Button } from "@/modules/ui/button";
import { DataTable } from "@/modules/ui/data-table";
import type { DataColumn } from "@/modules/ui/data-table-columns";
import { EmptyState } from "@/modules/ui/empty-state";
import { getJson } from "@/modules/ui/fetch-json";
import { Note } from "@/modules/ui/note";
import { usePlace } from "@/modules/ui/place";
import { movementWords } from "../domain/part-words";
import { qtyText, signedQtyText } from "../domain/qty-text";
import type { LedgerRow } from "../queries/ledger";

interface Page { rows: LedgerRow[]; next: number | null }

/** What a row of the ledger says in one line. */
const wordsOf = (r: LedgerRow): string =>
  [movementWords(r.kind), r.workOrderNumber, r.lotCode ? `lot ${r.lotCode}` : null, r.reason && r.reason !== r.workOrderNumber ? r.reason : null].filter(Boolean).join(", ");

/** The ledger of a part, newest first, with the quantity after each row. `act` puts a key at the end of a row. */
export function LedgerTable({ partId, stockUnit, first, seesCost, act }: { partId: string; stockUnit: string; first: Page; seesCost: boolean; act?: (row: LedgerRow) => ReactNode }) {
  const place = usePlace();
  const query = useInfiniteQuery({
    queryKey: ["ledger", place.slug, partId],
    queryFn: ({ pageParam, signal }) => getJson<Page>(`/api/v1/s/${place.slug}/parts/${partId}/movements`, { before: pageParam ?? undefined }, signal),
    initialPageParam: null as number | null,
    getNextPageParam: (last) => last.next,
    initialData: { pages: [first], pageParams: [null] },
  });
  const rows = query.data.pages.flatMap((p) => p.rows);
  const columns = useMemo<DataColumn<LedgerRow>[]>(() => [
    { id: "at", head: "When", cell: (r) => <span className="mid nw" title={dateTime(r.at, place)}>{shortDate(localDate(new Date(r.at), place.zone), place.locale)}</span>, sortBy: (r) => r.seq, highFirst: true },
    { id: "what", head: "What", cell: (r) => <span className={r.reversedById ? "mid line-through" : ""}>{wordsOf(r)}</span> },
    { id: "who", head: "Who", desktopOnly: true, cell: (r) => <span className="mid">{r.personName ?? ""}</span>, sortBy: (r) => r.personName },
    { id: "qty", head: "Moved", align: "end", figures: true, cell: (r) => <b>{signedQtyText(r.qtyMilli, stockUnit)}</b>, sortBy: (r) => r.qtyMilli },
    ...(seesCost ? [{ id: "value", head: `Value ${place.currency}`, align: "end", figures: true, cell: (r: LedgerRow) => (r.valueMinor === null ? "" : amount(r.valueMinor, place).replace("-", "−")), sortBy: (r: LedgerRow) => r.valueMinor } satisfies DataColumn<LedgerRow>] : []),
    { id: "after", head: "After", align: "end", figures: true, cell: (r) => <span className="mid">{qtyText(r.afterMilli, stockUnit)}</span> },
    ...(act ? [{ id: "act", head: <span className="sr-only">Act</span>, align: "end", cell: (r: LedgerRow) => act(r) } satisfies DataColumn<LedgerRow>] : []),
  ], [place, stockUnit, seesCost, act]);
  return (
    <>
      <DataTable
        caption="Ledger of this part" columns={columns} rows={rows} rowKey={(r) => r.id}
        compact={(r) => <span className="row2" style={{ gridTemplateColumns: "auto 1fr auto" }}><span className="mid nw">{shortDate(localDate(new Date(r.at), place.zone), place.locale)}</span><span>{wordsOf(r)}</span><b className="q at-r">{signedQtyText(r.qtyMilli, stockUnit)}</b><span className="l2 mid sm">{r.personName ?? ""}</span><span className="q at-r mid">{qtyText(r.afterMilli, stockUnit)}</span></span>}
        empty={<EmptyState title="Nothing moved yet" level={3}>Rows come with opening stock, taking in, issuing and counting.</EmptyState>}
      />
      {query.isError ? <Note tone="stop" live>Older rows could not be fetched. Try again.</Note> : null}
      {query.hasNextPage ? <div style={{ padding: 12 }}><Button variant="lo" size="sm" pending={query.isFetchingNextPage} pendingText="Fetching…" onClick={() => void query.fetchNextPage()}>Older rows</Button></div> : null}
    </>
  );
}

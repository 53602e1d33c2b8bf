"use client";

import {
  createSortedRowModel,
  rowSortingFeature,
  tableFeatures,
  useTable,
  type ColumnDef,
  type SortingState,
} from "@tanstack/react-table";
import clsx from "clsx";
import { useRouter } from "next/navigation";
import { useMemo, useRef, useState, type KeyboardEvent, type ReactNode } from "react";
import { compareValues, nextRow, type DataColumn, type Sort } from "./data-table-columns";
import { DataTableHead } from "./data-table-head";
import { DataTableRow } from "./data-table-row";
import { SkeletonRows } from "./skeleton";

const features = tableFeatures({ rowSortingFeature, sortedRowModel: createSortedRowModel() });

export interface DataTableProps<Row> {
  /** Says what the table holds; read by screen readers, not shown. */
  caption: string;
  columns: readonly DataColumn<Row>[];
  rows: readonly Row[];
  rowKey: (row: Row) => string;
  /** Enter, double press and, on a phone, a tap go here. The primary column becomes the link. */
  hrefOf?: (row: Row) => string;
  /** Picked row (plate and fluid edge). Uncontrolled when left out. */
  picked?: string | null;
  onPick?: (row: Row) => void;
  /** Enter when there is no `hrefOf`. */
  onOpen?: (row: Row) => void;
  /** Several rows ticked with Space. Keys as given by `rowKey`. */
  ticked?: ReadonlySet<string>;
  onTickedChange?: (ticked: ReadonlySet<string>) => void;
  tickLabel?: (row: Row) => string;
  /** Two-line form of a row below 900 px; without it the table scrolls sideways in its own lane. */
  compact?: (row: Row) => ReactNode;
  /** First order. With `onSortChange` the server sorts and `sort` says how the rows came. */
  sort?: Sort | null;
  onSortChange?: (sort: Sort | null) => void;
  /** `<tr>`s of totals. */
  footer?: ReactNode;
  state?: "ready" | "loading" | "error";
  loadingLabel?: string;
  empty?: ReactNode;
  error?: ReactNode;
  className?: string;
}

/**
 * A list of things. ↑ ↓ walk the rows, Enter opens, Space ticks, Home and End jump. One row at a time is in the tab order,
 * links and keys inside it come after.
 */
export function DataTable<Row>({
  caption,
  columns,
  rows,
  rowKey,
  hrefOf,
  picked,
  onPick,
  onOpen,
  ticked,
  onTickedChange,
  tickLabel,
  compact,
  sort = null,
  onSortChange,
  footer,
  state = "ready",
  loadingLabel = "Fetching. Shapes hold the place.",
  empty,
  error,
  className,
}: DataTableProps<Row>) {
  const router = useRouter();
  const body = useRef<HTMLTableSectionElement>(null);
  const [ownPicked, setOwnPicked] = useState<string | null>(null);
  const [ownSort, setOwnSort] = useState<Sort | null>(sort);
  const [last, setLast] = useState<string | null>(null);
  const order = onSortChange === undefined ? ownSort : sort;
  const sorting: SortingState = useMemo(() => (order === null ? [] : [{ id: order.column, desc: order.descending }]), [order]);

  const defs = useMemo(
    () =>
      columns.map((c): ColumnDef<typeof features, { row: Row }> => {
        const by = c.sortBy;
        return {
          id: c.id,
          accessorFn: (wrapped) => (by === undefined ? null : by(wrapped.row)),
          enableSorting: by !== undefined,
          sortDescFirst: c.highFirst ?? false,
          sortFn: (a, b, id) => compareValues(a.getValue<string | number | null>(id), b.getValue<string | number | null>(id)),
        };
      }),
    [columns],
  );
  const data = useMemo(() => rows.map((row) => ({ row })), [rows]);

  const changeSort = (next: SortingState) => {
    const first = next[0];
    const value = first === undefined ? null : { column: first.id, descending: first.desc };
    if (onSortChange === undefined) setOwnSort(value);
    else onSortChange(value);
  };
  const table = useTable({
    features,
    columns: defs,
    data,
    getRowId: (wrapped) => rowKey(wrapped.row),
    state: { sorting },
    manualSorting: onSortChange !== undefined,
    onSortingChange: (updater) => changeSort(typeof updater === "function" ? updater(sorting) : updater),
  });

  if (state === "loading") return <SkeletonRows label={loadingLabel} />;
  if (state === "error") return <>{error}</>;
  if (rows.length === 0) return <>{empty}</>;

  const shown = table.getRowModel().rows.map((r) => ({ key: r.id, row: r.original.row }));
  const pickedKey = picked === undefined ? ownPicked : picked;
  const tabKey = [last, pickedKey].find((k) => k !== null && shown.some((r) => r.key === k)) ?? shown[0]?.key;

  const pick = (row: Row) => {
    setOwnPicked(rowKey(row));
    onPick?.(row);
  };
  const open = (row: Row) => {
    if (hrefOf !== undefined) router.push(hrefOf(row));
    else onOpen?.(row);
  };
  const tick = (key: string) => {
    if (ticked === undefined || onTickedChange === undefined) return;
    const next = new Set(ticked);
    if (!next.delete(key)) next.add(key);
    onTickedChange(next);
  };
  const onKeyDown = (event: KeyboardEvent<HTMLTableSectionElement>) => {
    // Keys pressed inside a link, field or button of a row belong to it.
    const focused = event.target;
    if (!(focused instanceof HTMLTableRowElement)) return;
    const at = shown.findIndex((r) => r.key === focused.dataset.key);
    const here = shown[at];
    if (event.key === "Enter" && here !== undefined) {
      event.preventDefault();
      open(here.row);
      return;
    }
    if (event.key === " " && here !== undefined && onTickedChange !== undefined) {
      event.preventDefault();
      tick(here.key);
      return;
    }
    const to = nextRow(event.key, at, shown.length);
    const target = to === null ? undefined : shown[to];
    if (to === null || target === undefined) return;
    event.preventDefault();
    const tr = body.current?.rows[to];
    tr?.focus();
    tr?.scrollIntoView({ block: "nearest" });
    pick(target.row);
  };

  return (
    <div className={clsx("dt", compact === undefined ? "lane-x" : "folds", className)}>
      <table>
        <caption className="sr-only">{caption}</caption>
        <DataTableHead
          columns={columns}
          order={order}
          ticks={onTickedChange !== undefined}
          onSort={(id) => table.getColumn(id)?.toggleSorting(undefined, false)}
        />
        <tbody ref={body} onKeyDown={onKeyDown}>
          {shown.map(({ key, row }) => (
            <DataTableRow
              key={key}
              id={key}
              row={row}
              columns={columns}
              picked={key === pickedKey}
              inTabOrder={key === tabKey}
              href={hrefOf?.(row)}
              ticked={onTickedChange === undefined ? undefined : (ticked?.has(key) ?? false)}
              tickLabel={tickLabel?.(row) ?? key}
              compact={compact}
              onTick={() => tick(key)}
              onFocus={() => setLast(key)}
              onPick={() => pick(row)}
              onOpen={() => open(row)}
            />
          ))}
        </tbody>
        {footer === undefined ? null : <tfoot>{footer}</tfoot>}
      </table>
    </div>
  );
}

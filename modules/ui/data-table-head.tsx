import clsx from "clsx";
import type { DataColumn, Sort } from "./data-table-columns";
import { Icon } from "./icon";

/** Head row: plain words, or a key where the column can be sorted. */
export function DataTableHead<Row>({
  columns,
  order,
  ticks,
  onSort,
}: {
  columns: readonly DataColumn<Row>[];
  order: Sort | null;
  ticks: boolean;
  onSort: (id: string) => void;
}) {
  return (
    <thead>
      <tr>
        {ticks ? (
          <th scope="col" className="chk">
            <span className="sr-only">Picked</span>
          </th>
        ) : null}
        {columns.map((c) => {
          const on = order?.column === c.id ? order : null;
          const sorted = on === null ? undefined : on.descending ? "descending" : "ascending";
          return (
            <th
              key={c.id}
              scope="col"
              className={clsx(c.align === "end" && "r", c.desktopOnly && "w2")}
              style={c.width === undefined ? undefined : { width: c.width }}
              aria-sort={sorted}
            >
              {c.sortBy === undefined ? (
                c.head
              ) : (
                <button type="button" onClick={() => onSort(c.id)}>
                  {c.head}
                  <Icon name={on?.descending ? "down" : "up"} size={12} weight={2.2} />
                </button>
              )}
            </th>
          );
        })}
      </tr>
    </thead>
  );
}

import clsx from "clsx";
import Link from "next/link";
import type { ReactNode } from "react";
import type { DataColumn } from "./data-table-columns";

/** One row: its cells for a wide screen and its two-line form for a phone, of which the stylesheet shows one. */
export function DataTableRow<Row>({
  id,
  row,
  columns,
  picked,
  inTabOrder,
  href,
  ticked,
  tickLabel,
  compact,
  onTick,
  onFocus,
  onPick,
  onOpen,
}: {
  id: string;
  row: Row;
  columns: readonly DataColumn<Row>[];
  picked: boolean;
  inTabOrder: boolean;
  href?: string;
  ticked?: boolean;
  tickLabel: string;
  compact?: (row: Row) => ReactNode;
  onTick: () => void;
  onFocus: () => void;
  onPick: () => void;
  onOpen: () => void;
}) {
  const short = compact?.(row);
  return (
    <tr
      data-key={id}
      tabIndex={inTabOrder ? 0 : -1}
      className={clsx(picked && "sel")}
      aria-current={picked || undefined}
      onFocus={onFocus}
      onClick={onPick}
      onDoubleClick={onOpen}
    >
      {ticked === undefined ? null : (
        <td className="chk">
          <label className="tick" onClick={(e) => e.stopPropagation()}>
            <input type="checkbox" checked={ticked} onChange={onTick} aria-label={tickLabel} />
          </label>
        </td>
      )}
      {columns.map((c) => (
        <td key={c.id} className={clsx(c.align === "end" && "r", c.figures && "q", c.desktopOnly && "w2", c.className)}>
          {c.primary && href !== undefined ? (
            <Link href={href} className="row-link">
              {c.cell(row)}
            </Link>
          ) : (
            c.cell(row)
          )}
        </td>
      ))}
      {short === undefined ? null : (
        <td className="dt-compact">{href === undefined ? <div>{short}</div> : <Link href={href}>{short}</Link>}</td>
      )}
    </tr>
  );
}

import clsx from "clsx";
import type { ReactNode } from "react";

/**
 * Title of a page, with its one row of keys at the right. `number` is the big dial numeral an order or paper is known by;
 * give `numberLabel` ("Order 2418, ") so that the heading reads whole. `close` when tabs follow right below.
 */
export function PageHead({
  title,
  sub,
  number,
  numberLabel,
  numberSize = "l",
  actions,
  actionsOnPhone = true,
  close = false,
  children,
}: {
  title: ReactNode;
  sub?: ReactNode;
  number?: string;
  numberLabel?: string;
  numberSize?: "m" | "l";
  actions?: ReactNode;
  /** False leaves the keys out below 900 px, where the page offers them elsewhere or not at all. */
  actionsOnPhone?: boolean;
  close?: boolean;
  /** Anything that stands right of the title instead of keys, e.g. figures. */
  children?: ReactNode;
}) {
  return (
    <div className={clsx("head", close && "close")}>
      {number === undefined ? null : (
        <span className={clsx("big-no", numberSize === "m" && "md")} aria-hidden={numberLabel === undefined ? undefined : true}>
          {number}
        </span>
      )}
      <div className="min-w-0">
        <h1>
          {numberLabel === undefined ? null : <span className="sr-only">{numberLabel} </span>}
          {title}
        </h1>
        {sub === undefined ? null : <div className="sub">{sub}</div>}
      </div>
      {actions === undefined ? null : <div className={clsx("act", !actionsOnPhone && "hide-s")}>{actions}</div>}
      {children === undefined ? null : <div className="ml-auto">{children}</div>}
    </div>
  );
}

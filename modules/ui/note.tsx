import clsx from "clsx";
import type { ReactNode } from "react";
import { Icon, type IconName } from "./icon";

/**
 * `warn`: an ink edge, you may pass it. `stop`: oxide, you may not. `info`: ink edge without the triangle.
 * `live` announces it when it appears after the page was read (a refusal, a lost link). Not more than two on a screen.
 */
export function Note({
  tone = "warn",
  icon,
  title,
  children,
  action,
  live = false,
  big = false,
  className,
}: {
  tone?: "warn" | "stop" | "info";
  icon?: IconName;
  title?: ReactNode;
  children?: ReactNode;
  /** A key or link at the right. */
  action?: ReactNode;
  live?: boolean;
  big?: boolean;
  className?: string;
}) {
  const name = icon ?? (tone === "info" ? "note" : "warn");
  return (
    <div className={clsx("note", tone === "stop" && "x", big && "big", className)} role={live ? (tone === "stop" ? "alert" : "status") : undefined}>
      <Icon name={name} size={big ? 26 : 20} />
      <div className="note-b">
        {title === undefined ? null : <b>{title}</b>}
        {title !== undefined && children !== undefined ? " " : null}
        {children}
      </div>
      {action}
    </div>
  );
}

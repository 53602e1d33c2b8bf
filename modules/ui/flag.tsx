import clsx from "clsx";
import type { ReactNode } from "react";
import { Icon, type IconName } from "./icon";

/**
 * Ink plate for what is due, late, short or a loss. At most one in a row. `open` outlined for a side fact ("+0.4 h"),
 * `live` fluid for what runs, `failed` oxide, which always carries the triangle.
 */
export function Flag({ tone = "ink", icon, children, className }: { tone?: "ink" | "open" | "live" | "failed"; icon?: IconName; children: ReactNode; className?: string }) {
  const shown: IconName | undefined = tone === "failed" ? "warn" : icon;
  return (
    <span className={clsx("flag", tone === "open" && "o", tone === "live" && "f", tone === "failed" && "x", className)}>
      {shown === undefined ? null : <Icon name={shown} size={13} />}
      {children}
    </span>
  );
}

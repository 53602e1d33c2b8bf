import clsx from "clsx";
import Link from "next/link";
import type { ReactNode } from "react";

/** Link in running text. `newTab` tells the reader so. */
export function TextLink({ href, newTab = false, children, className }: { href: string; newTab?: boolean; children: ReactNode; className?: string }) {
  if (newTab || /^(mailto|tel|https?):/.test(href)) {
    return (
      <a href={href} className={clsx("lk", className)} target={newTab ? "_blank" : undefined} rel={newTab ? "noopener" : undefined}>
        {children}
        {newTab ? <span className="sr-only"> (opens in a new tab)</span> : null}
      </a>
    );
  }
  return (
    <Link href={href} className={clsx("lk", className)}>
      {children}
    </Link>
  );
}

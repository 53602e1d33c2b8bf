import clsx from "clsx";
import Link from "next/link";

export interface View {
  key: string;
  label: string;
  href: string;
  /** Already worded for the place: "2,391". */
  count?: string | number;
  hideOnPhone?: boolean;
}

/** Saved views as tabs with counts. They are links, so Back and bookmarks work; on a phone they scroll in their own lane. */
export function Views({ label, views, current, className }: { label: string; views: readonly View[]; current: string; className?: string }) {
  return (
    <nav className={clsx("views", className)} aria-label={label}>
      {views.map((v) => (
        <Link key={v.key} href={v.href} scroll={false} aria-current={v.key === current ? "page" : undefined} className={clsx(v.hideOnPhone && "hide-s")}>
          {v.label}
          {v.count === undefined ? null : <span className="num">{v.count}</span>}
        </Link>
      ))}
    </nav>
  );
}

import Link from "next/link";
import type { Units } from "../domain/curve-measure";

/** The system of units of a page; it stands in the address. */
export function UnitSwitch({ current, choices }: { current: Units; choices: readonly { key: Units; label: string; href: string }[] }) {
  return (
    <nav aria-label="Units" className="bar mb-5">
      {choices.map((c) => <Link key={c.key} href={c.href} scroll={false} className="chip" aria-current={c.key === current ? "true" : undefined} data-on={c.key === current ? true : undefined}>{c.label}</Link>)}
    </nav>
  );
}

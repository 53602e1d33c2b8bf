import Link from "next/link";
import type { PortMark } from "../queries/sheet";

const WORDS = { empty: "not read", part: "in work", done: "done" } as const;

/** Ports of a head as keys: a full bar = done, half = in work. */
export function PortNav({ ports, current, href }: { ports: readonly PortMark[]; current: number; href: (cylinder: number) => string }) {
  if (ports.length < 2) return null;
  return (
    <nav className="ports" aria-label="Ports">
      {ports.map((p) => (
        <Link key={p.cylinder} href={href(p.cylinder)} aria-current={p.cylinder === current ? "page" : undefined} className={p.state === "done" ? "ok" : p.state === "part" ? "part" : undefined}>
          {p.cylinder}<span className="sr-only">, {WORDS[p.state]}</span>
        </Link>
      ))}
    </nav>
  );
}

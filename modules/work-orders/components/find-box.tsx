"use client";

import { keepPreviousData, useQuery } from "@tanstack/react-query";
import Link from "next/link";
import { useRouter } from "next/navigation";
import { useDeferredValue, useRef, useState, type KeyboardEvent } from "react";
import { getJson } from "@/modules/ui/fetch-json";
import { Icon } from "@/modules/ui/icon";
import { KeyHints } from "@/modules/ui/key-hints";
import { usePlace } from "@/modules/ui/place";
import { useHotkey } from "@/modules/ui/use-hotkey";
import type { Found, FoundAll, FoundKind } from "../queries/find";

const KINDS: readonly [FoundKind, string][] = [["piece", "Heads"], ["order", "Orders"], ["customer", "Customers"], ["part", "Parts"]];

/** One box for everything: type a scrap, walk the answers with the arrows; a scanned tag and Enter go straight to its head. */
export function FindBox({ initial, answers }: { initial: string; answers: FoundAll }) {
  const { slug } = usePlace();
  const router = useRouter();
  const [q, setQ] = useState(initial);
  const words = useDeferredValue(q.trim());
  const well = useRef<HTMLInputElement>(null);
  const list = useRef<HTMLDivElement>(null);
  useHotkey("F2", () => well.current?.select());
  const { data, isFetching, isError } = useQuery({
    queryKey: ["find", slug, words], queryFn: ({ signal }) => getJson<FoundAll>(`/api/v1/s/${slug}/find`, { q: words }, signal), placeholderData: keepPreviousData,
    enabled: words !== "", ...(words === initial.trim() ? { initialData: answers } : {}),
  });
  const rows: Found[] = words === "" ? [] : (data?.rows ?? []);
  const go = async () => {
    const text = q.trim();
    if (text === "") return;
    // A scanner types faster than the list answers: ask for exactly this before going.
    const now = await getJson<FoundAll>(`/api/v1/s/${slug}/find`, { q: text }).catch(() => null);
    const to = now?.exact ?? (now?.rows.length === 1 ? now.rows[0]?.href : undefined);
    if (to) router.push(to);
    else list.current?.querySelector("a")?.focus();
  };
  const walk = (event: KeyboardEvent) => {
    const step = event.key === "ArrowDown" ? 1 : event.key === "ArrowUp" ? -1 : 0;
    if (step === 0) return;
    event.preventDefault();
    const links = [...(list.current?.querySelectorAll("a") ?? [])];
    const at = links.findIndex((l) => l === document.activeElement);
    const next = at + step;
    if (next < 0) well.current?.focus();
    else links[Math.min(links.length - 1, next)]?.focus();
  };
  return (
    <div onKeyDown={walk}>
      <form role="search" onSubmit={(e) => { e.preventDefault(); void go(); }}>
        <label htmlFor="find" className="eng ink">Order, tag, name, casting, telephone or part</label>
        <span className="in mt-2" style={{ minHeight: 52, fontSize: "1.125rem", maxWidth: 720 }}>
          <Icon name="find" />
          <input ref={well} id="find" type="search" autoFocus autoComplete="off" spellCheck={false} value={q} onChange={(e) => setQ(e.target.value)} aria-controls="found" />
        </span>
      </form>
      <p className="sm dim mt-2" role="status">{words === "" ? "Scan a tag or type any scrap." : isError ? "The shop's records did not answer. Try again." : isFetching && rows.length === 0 ? "Looking…" : rows.length === 0 ? `Nothing is called “${words}”. Try less of it.` : `${rows.length} found`}</p>
      <div id="found" ref={list} className="bays mt-4" style={{ gridTemplateColumns: "repeat(auto-fit, minmax(280px, 1fr))" }}>
        {KINDS.map(([kind, label]) => {
          const of = rows.filter((r) => r.kind === kind);
          return of.length === 0 ? null : (
            <section key={kind}>
              <h2 className="eng ink">{label}</h2>
              <ul>
                {of.map((r) => (
                  <li key={r.id}>
                    <Link href={r.href} className="row-l" style={{ fontSize: "inherit" }}>
                      <span><b className="b">{r.title}</b><small>{r.detail}</small></span>
                    </Link>
                  </li>
                ))}
              </ul>
            </section>
          );
        })}
      </div>
      <div className="foot"><KeyHints hints={[{ keys: ["↑", "↓"], does: "walk" }, { keys: ["Enter"], does: "open" }, { keys: ["F2"], does: "back to the box" }]} /></div>
    </div>
  );
}

"use client";

import clsx from "clsx";
import { useId, useRef, useState, type KeyboardEvent, type MouseEvent } from "react";
import { SearchWell } from "@/modules/ui/search-well";
import { WORKING_GROUPS, WORKINGS, type WorkingGroup } from "../../workings/registry";
import { addressOf } from "../../workings/typed-inputs";

/** Functions whose title, name or purpose has every word typed. */
export function groupsFor(typed: string): WorkingGroup[] {
  const wanted = typed.toLowerCase().split(/\s+/).filter((w) => w !== "");
  return WORKING_GROUPS.map((g) => ({
    ...g, workings: g.workings.filter((w) => { const text = `${w.title} ${w.name} ${w.name.replaceAll("_", " ")} ${w.purpose} ${g.label}`.toLowerCase(); return wanted.every((word) => text.includes(word)); }),
  })).filter((g) => g.workings.length > 0);
}

/** Every function by group, with a search. Arrows walk the list, Enter opens; Enter in the search opens the first one found. */
export function WorkingsList({ current, onPick, className }: { current: string; onPick: (name: string) => void; className?: string }) {
  const [typed, setTyped] = useState("");
  const list = useRef<HTMLElement>(null);
  const search = useRef<HTMLInputElement>(null);
  const id = useId();
  const groups = groupsFor(typed);
  const links = () => [...(list.current?.querySelectorAll<HTMLAnchorElement>("a") ?? [])];
  const walk = (event: KeyboardEvent<HTMLElement>) => {
    const step = event.key === "ArrowDown" ? 1 : event.key === "ArrowUp" ? -1 : 0;
    if (step === 0) return;
    event.preventDefault();
    const all = links();
    const to = all.findIndex((a) => a === document.activeElement) + step;
    if (to < 0) search.current?.focus();
    else all[Math.min(to, all.length - 1)]?.focus();
  };
  const follow = (event: MouseEvent, name: string) => {
    // A working may be opened in a tab of its own, as any link.
    if (event.metaKey || event.ctrlKey || event.shiftKey || event.button !== 0) return;
    event.preventDefault();
    onPick(name);
  };
  return (
    <nav ref={list} className={clsx("wk-side noprint", className)} aria-label="Workings" onKeyDown={walk}>
      <SearchWell
        inputRef={search} label={`Find one of ${WORKINGS.length} workings`} placeholder="Leak, shim, ratio" value={typed} onChange={(e) => setTyped(e.target.value)}
        onKeyDown={(e) => { const first = groups[0]?.workings[0]; if (e.key === "Enter" && typed !== "" && first) { e.preventDefault(); onPick(first.name); } }}
      />
      <p className="sr-only" role="status">{typed === "" ? "" : `${groups.reduce((n, g) => n + g.workings.length, 0)} found`}</p>
      <div className="wk-list">
        {groups.length === 0 ? <p className="mid p-2">No working has these words.</p> : null}
        {groups.map((g) => (
          <section key={g.key} aria-labelledby={`${id}-${g.key}`}>
            <h2 id={`${id}-${g.key}`} className="eng">{g.label}</h2>
            <ul>{g.workings.map((w) => <li key={w.name}><a href={addressOf(w.name, {})} aria-current={w.name === current ? "page" : undefined} onClick={(e) => follow(e, w.name)}>{w.title}</a></li>)}</ul>
          </section>
        ))}
      </div>
    </nav>
  );
}

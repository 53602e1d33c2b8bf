"use client";

import clsx from "clsx";
import { useRef, useState, type FormEvent } from "react";
import { Icon } from "@/modules/ui/icon";
import { Note } from "@/modules/ui/note";
import type { BoardPerson, ClockBoard } from "../board";
import { PIN_DIGITS_MAX, PIN_DIGITS_MIN } from "../domain/pin-rules";
import type { KeptItem } from "./store";
import { useScanner, useUntouched } from "./use-ticking";
import type { AtTablet, useTablet } from "./use-tablet";
import { doing } from "./words";

type Tablet = ReturnType<typeof useTablet>;

/** Nobody at the tablet: a name and a PIN, or a badge. */
export function IdleScreen({ board, kept, linked, identify, press, onOpen, onTry }: {
  board: ClockBoard; kept: readonly KeptItem[]; linked: boolean; identify: Tablet["identify"]; press: Tablet["press"]; onOpen: (at: AtTablet) => void; onTry: () => void;
}) {
  const [picked, setPicked] = useState<BoardPerson | null>(null);
  const [pin, setPin] = useState("");
  const [badge, setBadge] = useState("");
  const [trouble, setTrouble] = useState<string | null>(null);
  const [busy, setBusy] = useState(false);
  const pinHead = useRef<HTMLHeadingElement>(null);
  const clear = () => { setPin(""); setTrouble(null); };
  useUntouched(20_000, () => { setPicked(null); clear(); setBadge(""); });

  const open = async (input: Parameters<Tablet["identify"]>[0], clocksIn: boolean) => {
    if (busy) return;
    setBusy(true);
    setTrouble(null);
    const found = await identify(input);
    if ("message" in found) setTrouble(found.message);
    else {
      if (clocksIn) {
        const said = await press(found.at, { press: "doorIn", word: "In", text: "at the door" });
        if (said.kind === "refused" && said.code !== "ALREADY_IN") setTrouble(said.message);
      }
      onOpen(found.at);
    }
    setPin("");
    setBusy(false);
  };
  useScanner((code) => void open({ kind: "badge", badge: code }, false), !busy);
  const isOut = picked !== null && picked.door === "out";
  const commit = () => {
    if (!picked) setTrouble("Touch your name first.");
    else if (pin.length < PIN_DIGITS_MIN) setTrouble(`A PIN has ${PIN_DIGITS_MIN} to ${PIN_DIGITS_MAX} digits.`);
    else void open({ kind: "pin", personId: picked.id, pin }, isOut);
  };
  const digit = (d: string) => { setTrouble(null); setPin((p) => (p.length < PIN_DIGITS_MAX ? p + d : p)); };
  const byBadge = (event: FormEvent) => {
    event.preventDefault();
    const code = badge.trim();
    setBadge("");
    if (code) void open({ kind: "badge", badge: code }, false);
  };
  const many = board.people.length > 6;
  return (
    <main id="main" className="k-cols">
      <section>
        <div className="k-h"><h1 className="eng">Who is working?</h1></div>
        <div className={clsx("k-people", many && "many")}>
          {board.people.map((p) => (
            <button key={p.id} type="button" className="k-row" aria-pressed={picked?.id === p.id} onClick={() => { setPicked(p); clear(); if (matchMedia("(max-width: 899px)").matches) pinHead.current?.scrollIntoView({ block: "start" }); }}>
              <span className="ini" aria-hidden="true">{p.initials}</span>
              <span className="min-w-0"><b>{p.name}</b><span className="mid block truncate">{doing(board, p)}</span></span>
            </button>
          ))}
        </div>
        {kept.length > 0 || !linked ? (
          <Note tone="info" icon="unplug" className="mt-3" title={kept.length === 1 ? "1 time waits here." : `${kept.length} times wait here.`} action={<button type="button" className="k-key" style={{ minHeight: 56 }} onClick={onTry}>Try now</button>}>
            Nothing is lost.
          </Note>
        ) : null}
        <form className="k-badge" onSubmit={byBadge}>
          <Icon name="badge" size={many ? 44 : 90} weight={1.2} />
          <span className="min-w-0 flex-1">
            <b>Or hold your badge to the reader.</b>
            <span className="mid block hide-s">It also works with gloves on.</span>
          </span>
          <label className="sr-only" htmlFor="badge">Badge code, typed</label>
          <input id="badge" value={badge} onChange={(e) => setBadge(e.target.value)} autoComplete="off" spellCheck={false} maxLength={100} placeholder="or type its code" />
        </form>
      </section>
      <section>
        <h2 ref={pinHead} className="eng ink mb-3 scroll-mt-4 text-center" style={{ fontSize: "0.9375rem" }}>{picked ? `PIN for ${picked.name}` : "PIN"}</h2>
        <div className="pin-dots" role="img" aria-label={`${pin.length} digits typed`}>
          {Array.from({ length: Math.max(PIN_DIGITS_MIN, pin.length) }, (_, i) => <i key={i} className={i < pin.length ? "f" : ""} />)}
        </div>
        <p role="alert" className={clsx("k-said", trouble && "on")}>{trouble ? <><Icon name="warn" size={22} /> <span>{trouble}</span></> : null}</p>
        <div className="pin" role="group" aria-label="Digits">
          {["1", "2", "3", "4", "5", "6", "7", "8", "9"].map((d) => <button key={d} type="button" onClick={() => digit(d)}>{d}</button>)}
          <button type="button" className="w" onClick={clear}>Clear</button>
          <button type="button" onClick={() => digit("0")}>0</button>
          <button type="button" className="w k1" onClick={commit}>{busy ? "Looking…" : isOut || !picked ? "Clock in" : "Open"}</button>
        </div>
      </section>
    </main>
  );
}

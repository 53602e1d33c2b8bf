"use client";

import { useQuery } from "@tanstack/react-query";
import Link from "next/link";
import { useRef, type KeyboardEvent } from "react";
import { decimal, hours, longDay, money, time } from "@/modules/kernel/format";
import { Dial, type DialName } from "@/modules/ui/dial";
import { getJson } from "@/modules/ui/fetch-json";
import { Icon } from "@/modules/ui/icon";
import { KeyHints } from "@/modules/ui/key-hints";
import { PageHead } from "@/modules/ui/page-head";
import { usePlace } from "@/modules/ui/place";
import { Status } from "@/modules/ui/status";
import { Tag } from "@/modules/ui/tag";
import { Tube } from "@/modules/ui/tube";
import { age } from "../domain/age";
import { shortNumber } from "../domain/short-number";
import type { FloorHead, FloorStation, FloorView } from "../queries/floor";

const POLL_MS = 15_000;
/** Heads shown at a station before the rest hides behind a link to the list. */
const MOST = 7;
const SPLIT: Record<string, [string, string]> = { "Counter in": ["Counter", "in"], "Counter out": ["Counter", "out"], "Bench before": ["Bench", "before"], "Bench after": ["Bench", "after"] };
/** Walking order is document order; the way back is laid from right to left. */
const AT = ["out-bound c1", "out-bound c2", "out-bound c3", "out-bound c4", "home-bound c4", "home-bound c3", "home-bound c2", "home-bound c1"];

/** The picture of the floor, looked at anew every quarter of a minute. */
export function FloorBoard({ initial }: { initial: FloorView }) {
  const place = usePlace();
  const { data, isError } = useQuery({
    queryKey: ["floor", place.slug], queryFn: ({ signal }) => getJson<FloorView>(`/api/v1/s/${place.slug}/floor`, {}, signal), initialData: initial, refetchInterval: POLL_MS,
  });
  const running = data.stations.flatMap((s) => s.heads).find((h) => h.running);
  return (
    <>
      <PageHead
        title={longDay(data.today, place.locale)}
        actions={<span className="hide-s"><KeyHints hints={[{ keys: ["←", "→"], does: "walk the line" }, { keys: ["Enter"], does: "open head" }]} /></span>}
      />
      <p className="sr-only" role="status">{isError ? `Not linked. What you see is of ${time(data.now, place)}.` : ""}</p>
      <div className="floor">
        <Today view={data} />
        <FloorMap view={data} running={running} stale={isError} />
      </div>
    </>
  );
}

function Today({ view }: { view: FloorView }) {
  const place = usePlace();
  return (
    <aside className="floor-left" aria-label="Needs a hand today">
      <section className="today">
        <h2 className="eng ink">Needs a hand today</h2>
        <Todo title="Promised today" dial="late" none="Nothing is promised for today." lines={view.promised.map((l) => ({ ...l, key: l.number }))} />
        <Todo title="Waiting for approval" dial="wait" none="Nobody owes us an answer." lines={view.waiting.map((w) => ({
          key: w.number, number: w.number, name: w.name,
          words: `${w.changeMinor !== null ? "Change" : "Estimate"}${w.totalMinor === null ? "" : ` ${money(w.changeMinor ?? w.totalMinor, place)}`}, ${w.isOpened ? "opened" : "not opened"}, ${age(w.since, view.now)}`,
        }))} />
        <Todo title="Parts short" dial="short" none="Every part is on the shelf." lines={view.short.map((l, i) => ({ ...l, key: `${l.number}${i}` }))} />
        <Todo title="Ready for pickup" dial="ready" none="The counter is clear." lines={view.ready.map((r) => ({
          key: r.number, number: r.number, name: r.name, words: r.leftMinor === null ? "At the counter" : r.leftMinor > 0 ? `${money(r.leftMinor, place)} to pay` : "Paid in full",
        }))} />
      </section>
    </aside>
  );
}

function Todo({ title, dial, none, lines }: { title: string; dial: DialName; none: string; lines: { key: string; number: string; name: string; words: string }[] }) {
  const { slug } = usePlace();
  return (
    <section className="todo">
      <header>
        <span className="num n-m">{lines.length}</span>
        <h3>{title}</h3>
        <Dial name={dial} size={20} />
      </header>
      {lines.length === 0 ? <p className="none">{none}</p> : (
        <ul>
          {lines.slice(0, 5).map((l) => (
            <li key={l.key}>
              <Link href={`/s/${slug}/orders/${l.number}`} aria-label={`${l.number}, ${l.name}, ${l.words}`}>
                <b className="q">{shortNumber(l.number)}</b>
                <span>{l.name}</span>
                <em>{l.words}</em>
              </Link>
            </li>
          ))}
        </ul>
      )}
      {lines.length > 5 ? <p className="none">and {lines.length - 5} more</p> : null}
    </section>
  );
}

function FloorMap({ view, running, stale }: { view: FloorView; running: FloorHead | undefined; stale: boolean }) {
  const place = usePlace();
  const map = useRef<HTMLDivElement>(null);
  const walk = (event: KeyboardEvent<HTMLDivElement>) => {
    const step = event.key === "ArrowRight" || event.key === "ArrowDown" ? 1 : event.key === "ArrowLeft" || event.key === "ArrowUp" ? -1 : 0;
    const heads = [...(map.current?.querySelectorAll<HTMLElement>("a.hd") ?? [])];
    const at = heads.findIndex((h) => h === document.activeElement);
    if (event.altKey || event.ctrlKey || event.metaKey || step === 0 || at === -1) return;
    event.preventDefault();
    heads[Math.min(heads.length - 1, Math.max(0, at + step))]?.focus();
  };
  const first = view.stations.flatMap((s) => s.heads)[0]?.pieceId;
  const sums: [string, string, boolean][] = [
    [String(view.headsHere), view.headsHere === 1 ? "head on the floor" : "heads on the floor", false],
    [`${hours(view.leftMinutes, place.locale)} h`, "still to work", false],
    [String(view.clocks), view.clocks === 1 ? "clock running" : "clocks running", true],
    ...(view.daysThrough === null ? [] : [[`${decimal(view.daysThrough, 1, place.locale)} days`, "counter to counter, last 30", true] as [string, string, boolean]]),
  ];
  return (
    <div className="map" ref={map} onKeyDown={walk}>
      <h2 className="eng ink">Where every head is</h2>
      {stale ? <span className="bay-r"><Icon name="unplug" size={16} /> Not linked since {time(view.now, place)}</span>
        : running ? <span className="bay-r"><Tag running>{running.tag}</Tag>&ensp;clock running</span>
        : view.onTheWay > 0 ? <span className="bay-r">{view.onTheWay} on the way in</span> : null}
      <p className="floor-sum">{sums.map(([n, words]) => `${n} ${words}`).join(" · ")}</p>
      <div className="room a" />
      <div className="room b" />
      {view.stations.slice(0, 4).map((s, i) => <StationColumn key={s.station} station={s} at={AT[i] ?? ""} now={view.now} first={first} />)}
      <div className="lane">
        <div className="loop">
          <span className="io" style={{ top: 0 }} aria-hidden="true">IN</span>
          <span className="io" style={{ bottom: 0 }} aria-hidden="true">OUT</span>
          {[24, 49, 74].map((left) => (
            <span key={left} aria-hidden="true">
              <span className="chev" style={{ left: `${left}%`, top: -2 }}><Icon name="right" size={18} /></span>
              <span className="chev" style={{ left: `${left}%`, bottom: -2 }}><Icon name="left" size={18} /></span>
            </span>
          ))}
          <div>
            {sums.map(([n, words, wide]) => <span key={words} className={wide ? "x" : undefined}><b className="num">{n}</b> {words}</span>)}
          </div>
        </div>
      </div>
      {view.stations.slice(4).map((s, i) => <StationColumn key={s.station} station={s} at={AT[i + 4] ?? ""} now={view.now} first={first} />)}
    </div>
  );
}

function StationColumn({ station, at, now, first }: { station: FloorStation; at: string; now: string; first: string | undefined }) {
  const { locale, slug } = usePlace();
  const [name, half] = SPLIT[station.station] ?? [station.station, ""];
  return (
    <section className={`stn ${at}`} aria-label={station.station}>
      <header>
        <span className="num n-m">{station.heads.length}</span>
        <h3>{name}{half === "" ? null : <small>{half}</small>}</h3>
        <span className="hrs q">{station.leftMinutes === 0 ? "–" : `${hours(station.leftMinutes, locale)} h`}</span>
      </header>
      {station.heads.length === 0 ? <p className="none">Nothing here.</p> : (
        <ul>{station.heads.slice(0, MOST).map((h) => <li key={h.pieceId}><HeadLink head={h} now={now} inTabOrder={h.pieceId === first} /></li>)}</ul>
      )}
      {station.heads.length > MOST ? <Link className="lk more" href={`/s/${slug}/orders?station=${encodeURIComponent(station.station)}`}>{station.heads.length - MOST} more</Link> : null}
    </section>
  );
}

function HeadLink({ head, now, inTabOrder }: { head: FloorHead; now: string; inTabOrder: boolean }) {
  const { locale, slug } = usePlace();
  const since = head.running?.since ?? head.since;
  // A time ahead (a cure) is no age.
  const old = since && since <= now ? age(since, now) : "";
  const worked = head.running ? head.running.workedMinutes + Math.max(0, Math.floor((Date.parse(now) - Date.parse(head.running.since)) / 60_000)) : 0;
  return (
    <Link className="hd" href={`/s/${slug}/orders/${head.orderNumber}`} tabIndex={inTabOrder ? 0 : -1}>
      <Tag running={head.running !== null}>{head.tag}</Tag>
      <Status dial={head.dial} className="hd-s">{head.word}</Status>
      <span className="hd-t q">{old}</span>
      <span className="hd-c">{head.customer}</span>
      {head.running && head.running.bookMinutes > 0 ? (
        <span className="hd-b">
          <span className="q">{hours(worked, locale)} of {hours(head.running.bookMinutes, locale)} h</span>
          <Tube value={worked} mark={head.running.bookMinutes} />
        </span>
      ) : null}
    </Link>
  );
}

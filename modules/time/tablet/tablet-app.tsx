"use client";

import { useCallback, useEffect, useState } from "react";
import { longDay, time } from "@/modules/kernel/format";
import { localDate } from "@/modules/kernel/instant";
import { KioskStrip } from "@/modules/ui/kiosk-strip";
import { WallClock } from "@/modules/ui/wall-clock";
import { EnrolScreen } from "./enrol-screen";
import { IdleScreen } from "./idle-screen";
import { PersonScreen } from "./person-screen";
import { useTablet, type AtTablet } from "./use-tablet";

/** The shop clock of one tablet: who is working, then that person's own screen, then nobody again. */
export function TabletApp() {
  const tablet = useTablet();
  const [at, setAt] = useState<AtTablet | null>(null);
  const lock = useCallback(() => setAt(null), []);
  useEffect(keepPage, []);
  const { board, state } = tablet;

  if (state === "not enrolled") return <EnrolScreen kept={tablet.kept.length} onEnrolled={() => void tablet.sync()} />;
  if (!board) {
    return (
      <div className="kiosk">
        <KioskStrip name="Clock" linked={tablet.unlinkedSince === null} clock="" />
        <main id="main" className="k-cols"><p role="status" className="text-h3 text-ink-2">{tablet.unlinkedSince === null ? "Fetching the shop." : "No link, and this tablet has not seen the shop yet. It tries again by itself."}</p></main>
      </div>
    );
  }
  const place = { locale: board.shop.locale, zone: board.shop.zone };
  const person = at ? board.people.find((p) => p.id === at.personId) : undefined;
  if (at && person) return <PersonScreen key={at.personId} tablet={{ ...tablet, board }} at={at} person={person} onLock={lock} />;
  const link = { linked: tablet.unlinkedSince === null, ...(tablet.unlinkedSince ? { since: time(tablet.unlinkedSince, place) } : {}) };
  return (
    <div className="kiosk">
      <KioskStrip name={board.device.name} sub={longDay(localDate(new Date(board.at), place.zone), place.locale)} {...link} clock={<WallClock place={place} initial={time(board.at, place)} />} />
      <IdleScreen board={board} kept={tablet.kept} linked={link.linked} identify={tablet.identify} press={tablet.press} onOpen={setAt} onTry={() => void tablet.sync()} />
    </div>
  );
}

/** Registers the keeper of the page and tells it which files the page is made of. */
function keepPage(): void {
  if (!("serviceWorker" in navigator)) return;
  void navigator.serviceWorker.register("/sw.js", { scope: "/clock" }).then(async () => {
    const ready = await navigator.serviceWorker.ready;
    const files = performance.getEntriesByType("resource").map((e) => e.name).filter((n) => n.startsWith(location.origin));
    ready.active?.postMessage({ files });
  }).catch(() => undefined);
}

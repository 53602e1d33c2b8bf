"use client";

import { useSyncExternalStore } from "react";
import { time, type Place } from "@/modules/kernel/format";

const subscribe = (tick: () => void) => {
  const timer = setInterval(tick, 1000);
  return () => clearInterval(timer);
};

/** The time on the wall of the shop, minutes. Renders `initial` (worded by the server) until the page is awake. */
export function WallClock({ place, initial }: { place: Pick<Place, "locale" | "zone">; initial: string }) {
  const text = useSyncExternalStore(
    subscribe,
    () => time(new Date(), place),
    () => initial,
  );
  return <time>{text}</time>;
}

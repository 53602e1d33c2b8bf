"use client";
import { useEffect, useRef } from "react";

/** A queue of typed values that are kept on this device until the records have them. */
interface KeptQueue {
  load(): Promise<void>;
  flush(): Promise<void>;
  snapshot(): { readonly waiting: number };
}
const EVERY_MS = 5_000;

/**
 * Sends what waits: at once, every few seconds while something waits, when the link is back, when the page is looked at again.
 * @param loaded what is to be done between taking up an earlier sitting's values and sending them.
 */
export function useSending(queue: KeptQueue, loaded?: () => void | Promise<void>): void {
  const between = useRef(loaded);
  useEffect(() => { between.current = loaded; });
  useEffect(() => {
    const again = () => void queue.flush();
    void queue.load().then(() => between.current?.()).then(again);
    const timer = setInterval(() => { if (queue.snapshot().waiting > 0) again(); }, EVERY_MS);
    window.addEventListener("online", again);
    document.addEventListener("visibilitychange", again);
    return () => {
      clearInterval(timer);
      window.removeEventListener("online", again);
      document.removeEventListener("visibilitychange", again);
    };
  }, [queue]);
}

"use client";

import { useEffect, useRef, useState } from "react";

/** The instant now, put right by the tablet's offset, anew every second. */
export function useNow(offsetMs = 0): number {
  const [now, setNow] = useState(() => Date.now());
  useEffect(() => {
    const timer = setInterval(() => setNow(Date.now()), 1000);
    return () => clearInterval(timer);
  }, []);
  return now + offsetMs;
}

/** Calls `over` after so long without a touch or a key. */
export function useUntouched(ms: number, over: () => void): void {
  const call = useRef(over);
  useEffect(() => { call.current = over; }, [over]);
  useEffect(() => {
    let timer = setTimeout(() => call.current(), ms);
    const touched = () => { clearTimeout(timer); timer = setTimeout(() => call.current(), ms); };
    const kinds = ["pointerdown", "keydown", "scroll"] as const;
    for (const k of kinds) window.addEventListener(k, touched, { capture: true, passive: true });
    return () => { clearTimeout(timer); for (const k of kinds) window.removeEventListener(k, touched, { capture: true }); };
  }, [ms]);
}

/** Letters that arrive faster than anybody types, ended by Enter, are a scanner's. Fields keep what is typed into them. */
export function useScanner(scanned: (code: string) => void, enabled = true): void {
  const call = useRef(scanned);
  useEffect(() => { call.current = scanned; }, [scanned]);
  useEffect(() => {
    if (!enabled) return;
    let code = "";
    let last = 0;
    const onKey = (event: KeyboardEvent) => {
      if (event.target instanceof HTMLInputElement || event.target instanceof HTMLTextAreaElement || event.ctrlKey || event.altKey || event.metaKey) return;
      if (event.timeStamp - last > 80) code = "";
      last = event.timeStamp;
      if (event.key === "Enter" && code.length >= 3) {
        event.preventDefault();
        call.current(code);
        code = "";
      } else if (event.key.length === 1) code += event.key;
    };
    window.addEventListener("keydown", onKey, { capture: true });
    return () => window.removeEventListener("keydown", onKey, { capture: true });
  }, [enabled]);
}

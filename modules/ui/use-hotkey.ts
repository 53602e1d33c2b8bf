"use client";

import { useEffect, useRef } from "react";
import { matches, parseCombo } from "./hotkey";

/**
 * Calls `run` when the combination ("F2", "Alt+3") is pressed anywhere, also inside a field: these keys type nothing.
 * Silent while a dialog is open. `undefined` listens to nothing.
 */
export function useHotkey(combo: string | undefined, run: () => void, { enabled = true }: { enabled?: boolean } = {}): void {
  const latest = useRef(run);
  useEffect(() => {
    latest.current = run;
  });
  useEffect(() => {
    if (combo === undefined || !enabled) return;
    const wanted = parseCombo(combo);
    const onKey = (event: KeyboardEvent) => {
      if (event.defaultPrevented || event.repeat || !matches(wanted, event)) return;
      if (document.querySelector('[role="dialog"],[role="alertdialog"]') !== null) return;
      event.preventDefault();
      latest.current();
    };
    window.addEventListener("keydown", onKey);
    return () => window.removeEventListener("keydown", onKey);
  }, [combo, enabled]);
}

"use client";

import clsx from "clsx";
import { createContext, useCallback, useContext, useEffect, useMemo, useRef, useState, type ReactNode } from "react";
import { Icon } from "./icon";
import { Countdown, TOAST_MS, TOAST_UNDO_MS } from "./toast-timer";

export interface Toast {
  /** Past tense: "2418-A moved to Seats". Never an error that needs work: that stays on the page. */
  text: string;
  /** Shown for 10 s. `label` defaults to "Undo". */
  undo?: { label?: string; run: () => void };
  /** `failed`: something done elsewhere went wrong ("Text was not delivered"), oxide with the triangle. */
  tone?: "done" | "failed";
}

interface Shown extends Toast {
  id: number;
}

const ToastContext = createContext<((toast: Toast) => void) | null>(null);

/** `const toast = useToast(); toast({ text: "Order 2418 opened" })`. */
export function useToast(): (toast: Toast) => void {
  const push = useContext(ToastContext);
  if (push === null) throw new Error("useToast needs a ToastProvider above it");
  return push;
}

/** Goes once around the app. Holds the live region, which must exist before anything is said in it. */
export function ToastProvider({ children, closeLabel = "Close" }: { children: ReactNode; closeLabel?: string }) {
  const [shown, setShown] = useState<readonly Shown[]>([]);
  const next = useRef(0);
  const push = useCallback((toast: Toast) => {
    next.current += 1;
    const id = next.current;
    // Three at most: the oldest goes first.
    setShown((list) => [...list.slice(-2), { ...toast, id }]);
  }, []);
  const drop = useCallback((id: number) => setShown((list) => list.filter((t) => t.id !== id)), []);
  const value = useMemo(() => push, [push]);
  return (
    <ToastContext value={value}>
      {children}
      <div className="toasts" role="status" aria-live="polite" aria-atomic="false" aria-relevant="additions">
        {shown.map((t) => (
          <ToastPlate key={t.id} toast={t} closeLabel={closeLabel} onDone={() => drop(t.id)} />
        ))}
      </div>
    </ToastContext>
  );
}

function ToastPlate({ toast, closeLabel, onDone }: { toast: Shown; closeLabel: string; onDone: () => void }) {
  const done = useRef(onDone);
  useEffect(() => {
    done.current = onDone;
  });
  const countdown = useRef<Countdown | null>(null);
  const hasUndo = toast.undo !== undefined;
  useEffect(() => {
    const c = new Countdown(hasUndo ? TOAST_UNDO_MS : TOAST_MS, () => done.current());
    countdown.current = c;
    c.run();
    return () => c.hold();
  }, [hasUndo]);
  const hold = () => countdown.current?.hold();
  const run = () => countdown.current?.run();
  const failed = toast.tone === "failed";
  return (
    <div className={clsx("toast", failed && "x")} onMouseEnter={hold} onMouseLeave={run} onFocus={hold} onBlur={run}>
      <Icon name={failed ? "warn" : "check"} weight={failed ? 1.6 : 2} />
      <span>{toast.text}</span>
      <span className="toast-act">
        {toast.undo === undefined ? null : (
          <button
            type="button"
            onClick={() => {
              toast.undo?.run();
              onDone();
            }}
          >
            {toast.undo.label ?? "Undo"}
          </button>
        )}
        <button type="button" aria-label={closeLabel} onClick={onDone}>
          <Icon name="x" size={16} />
        </button>
      </span>
    </div>
  );
}

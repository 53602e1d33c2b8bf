import clsx from "clsx";
import type { ReactNode } from "react";

export interface Station {
  key: string;
  label: string;
  note?: ReactNode;
}

/**
 * Stations as one tube, filled to the middle of the current one. `now` is the index of the current station: -1 before the
 * first, `stations.length` when all are passed. Stations that do not apply stay in the row, they are passed.
 * `variant="steps"` draws a paper's steps: a tick between, filled whole, no pointer.
 */
export function LineStrip({ stations, now, label, variant = "line" }: { stations: readonly Station[]; now: number; label: string; variant?: "line" | "steps" }) {
  return (
    <div className="strip-lane" tabIndex={0} role="group" aria-label={label}>
      <ol className={clsx("strip", variant === "steps" && "steps")}>
        {stations.map((s, i) => (
          <li
            key={s.key}
            className={clsx(i < now && "done", i === now && (variant === "line" ? "now" : "done"))}
            aria-current={i === now ? "step" : undefined}
          >
            <b>{s.label}</b>
            {s.note === undefined ? null : <small>{s.note}</small>}
            {i < now ? <span className="sr-only">, passed</span> : null}
          </li>
        ))}
      </ol>
    </div>
  );
}

import clsx from "clsx";
import { Fragment, type ReactNode } from "react";

export type Pair = readonly [name: string, value: ReactNode];

/** Names and values. `end` sets the values at the right edge. */
export function Kv({ pairs, end = false, className }: { pairs: readonly Pair[]; end?: boolean; className?: string }) {
  return (
    <dl className={clsx("kv", end && "r", className)}>
      {pairs.map(([name, value]) => (
        <Fragment key={name}>
          <dt>{name}</dt>
          <dd>{value}</dd>
        </Fragment>
      ))}
    </dl>
  );
}

export interface SumLine {
  name: ReactNode;
  value: ReactNode;
  /** A total: an ink rule above it. */
  total?: boolean;
}

/** A column of amounts that adds up. */
export function SumList({ lines, className }: { lines: readonly SumLine[]; className?: string }) {
  return (
    <dl className={clsx("sum", className)}>
      {lines.map((l, i) => (
        <Fragment key={i}>
          <dt className={clsx(l.total && "tot")}>{l.name}</dt>
          <dd className={clsx(l.total && "tot")}>{l.value}</dd>
        </Fragment>
      ))}
    </dl>
  );
}

/** Named figures in one row under a page head. */
export function Facts({ facts, className }: { facts: readonly { label: string; value: ReactNode }[]; className?: string }) {
  return (
    <div className={clsx("facts", className)}>
      {facts.map((f) => (
        <div key={f.label}>
          <span className="eng">{f.label}</span>
          {f.value}
        </div>
      ))}
    </div>
  );
}

/** Big narrow figures side by side in one frame, each over its unit. */
export function Figures({ figures, keep = false, className }: { figures: readonly { value: ReactNode; unit: ReactNode }[]; keep?: boolean; className?: string }) {
  return (
    <div className={clsx("figures", keep && "keep", className)}>
      {figures.map((f, i) => (
        <div key={i}>
          <span className="num n-m">{f.value}</span>
          <span className="unit">{f.unit}</span>
        </div>
      ))}
    </div>
  );
}

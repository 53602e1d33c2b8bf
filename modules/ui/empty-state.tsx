import type { ReactNode } from "react";
import { Icon } from "./icon";

/** The empty loop in one stroke, one sentence on how things get here, one key. */
export function EmptyState({ title, children, action, level = 2 }: { title: string; children?: ReactNode; action?: ReactNode; level?: 2 | 3 }) {
  const Heading = level === 2 ? "h2" : "h3";
  return (
    <div className="empty">
      <svg width="120" height="52" viewBox="0 0 120 52" fill="none" stroke="currentColor" strokeWidth="1.5" aria-hidden="true">
        <path d="M4 8h86a18 18 0 0 1 0 36H4M4 18h86a8 8 0 0 1 0 16H4" />
      </svg>
      <Heading>{title}</Heading>
      {children === undefined ? null : <div className="mid">{children}</div>}
      {action}
    </div>
  );
}

/** What happened, what is safe, one way on. `reference` is shown so that it can be read out over the phone. */
export function ErrorState({ title, children, action, reference, level = 2 }: { title: string; children?: ReactNode; action?: ReactNode; reference?: string; level?: 2 | 3 }) {
  const Heading = level === 2 ? "h2" : "h3";
  return (
    <div className="empty" role="alert">
      <Icon name="unplug" size={44} weight={1.1} />
      <Heading>{title}</Heading>
      {children === undefined ? null : <div className="mid">{children}</div>}
      {action}
      {reference === undefined ? null : <p className="sm dim mt-2.5">Reference {reference}</p>}
    </div>
  );
}

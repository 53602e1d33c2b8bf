import type { ReactNode } from "react";

/** A wide table in its own lane: where it has to scroll sideways, the keyboard can do it too. */
export const Lane = ({ label, children }: { label: string; children: ReactNode }) => (
  <div className="lane-x relative" role="group" aria-label={label} tabIndex={0}>{children}</div>
);

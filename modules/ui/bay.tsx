import clsx from "clsx";
import { useId, type ReactNode } from "react";

/**
 * Front-panel bracket: a hairline with the engraved label in a break of the line. `aside` (a link or a count) stands in
 * the break at the right. `flush` lets a table run to the edges. Never nest a bay in a bay.
 */
export function Bay({
  label,
  aside,
  flush = false,
  level = 2,
  className,
  children,
}: {
  label: ReactNode;
  aside?: ReactNode;
  flush?: boolean;
  level?: 2 | 3;
  className?: string;
  children: ReactNode;
}) {
  const id = useId();
  const Heading = level === 2 ? "h2" : "h3";
  return (
    <section className={clsx("bay", flush && "flush", className)} aria-labelledby={id}>
      <Heading id={id} className="eng ink">
        {label}
      </Heading>
      {aside === undefined ? null : <div className="bay-r">{aside}</div>}
      {children}
    </section>
  );
}

/** Column or grid of bays with the spacing their labels need. */
export const Bays = ({ className, children }: { className?: string; children: ReactNode }) => (
  <div className={clsx("bays", className)}>{children}</div>
);

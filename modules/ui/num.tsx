import clsx from "clsx";
import type { ReactNode } from "react";

/** Dial numeral. `size` s 22, m 36, l 56, xl 96 px; without it the numeral keeps the size of its text. */
export function Num({ children, size, unit, className }: { children: ReactNode; size?: "s" | "m" | "l" | "xl"; unit?: ReactNode; className?: string }) {
  return (
    <span className={clsx("nw", className)}>
      <span className={clsx("num", size !== undefined && `n-${size}`)}>{children}</span>
      {unit === undefined ? null : (
        <>
          {" "}
          <span className="unit">{unit}</span>
        </>
      )}
    </span>
  );
}

/**
 * Money, already worded by the kernel's `money` or `amount`. A negative one takes oxide only with `owed`, where it is a
 * thing to act on; elsewhere the minus sign says enough.
 */
export function MoneyNumber({ children, size, owed = false, className }: { children: string; size?: "s" | "m" | "l" | "xl"; owed?: boolean; className?: string }) {
  return <span className={clsx("nw", size === undefined ? "q" : ["num", `n-${size}`], owed && "neg", className)}>{children}</span>;
}

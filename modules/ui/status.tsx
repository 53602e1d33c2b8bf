import clsx from "clsx";
import type { ReactNode } from "react";
import { Dial, type DialName } from "./dial";

/** A dial and its word. The word is required: a dot alone says nothing. */
export function Status({ dial, children, size = 16, dim = false, className }: { dial: DialName; children: ReactNode; size?: number; dim?: boolean; className?: string }) {
  return (
    <span className={clsx("st", dim && "dim", className)}>
      <Dial name={dial} size={size} />
      <span>{children}</span>
    </span>
  );
}

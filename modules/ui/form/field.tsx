import clsx from "clsx";
import type { ReactNode } from "react";
import { Icon } from "../icon";

/**
 * Label above, control, hint, error with the triangle under it. Presentational: the inputs of this folder fill it; use it
 * directly for a control of your own and give the control `id`, `${id}-hint` and `${id}-err` as described.
 */
export function Field({
  id,
  label,
  hint,
  error,
  optional = false,
  hideLabel = false,
  className,
  children,
}: {
  id: string;
  label: string;
  hint?: string;
  error?: string;
  optional?: boolean;
  hideLabel?: boolean;
  className?: string;
  children: ReactNode;
}) {
  return (
    <div className={clsx("field", className)}>
      <label id={`${id}-label`} htmlFor={id} className={clsx(hideLabel && "sr-only")}>
        {label}
        {optional ? <span className="opt"> (optional)</span> : null}
      </label>
      {children}
      <FieldFoot id={id} hint={hint} error={error} />
    </div>
  );
}

/** Hint and error under a control. */
export function FieldFoot({ id, hint, error }: { id: string; hint?: string; error?: string }) {
  return (
    <>
      {error === undefined ? null : (
        <div className="err" id={`${id}-err`}>
          <Icon name="warn" size={16} />
          <span>{error}</span>
        </div>
      )}
      {hint === undefined ? null : (
        <div className="hint" id={`${id}-hint`}>
          {hint}
        </div>
      )}
    </>
  );
}

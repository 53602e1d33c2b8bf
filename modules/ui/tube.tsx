import clsx from "clsx";
import type { CSSProperties } from "react";
import { tubeFill } from "./tube-fill";

/**
 * One value against one mark. `label` is the sentence for a screen reader ("5.7 of 8 hours"); leave it out only when the
 * same words stand beside the tube, which is then hidden from screen readers.
 * `progress` makes it a progress bar that is announced as such.
 */
export function Tube({
  value,
  mark,
  label,
  size = "m",
  progress = false,
  className,
}: {
  value: number;
  mark: number;
  label?: string;
  size?: "m" | "big" | "xl";
  progress?: boolean;
  className?: string;
}) {
  const { fill, mark: at, over } = tubeFill(value, mark);
  const vars = { "--v": `${fill.toFixed(1)}%`, "--m": `${at.toFixed(1)}%`, "--o": `${over.toFixed(1)}%` } as CSSProperties;
  const aria = progress
    ? ({ role: "progressbar", "aria-valuemin": 0, "aria-valuenow": value, "aria-valuemax": mark, "aria-label": label } as const)
    : label === undefined
      ? ({ "aria-hidden": true } as const)
      : ({ role: "img", "aria-label": label } as const);
  return (
    <span className={clsx("tube", size !== "m" && size, className)} style={vars} {...aria}>
      {fill > 0 ? <i /> : null}
      {over > 0 ? (
        <>
          <u />
          <s />
        </>
      ) : null}
    </span>
  );
}

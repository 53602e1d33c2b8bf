export interface TubeFill {
  /** Fluid, percent of the tube's length. */
  readonly fill: number;
  /** Where the mark stands, percent. */
  readonly mark: number;
  /** Hatched part past the mark, percent. */
  readonly over: number;
}

/**
 * A tube holds whichever is larger, the value or its mark; below the mark the fluid stops short, past it the rest is hatched.
 * Both in the same unit. A negative or non-finite value counts as none; a mark of none leaves a full tube unhatched.
 */
export function tubeFill(value: number, mark: number): TubeFill {
  const clean = (n: number) => (Number.isFinite(n) && n > 0 ? n : 0);
  const v = clean(value);
  const m = clean(mark);
  const span = Math.max(v, m);
  if (span === 0) return { fill: 0, mark: 100, over: 0 };
  if (m === 0) return { fill: 100, mark: 100, over: 0 };
  return { fill: (Math.min(v, m) / span) * 100, mark: (m / span) * 100, over: (Math.max(0, v - m) / span) * 100 };
}

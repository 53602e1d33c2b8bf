/** A drawing as plain numbers, for vectors on paper as well as on screen. Pixels, y grows downward. */
export type Segment =
  | { readonly kind: "move"; readonly x: number; readonly y: number }
  | { readonly kind: "line"; readonly x: number; readonly y: number }
  /** Cubic with two handles. */
  | {
      readonly kind: "curve";
      readonly x1: number;
      readonly y1: number;
      readonly x2: number;
      readonly y2: number;
      readonly x: number;
      readonly y: number;
    }
  | { readonly kind: "close" };

/** Hundredths of a pixel are enough and keep screen and server text equal. */
export const px = (value: number): number => {
  const rounded = Math.round(value * 100) / 100;
  return rounded === 0 ? 0 : rounded;
};

/** The segments as the `d` of an SVG path. Source: W3C SVG 2, path data. */
export const pathText = (segments: readonly Segment[]): string =>
  segments
    .map((s) => {
      if (s.kind === "close") return "Z";
      if (s.kind === "curve") return `C${px(s.x1)} ${px(s.y1)} ${px(s.x2)} ${px(s.y2)} ${px(s.x)} ${px(s.y)}`;
      return `${s.kind === "move" ? "M" : "L"}${px(s.x)} ${px(s.y)}`;
    })
    .join("");

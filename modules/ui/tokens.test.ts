import { describe, expect, it } from "vitest";
import { dark, light, paper, type ColorToken } from "./tokens";

/** Relative luminance and contrast ratio. Source: WCAG 2.2, definitions of "relative luminance" and "contrast ratio". */
const luminance = (hex: string): number => {
  const [r, g, b] = [1, 3, 5].map((i) => {
    const c = parseInt(hex.slice(i, i + 2), 16) / 255;
    return c <= 0.04045 ? c / 12.92 : ((c + 0.055) / 1.055) ** 2.4;
  }) as [number, number, number];
  return 0.2126 * r + 0.7152 * g + 0.0722 * b;
};
const contrast = (a: string, b: string): number => {
  const [hi, lo] = [luminance(a), luminance(b)].sort((x, y) => y - x) as [number, number];
  return (hi + 0.05) / (lo + 0.05);
};

describe("the formula itself", () => {
  it("gives 21 for black on white and 1 for equals", () => {
    expect(contrast("#000000", "#FFFFFF")).toBeCloseTo(21, 5);
    expect(contrast("#66746E", "#66746E")).toBe(1);
  });
  it("gives 4.54 for #767676 on white, the lightest grey that passes AA", () => {
    expect(contrast("#767676", "#FFFFFF")).toBeCloseTo(4.54, 2);
    expect(contrast("#777777", "#FFFFFF")).toBeLessThan(4.5);
  });
});

// 4.5 : 1 for text (success criterion 1.4.3), 3 : 1 for edges of controls (1.4.11).
const text: readonly [ColorToken, ColorToken][] = [
  ...(["ink", "ink-2", "ink-3"] as const).flatMap((i) => (["panel", "panel-2", "plate", "well"] as const).map((g) => [i, g] as const)),
  ["on-fluid", "fluid"], ["ink", "fluid-2"], ["on-key", "key"], ["on-key", "key-hover"], ["panel", "ink"],
  ["enamel", "panel"], ["enamel", "plate"], ["enamel", "well"], ["enamel", "oxide-wash"],
  ["oxide", "panel"], ["oxide", "plate"], ["oxide", "oxide-wash"], ["ink", "oxide-wash"],
].map((pair) => pair as [ColorToken, ColorToken]);
const edges: readonly [ColorToken, ColorToken][] = [["line-2", "panel"], ["line-2", "panel-2"], ["line-2", "plate"], ["line-2", "well"], ["ink", "fluid"], ["oxide", "well"]];

describe.each([["light", light], ["dark", dark], ["paper", paper]] as const)("contrast on the %s ground", (ground, set) => {
  it.each(text)("%s on %s reads", (fore, back) => {
    expect(contrast(set[fore], set[back])).toBeGreaterThanOrEqual(4.5);
  });
  // In the dark, ink is light: fluid there is told apart from the ground itself.
  it.each(edges.filter(([a, b]) => !(ground === "dark" && a === "ink" && b === "fluid")))("%s edges %s", (fore, back) => {
    expect(contrast(set[fore], set[back])).toBeGreaterThanOrEqual(3);
  });
});

it("fluid stands out from the dark ground without an edge", () => {
  expect(contrast(dark.fluid, dark.panel)).toBeGreaterThanOrEqual(3);
  expect(contrast(dark.fluid, dark.well)).toBeGreaterThanOrEqual(3);
});

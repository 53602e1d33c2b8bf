/**
 * The one place design tokens live. Read by tailwind.config.ts (which writes them as CSS variables), by charts and by
 * paper templates, where CSS variables mean nothing and the plain values are needed.
 * Contrast ratios beside the colours are WCAG 2.x ratios against panel, plate and well, in that order.
 */
export const light = {
  /** Face plate: the page ground. */
  panel: "#DDE6E0",
  /** Recess: rail, rooms, key strip. */
  "panel-2": "#CAD6CF",
  /** Raised plate: picked row, note. */
  plate: "#EFF4F0",
  /** Anything you type into. */
  well: "#FFFFFF",
  ink: "#101715", // 14.3 · 16.3 · 18.2
  "ink-2": "#35413D", // 8.3 · 9.6 · 10.6
  "ink-3": "#4F5C57", // 5.5 · 6.3 · 7.0, on panel-2 4.7
  /** Hairline; never the only cue. */
  line: "#AAB9B1",
  /** Edge of a control: 3.8 · 4.4 · 4.9. */
  "line-2": "#66746E",
  /** Live quantity, you-are-here. A fill edged in ink, never text: 1.0 on panel. */
  fluid: "#DDF02A",
  /** Fluid, thinned: 15.8 under ink. */
  "fluid-2": "#EDF69A",
  "on-fluid": "#101715",
  /** Line at the head of a fill inside a tube; the dark ground needs none. */
  "fluid-edge": "#101715",
  /** Edge round a fluid tag or plate. */
  "fluid-rim": "#101715",
  /** Things you can follow: 7.3 · 8.4 · 9.3. */
  enamel: "#0D5045",
  /** Failed and invalid only, always with the triangle: 6.4 · 7.3 · 8.2. */
  oxide: "#96250F",
  "oxide-wash": "#F5E2DA",
  /** Filled control: 17.0 with its text. */
  key: "#101715",
  "key-hover": "#35413D",
  "on-key": "#F4F8F5",
  "key-notch": "#DDF02A",
} as const;

export type ColorToken = keyof typeof light;

export const dark = {
  panel: "#0D1413",
  "panel-2": "#161F1D",
  plate: "#1B2523",
  well: "#070C0B",
  ink: "#EDF4EF", // 16.7 · 14.1 · 17.6
  "ink-2": "#BDCAC4", // 11.0 · 9.3 · 11.6
  "ink-3": "#93A29B", // 7.0 · 5.9 · 7.4
  line: "#33413D",
  "line-2": "#71827B", // 4.6 · 3.9
  fluid: "#DDF02A",
  "fluid-2": "#5B6315",
  "on-fluid": "#101715",
  "fluid-edge": "transparent",
  "fluid-rim": "#DDF02A",
  enamel: "#93E2CD", // 12.4
  oxide: "#FFA188", // 9.5
  "oxide-wash": "#3A1B13",
  key: "#EDF4EF",
  "key-hover": "#BDCAC4",
  "on-key": "#0D1413",
  "key-notch": "#7E8B00",
} as const satisfies Record<ColorToken, string>;

/** White paper: the light set on white stock, with hairlines that survive a mono printer. */
export const paper = {
  ...light,
  panel: "#FFFFFF",
  "panel-2": "#FFFFFF",
  plate: "#FFFFFF",
  line: "#C2CEC7",
} as const satisfies Record<ColorToken, string>;

/** Shadows that differ by ground. Only things that truly float (dialog, menu, toast) cast `float`. */
export const lightShadow = {
  engrave: "0 1px 0 rgb(255 255 255/.65)",
  sunk: "inset 0 1px 2px rgb(16 23 21/.10)",
  float: "0 1px 0 rgb(16 23 21/.2),0 14px 34px -10px rgb(16 23 21/.38)",
} as const;

const darkShadow = {
  engrave: "0 -1px 0 rgb(0 0 0/.7)",
  sunk: "inset 0 1px 3px rgb(0 0 0/.6)",
  float: "0 0 0 1px #33413D,0 18px 44px rgb(0 0 0/.7)",
} as const satisfies Record<keyof typeof lightShadow, string>;

/** Type scale, rem. `num-*` are the narrow dial numerals. */
export const typeScale = {
  label: ".75rem",
  small: ".8125rem",
  table: ".875rem",
  body: ".9375rem",
  lead: "1.0625rem",
  h3: "1.25rem",
  h1: "1.75rem",
  "num-s": "1.375rem",
  "num-m": "2.25rem",
  "num-l": "3.5rem",
  "num-xl": "6rem",
} as const;

/** Numerals stand narrow, like a dial face; table figures a little wider. */
const stretch = { num: "75%", table: "88%" } as const;

/** 4 px pitch, px. `gutter`, `row` and `ctl` change with the screen; see `touchSize` and `phoneSize`. */
const space = { 1: 4, 2: 8, 3: 12, 4: 16, 5: 24, 6: 32, 7: 48, 8: 64 } as const;

export const size = { row: "38px", ctl: "40px", touch: "64px", gutter: "24px" } as const;
/** Any coarse pointer. */
const touchSize = { row: "48px", ctl: "48px" } as const;
/** Below 900 px. */
const phoneSize = { gutter: "16px" } as const;

/** Control, bay, sheet. */
export const radius = { 1: "3px", 2: "5px", 3: "10px" } as const;
const rule = { hair: "1px", rule: "1.5px", heavy: "2.5px" } as const;

/** Press, move, one filling of a tube. All 0 when less motion is asked for. */
export const motion = { tap: "80ms", move: "160ms", fill: "420ms" } as const;
export const ease = "cubic-bezier(.2,.7,.2,1)";

/** A fluid gap inside an ink ring: seen on panel, plate, well, key and on fluid itself. */
const ring = "0 0 0 2px var(--fluid),0 0 0 4.5px var(--ink)";

export const screens = { phoneMax: 899, tabletMax: 1279 } as const;

export const cssVar = (token: ColorToken): string => `var(--${token})`;

const prefixed = (set: Readonly<Record<string, string>>, prefix = ""): Record<string, string> =>
  Object.fromEntries(Object.entries(set).map(([name, value]) => [`--${prefix}${name}`, value]));

/** Every variable of the light ground, with the sizes, type and motion that both grounds share. */
export const rootVars = (): Record<string, string> => ({
  ...prefixed(light),
  ...prefixed(lightShadow),
  ...prefixed(typeScale, "t-"),
  ...prefixed(stretch, "w-"),
  ...Object.fromEntries(Object.entries(space).map(([n, px]) => [`--s${n}`, `${px}px`])),
  ...prefixed(size),
  ...Object.fromEntries(Object.entries(radius).map(([n, v]) => [`--r${n}`, v])),
  ...prefixed(rule),
  ...prefixed(motion, "m-"),
  "--ease": ease,
  "--ring": ring,
  "--hatch": "repeating-linear-gradient(135deg,var(--ink) 0 1.25px,transparent 1.25px 5px)",
  "--hatch-soft": "repeating-linear-gradient(135deg,var(--line) 0 1.25px,transparent 1.25px 6px)",
});

export const darkVars = (): Record<string, string> => ({ ...prefixed(dark), ...prefixed(darkShadow) });
export const paperVars = (): Record<string, string> => ({ ...prefixed(paper), ...prefixed(lightShadow) });
export const touchVars = (): Record<string, string> => prefixed(touchSize);
export const phoneVars = (): Record<string, string> => prefixed(phoneSize);
export const stillVars = (): Record<string, string> =>
  Object.fromEntries(Object.keys(motion).map((name) => [`--m-${name}`, "0ms"]));

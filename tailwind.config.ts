import type { Config } from "tailwindcss";
import plugin from "tailwindcss/plugin";
import {
  cssVar,
  darkVars,
  ease,
  light,
  motion,
  paperVars,
  phoneVars,
  radius,
  rootVars,
  screens,
  size,
  stillVars,
  touchVars,
  typeScale,
  type ColorToken,
} from "./modules/ui/tokens";

const colors = Object.fromEntries((Object.keys(light) as ColorToken[]).map((t) => [t, cssVar(t)]));
const fontSize = Object.fromEntries(Object.keys(typeScale).map((t) => [t, `var(--t-${t})`]));
const sizes = Object.fromEntries(Object.keys(size).map((t) => [t, `var(--${t})`]));
const moves = Object.fromEntries(Object.keys(motion).map((t) => [t, `var(--m-${t})`]));

export default {
  content: ["./app/**/*.{ts,tsx}", "./modules/**/*.{ts,tsx}"],
  darkMode: ["selector", '[data-theme="dark"]'],
  theme: {
    extend: {
      colors,
      fontSize,
      fontFamily: { sans: "var(--face)", face: "var(--face)", cut: "var(--cut)" },
      // The numbered scale is Tailwind's own 4 px pitch; these are the sizes that change with screen and pointer.
      spacing: sizes,
      borderRadius: { ctl: radius[1], bay: radius[2], sheet: radius[3] },
      boxShadow: { sunk: "var(--sunk)", float: "var(--float)", ring: "var(--ring)" },
      transitionDuration: moves,
      transitionTimingFunction: { needle: ease },
      maxWidth: { page: "1720px" },
      screens: {
        phone: { max: `${screens.phoneMax}px` },
        tablet: { max: `${screens.tabletMax}px` },
      },
    },
  },
  plugins: [
    plugin(({ addBase, addUtilities }) => {
      addBase({
        ":root": { colorScheme: "light", ...rootVars() },
        // A page that stands on the dark ground turns the whole document dark, so that dialogs and toasts follow it.
        '[data-theme="dark"], :root:has(.ground-dark)': { colorScheme: "dark", ...darkVars() },
        '[data-theme="paper"]': { colorScheme: "light", ...paperVars() },
        [`@media screen and (max-width: ${screens.phoneMax}px)`]: { ":root": phoneVars() },
        "@media (pointer: coarse)": { ":root": touchVars() },
        "@media (prefers-reduced-motion: reduce)": { ":root": stillVars() },
        "@media print": { ":root, :root:has(.ground-dark), [data-theme]": { colorScheme: "light", ...paperVars() } },
      });
      addUtilities({
        ".fs-num": { fontStretch: "var(--w-num)" },
        ".fs-table": { fontStretch: "var(--w-table)" },
      });
    }),
  ],
} satisfies Config;

import localFont from "next/font/local";

/*
 * Each family is two files, latin and latin-ext, told apart by unicode-range, so a page without extended letters
 * never fetches the second. The variables are put together as --face and --cut in app/styles/base.css, the extended
 * file first: the latin variable ends in a metric-adjusted stand-in that would otherwise answer for those letters.
 */
const faceLatin = localFont({
  src: "./fonts/special-gothic-latin-wdth-normal.woff2",
  variable: "--face-latin",
  weight: "400 700",
  display: "swap",
  preload: true,
  adjustFontFallback: "Arial",
  declarations: [
    { prop: "font-stretch", value: "75% 125%" },
    {
      prop: "unicode-range",
      value: "U+0000-00FF,U+0131,U+0152-0153,U+02BB-02BC,U+02C6,U+02DA,U+02DC,U+2000-206F,U+20AC,U+2122,U+2212,U+2215",
    },
  ],
});

const faceExt = localFont({
  src: "./fonts/special-gothic-latin-ext-wdth-normal.woff2",
  variable: "--face-ext",
  weight: "400 700",
  display: "swap",
  preload: false,
  adjustFontFallback: false,
  declarations: [
    { prop: "font-stretch", value: "75% 125%" },
    { prop: "unicode-range", value: "U+0100-0130,U+0132-0151,U+0154-02BA,U+1E00-1E9F,U+2080-2089,U+20A0-20AB" },
  ],
});

const cutLatin = localFont({
  src: "./fonts/national-park-latin-wght-normal.woff2",
  variable: "--cut-latin",
  weight: "200 800",
  display: "swap",
  preload: true,
  adjustFontFallback: "Arial",
  declarations: [
    { prop: "unicode-range", value: "U+0000-00FF,U+0131,U+0152-0153,U+2000-206F,U+20AC,U+2122,U+2212" },
  ],
});

const cutExt = localFont({
  src: "./fonts/national-park-latin-ext-wght-normal.woff2",
  variable: "--cut-ext",
  weight: "200 800",
  display: "swap",
  preload: false,
  adjustFontFallback: false,
  declarations: [{ prop: "unicode-range", value: "U+0100-0130,U+0132-0151,U+0154-02BA,U+1E00-1E9F" }],
});

/** Put on <html>: declares the four font variables that --face and --cut are made of. */
export const fontClasses = [faceLatin, faceExt, cutLatin, cutExt].map((f) => f.variable).join(" ");

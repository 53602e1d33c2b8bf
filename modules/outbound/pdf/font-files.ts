import { readdirSync } from "node:fs";
import path from "node:path";
import type { TFontDictionary, TFontFamilyTypes } from "pdfmake/interfaces";

/** The fonts travel with the application: beside the sources here, copied to the same place in the built server. */
export const FONT_FOLDER = path.join(/* turbopackIgnore: true */ process.cwd(), "modules/outbound/pdf/fonts");

const SLOTS: Readonly<Record<string, keyof TFontFamilyTypes>> = {
  Regular: "normal",
  Bold: "bold",
  SemiBold: "bold",
  Italic: "italics",
  BoldItalic: "bolditalics",
};

/**
 * `Family-Style.ttf` files as the families that documents may name. Only plain TrueType: the compressed web
 * formats crash the font library or lose letters. A family without a bold or slanted cut uses its regular one.
 * @throws Error when there is no font at all, or a file has another name
 */
export function fontFamilies(folder: string, names: readonly string[] = readdirSync(folder)): TFontDictionary {
  const families: Record<string, TFontFamilyTypes> = {};
  for (const name of names.filter((n) => n.endsWith(".ttf")).sort()) {
    const m = /^([A-Za-z0-9]+)-([A-Za-z]+)\.ttf$/.exec(name);
    const family = m?.[1];
    const slot = SLOTS[m?.[2] ?? ""];
    if (family === undefined || slot === undefined) throw new Error(`font file ${name}: name it Family-Regular.ttf, -Bold, -Italic or -BoldItalic`);
    (families[family] ??= {})[slot] = path.join(folder, name);
  }
  for (const [family, cuts] of Object.entries(families)) {
    const normal = cuts.normal;
    if (normal === undefined) throw new Error(`font family ${family} has no Regular`);
    families[family] = { normal, bold: normal, italics: normal, ...cuts, bolditalics: cuts.bolditalics ?? cuts.bold ?? normal };
  }
  if (Object.keys(families).length === 0) throw new Error(`no fonts in ${folder}`);
  return families;
}

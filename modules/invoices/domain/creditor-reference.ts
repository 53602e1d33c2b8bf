import { ok, refuse, type Result } from "@/modules/kernel/result";

/** Remainder mod 97 of a text of digits and letters, letters read as 10 to 35. Source: ISO 7064 mod 97-10. */
function mod97(text: string): number {
  let rest = 0;
  for (const c of text) {
    const value = parseInt(c, 36);
    rest = (rest * (value > 9 ? 100 : 10) + value) % 97;
  }
  return rest;
}

/**
 * Makes a creditor reference: RF, two check digits, then up to 21 capital letters or digits.
 * Refuses `REFERENCE_BODY` for an empty, longer or otherwise made body.
 * Source: ISO 11649; check digits ISO 7064 mod 97-10.
 */
export function makeCreditorReference(body: string): Result<string> {
  const clean = body.replace(/\s/g, "").toUpperCase();
  if (!/^[0-9A-Z]{1,21}$/.test(clean)) {
    return refuse("REFERENCE_BODY", "A reference is 1 to 21 letters A to Z or digits.", { field: "reference" });
  }
  const check = 98 - mod97(`${clean}RF00`);
  return ok(`RF${String(check).padStart(2, "0")}${clean}`);
}

/** Reads a reference as typed or as a bank sends it: blanks and lower case are fine. Compact form, or null when it is not valid. */
export function readCreditorReference(text: string): string | null {
  const compact = text.replace(/\s/g, "").toUpperCase();
  if (!/^RF\d{2}[0-9A-Z]{1,21}$/.test(compact)) return null;
  return mod97(`${compact.slice(4)}${compact.slice(0, 4)}`) === 1 ? compact : null;
}

/** In groups of four for print: `RF18 5390 0754 7034`. */
export const printCreditorReference = (compact: string): string => compact.replace(/(.{4})(?=.)/g, "$1 ");

/** Every valid reference in a free text such as a bank line, blanks inside allowed; compact, each once. */
export function creditorReferencesIn(text: string): string[] {
  const found = new Set<string>();
  for (const m of text.toUpperCase().matchAll(/(?<![0-9A-Z])RF\d{2}/g)) {
    // The end is not marked in a free text: try the longest run first, then shorter ones at each blank.
    const tail = /^[0-9A-Z]+(?: [0-9A-Z]+)*/.exec(text.toUpperCase().slice(m.index))?.[0] ?? "";
    const words = tail.split(" ");
    for (let n = Math.min(words.length, 12); n > 0; n -= 1) {
      const valid = readCreditorReference(words.slice(0, n).join(""));
      if (valid) {
        found.add(valid);
        break;
      }
    }
  }
  return [...found];
}

/**
 * Reference of a document: two letters of the shop, year, number of five digits: `NB`, 2026, 318 -> `RF95NB202600318`.
 * Refuses `REFERENCE_BODY`.
 */
export function documentReference(p: { readonly prefix: string; readonly year: number; readonly number: number }): Result<string> {
  return makeCreditorReference(`${p.prefix}${p.year}${String(p.number).padStart(5, "0")}`);
}

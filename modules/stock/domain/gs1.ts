import { addDays } from "@/modules/kernel/instant";
import { ok, refuse, type Result } from "@/modules/kernel/result";

/**
 * GS1 check digit: weights 3, 1, 3 … from the right, sum taken up to the next ten.
 * Source: GS1 General Specifications, check digit calculation (worked example 629104150021 -> 3).
 * Refuses `NOT_DIGITS`.
 */
export function gs1CheckDigit(body: string): Result<string> {
  if (!/^\d+$/.test(body)) return refuse("NOT_DIGITS", "Only digits 0 to 9 are accepted here.");
  const sum = [...body].reverse().reduce((a, c, i) => a + Number(c) * (i % 2 === 0 ? 3 : 1), 0);
  return ok(String((10 - (sum % 10)) % 10));
}

/** A GTIN of 8, 12, 13 or 14 digits with the right check digit. Shops without a GS1 prefix never make one up. */
export function isGtin(text: string): boolean {
  if (!/^(\d{8}|\d{12,14})$/.test(text)) return false;
  const check = gs1CheckDigit(text.slice(0, -1));
  return check.ok && check.value === text.slice(-1);
}

/** What a GS1-128 label says. Dates are `YYYY-MM-DD`. */
export interface Gs1Label {
  readonly gtin?: string;
  readonly lot?: string;
  readonly expiry?: string;
  readonly serial?: string;
  readonly count?: number;
  /** Every element as read, by application identifier. */
  readonly elements: Readonly<Record<string, string>>;
}

/** Application identifiers read here: fixed length of the data, or a maximum for those ended by a separator. */
const KNOWN: Readonly<Record<string, { fixed?: number; max?: number; digits?: true }>> = {
  "00": { fixed: 18, digits: true },
  "01": { fixed: 14, digits: true },
  "02": { fixed: 14, digits: true },
  "10": { max: 20 },
  "11": { fixed: 6, digits: true },
  "13": { fixed: 6, digits: true },
  "15": { fixed: 6, digits: true },
  "17": { fixed: 6, digits: true },
  "20": { fixed: 2, digits: true },
  "21": { max: 20 },
  "30": { max: 8, digits: true },
  "37": { max: 8, digits: true },
};
const SEPARATOR = "\u001d";

/**
 * Date of six digits YYMMDD; day 00 means the last day of the month. The century is the one that puts the year
 * within 49 years before and 50 years after `currentYear`.
 * Source: GS1 application identifiers 11 to 17 (day 00). The century window follows the GS1 General Specifications
 * as remembered; it was not checked against the printed text.
 */
export function gs1Date(yymmdd: string, currentYear: number): string | null {
  const m = /^(\d{2})(\d{2})(\d{2})$/.exec(yymmdd);
  if (!m) return null;
  const [yy, mm, dd] = [Number(m[1]), Number(m[2]), Number(m[3])];
  if (mm < 1 || mm > 12) return null;
  const ahead = yy - (currentYear % 100);
  const year = currentYear - (currentYear % 100) + yy + (ahead >= 51 ? -100 : ahead <= -50 ? 100 : 0);
  const first = `${year}-${String(mm).padStart(2, "0")}-01`;
  const next = mm === 12 ? `${year + 1}-01-01` : `${year}-${String(mm + 1).padStart(2, "0")}-01`;
  const last = addDays(next, -1);
  if (dd === 0) return last;
  const date = `${first.slice(0, 8)}${String(dd).padStart(2, "0")}`;
  return date <= last ? date : null;
}

/**
 * Reads a label, as printed with brackets `(01)…(17)…` or as scanned with group separators.
 * Refuses `LABEL_UNREADABLE`, `LABEL_CHECK_DIGIT`, `LABEL_DATE`, each saying which element.
 */
export function readGs1Label(text: string, currentYear: number): Result<Gs1Label> {
  const pairs = text.startsWith("(") ? bracketed(text) : scanned(text);
  if (!pairs.ok) return pairs;
  const elements = pairs.value;
  for (const ai of ["01", "02"]) {
    const gtin = elements[ai];
    if (gtin !== undefined && !isGtin(gtin)) {
      return refuse("LABEL_CHECK_DIGIT", `The article number ${gtin} has a wrong check digit. Scan again or type it.`, { data: { ai } });
    }
  }
  const expiry = elements["17"] === undefined ? undefined : gs1Date(elements["17"], currentYear);
  if (expiry === null) {
    return refuse("LABEL_DATE", `The expiry ${elements["17"] ?? ""} is not a date YYMMDD.`, { data: { ai: "17" } });
  }
  const gtin = elements["01"] ?? elements["02"];
  const count = elements["37"] ?? elements["30"];
  return ok({
    ...(gtin === undefined ? {} : { gtin }),
    ...(elements["10"] === undefined ? {} : { lot: elements["10"] }),
    ...(expiry === undefined ? {} : { expiry }),
    ...(elements["21"] === undefined ? {} : { serial: elements["21"] }),
    ...(count === undefined ? {} : { count: Number(count) }),
    elements,
  });
}

const unreadable = (what: string) =>
  refuse("LABEL_UNREADABLE", `This is not a label I can read: ${what}. Scan again, or type article, lot and expiry.`);

function checkElement(ai: string, data: string): Result<null> {
  const spec = KNOWN[ai];
  if (!spec) return unreadable(`identifier ${ai} is not known here`);
  const lengthFits = spec.fixed === undefined ? data.length >= 1 && data.length <= (spec.max ?? 0) : data.length === spec.fixed;
  if (!lengthFits) return unreadable(`(${ai}) has ${data.length} characters`);
  return spec.digits && !/^\d+$/.test(data) ? unreadable(`(${ai}) holds something else than digits`) : ok(null);
}

function bracketed(text: string): Result<Record<string, string>> {
  if (!/^(\(\d{2}\)[^()]+)+$/.test(text)) return unreadable("the brackets do not pair up");
  const found: Record<string, string> = {};
  for (const m of text.matchAll(/\((\d{2})\)([^()]+)/g)) {
    const [ai, data] = [m[1] ?? "", (m[2] ?? "").trim()];
    const fits = checkElement(ai, data);
    if (!fits.ok) return fits;
    found[ai] = data;
  }
  return ok(found);
}

function scanned(text: string): Result<Record<string, string>> {
  // Scanners may put the symbology name ]C1 in front.
  let rest = text.replace(/^\]C1/, "");
  const found: Record<string, string> = {};
  if (rest === "") return unreadable("it is empty");
  while (rest !== "") {
    if (rest.startsWith(SEPARATOR)) { rest = rest.slice(1); continue; }
    const ai = rest.slice(0, 2);
    const spec = KNOWN[ai];
    if (!spec) return unreadable(`identifier ${ai} is not known here`);
    const end = spec.fixed === undefined ? rest.indexOf(SEPARATOR, 2) : 2 + spec.fixed;
    const data = rest.slice(2, end === -1 ? undefined : end);
    const fits = checkElement(ai, data);
    if (!fits.ok) return fits;
    found[ai] = data;
    rest = end === -1 ? "" : rest.slice(end);
  }
  return ok(found);
}

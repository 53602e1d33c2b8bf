/** Where every limit of the demo is from. No engine stands behind it. */
const SOURCE = "service manual, invented for the demo";

type Side = "" | "intake" | "exhaust";
const limit = (kind: string, unit: string, min: string, max: string, side: Side = "") => ({ kind, side, min, max, unit, source: SOURCE });

/** Limits the shop entered for the S250-4V. */
export const S250_LIMITS = [
  limit("coil-bind-clearance", "mm", "1.0", ""), limit("retainer-to-seal", "mm", "1.0", ""),
  limit("lash-measured", "mm", "0.10", "0.15", "intake"), limit("lash-measured", "mm", "0.17", "0.22", "exhaust"),
  limit("valve-to-piston", "mm", "1.0", "", "intake"), limit("valve-to-piston", "mm", "1.3", "", "exhaust"),
  limit("seat-width", "mm", "0.9", "1.3"), limit("seat-runout", "mm", "", "0.05"), limit("valve-margin", "mm", "0.6", "", "intake"), limit("valve-margin", "mm", "0.7", "", "exhaust"),
  limit("stem-clearance", "mm", "", "0.08", "intake"), limit("stem-clearance", "mm", "", "0.09", "exhaust"),
  limit("deck-flatness", "mm", "", "0.05"),
] as const;

/** One kind at the four valves: intake left and right, exhaust left and right. */
type AtValves = readonly [kind: string, unit: string, values: readonly [string, string, string, string]];
export interface MeasuredHead { readonly instrument: string; readonly valves: readonly AtValves[]; readonly cylinder: readonly (readonly [kind: string, unit: string, value: string])[]; readonly head: readonly (readonly [kind: string, unit: string, value: string])[] }

const guides = (values: readonly (readonly [string, string, string, string])[]): AtValves[] =>
  ["guide-top-x", "guide-top-y", "guide-mid-x", "guide-mid-y", "guide-low-x", "guide-low-y"].map((kind, i) => [kind, "mm", values[i] ?? values[0] ?? ["", "", "", ""]]);
const deck = (values: readonly string[]): [string, string, string][] => values.map((v, i) => [`deck-flat-${i + 1}`, "mm", v]);

/** As it came apart. The seat of the left exhaust runs out further than the limit allows. */
export const MEASURED_BEFORE: MeasuredHead = {
  instrument: "Micrometer 0-25, bore gauge, spring tester",
  valves: [
    ["spring-installed", "mm", ["33.5", "33.6", "33.4", "33.5"]], ["spring-seat-load", "N", ["205", "203", "204", "206"]], ["spring-open-load", "N", ["561", "558", "559", "562"]],
    ["spring-solid", "mm", ["22.8", "22.8", "22.8", "22.8"]], ["lash-measured", "mm", ["0.12", "0.14", "0.20", "0.21"]], ["lash-shim", "mm", ["2.65", "2.62", "2.40", "2.45"]],
    ["piston-clay", "mm", ["1.95", "1.90", "2.30", "2.35"]], ["piston-angle", "°", ["11", "11", "12", "12"]], ["retainer-closed", "mm", ["11.2", "11.2", "11.3", "11.2"]],
    ["seat-width", "mm", ["1.25", "1.22", "1.28", "1.20"]], ["seat-angle", "°", ["45", "45", "45", "45"]], ["seat-runout", "mm", ["0.03", "0.04", "0.07", "0.04"]],
    ["valve-margin", "mm", ["1.1", "1.1", "1.0", "1.0"]], ["valve-runout", "mm", ["0.02", "0.02", "0.03", "0.02"]],
    ["leak-start", "kPa", ["80", "80", "80", "80"]], ["leak-end", "kPa", ["74", "72", "58", "71"]], ["leak-seconds", "s", ["30", "30", "30", "30"]],
    ...guides([["5.518", "5.517", "5.526", "5.524"], ["5.516", "5.516", "5.523", "5.522"], ["5.512", "5.511", "5.515", "5.514"], ["5.511", "5.511", "5.514", "5.514"], ["5.517", "5.516", "5.524", "5.523"], ["5.515", "5.515", "5.521", "5.521"]]),
    ["stem", "mm", ["5.478", "5.479", "5.466", "5.467"]],
  ],
  cylinder: [["fill-1", "cc", "19.2"], ["fill-2", "cc", "19.3"], ["fill-3", "cc", "19.2"], ["deck-clearance", "mm", "0.30"], ["gasket-bore", "mm", "78"], ["gasket-thickness", "mm", "0.50"], ["piston-pockets", "cc", "-1.3"]],
  head: [...deck(["0.02", "0.03", "0.02", "0.04", "0.03", "0.02"]), ["milled-total", "mm", "0"]],
};

/** On the new seats: installed heights brought back, lash set again, everything within. */
export const MEASURED_AFTER: MeasuredHead = {
  instrument: "Micrometer 0-25, run-out gauge, spring tester",
  valves: [
    ["spring-installed", "mm", ["33.5", "33.5", "33.5", "33.5"]], ["spring-seat-load", "N", ["206", "205", "204", "206"]], ["spring-open-load", "N", ["562", "560", "560", "562"]],
    ["spring-solid", "mm", ["22.8", "22.8", "22.8", "22.8"]], ["lash-measured", "mm", ["0.13", "0.13", "0.19", "0.20"]], ["lash-shim", "mm", ["2.55", "2.55", "2.30", "2.35"]],
    ["seat-width", "mm", ["1.00", "1.02", "1.05", "1.05"]], ["seat-angle", "°", ["45", "45", "45", "45"]], ["seat-runout", "mm", ["0.01", "0.02", "0.02", "0.01"]],
    ["leak-start", "kPa", ["80", "80", "80", "80"]], ["leak-end", "kPa", ["79", "79", "78", "79"]], ["leak-seconds", "s", ["30", "30", "30", "30"]],
  ],
  cylinder: [["fill-1", "cc", "19.5"], ["fill-2", "cc", "19.4"], ["fill-3", "cc", "19.5"], ["deck-clearance", "mm", "0.30"], ["gasket-bore", "mm", "78"], ["gasket-thickness", "mm", "0.50"], ["piston-pockets", "cc", "-1.3"]],
  head: deck(["0.02", "0.02", "0.02", "0.03", "0.02", "0.02"]),
};

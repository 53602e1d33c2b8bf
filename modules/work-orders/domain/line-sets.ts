/** Three usual depths of work as sets of menu codes; quantities of "each" operations follow the valves. Common practice, no source. */
export interface LineSet {
  readonly key: "check" | "valve-job" | "full-port";
  readonly label: string;
  readonly codes: readonly { readonly code: string; readonly per: "piece" | "valve" }[];
}

const one = (...codes: string[]) => codes.map((code) => ({ code, per: "piece" as const }));
const each = (code: string) => ({ code, per: "valve" as const });

export const LINE_SETS: readonly LineSet[] = [
  { key: "check", label: "Check & seal", codes: [...one("CLN", "TDN", "PRT", "LAP", "ASM", "INS")] },
  { key: "valve-job", label: "Valve job", codes: [...one("CLN", "TDN", "PRT"), each("SEA"), ...one("LAP", "SPR", "LSH", "ASM", "INS")] },
  { key: "full-port", label: "Full port", codes: [...one("CLN", "TDN", "PRT", "FLB", "EPX", "PIN", "PEX"), each("SEA"), ...one("LAP", "SPR", "LSH", "FLF", "ASM", "INS")] },
];

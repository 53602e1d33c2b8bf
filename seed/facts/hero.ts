/** The hero job, as in docs/hero-job.md. */
export const HERO_LABOR: readonly (readonly [code: string, qty: string])[] = [
  ["CLN", "1"], ["TDN", "1"], ["PRT", "1"], ["FLB", "1"], ["EPX", "1"], ["PIN", "1"], ["PEX", "1"], ["SEA", "4"], ["LAP", "1"], ["SPR", "1"], ["LSH", "1"], ["FLF", "1"], ["ASM", "1"], ["INS", "1"],
];
export const HERO_SHELF: readonly (readonly [sku: string, qty: string])[] = [
  ["KIT-SPG-S250", "1"], ["SEL-55", "4"], ["SHM-748", "4"], ["GSK-S250-HD", "1"], ["EPX-PORT", "1"], ["VIN-S250-310", "2"],
];
export const HERO_FOUND_LABOR: readonly (readonly [code: string, qty: string])[] = [["GDE", "2"]];
export const HERO_FOUND_SHELF: readonly (readonly [sku: string, qty: string])[] = [["VEX-S250-265", "2"], ["GDE-S250-BRZ", "2"]];

/** Bench clock: who, on what, from, to (wall clock of the day), whether that finished it. */
export const HERO_BENCH: readonly (readonly [day: string, who: string, code: string, from: string, to: string, done: boolean])[] = [
  ["2026-02-25", "Emeka", "CLN", "08:10", "08:38", true],
  ["2026-02-25", "Hollis", "TDN", "09:05", "10:12", true],
  ["2026-02-26", "Emeka", "PRT", "08:20", "08:58", true],
  ["2026-02-26", "June", "FLB", "09:30", "10:26", true],
  ["2026-03-03", "Hollis", "GDE", "13:15", "14:07", true],
  ["2026-03-04", "Anselm", "PIN", "08:00", "11:05", false],
  ["2026-03-07", "Anselm", "EPX", "10:25", "11:30", true],
  ["2026-03-09", "Anselm", "PIN", "08:15", "09:50", true],
  ["2026-03-10", "Rosa", "PEX", "08:05", "11:20", true],
  ["2026-03-11", "Bram", "SEA", "08:00", "09:48", true],
  ["2026-03-12", "Bram", "LAP", "08:10", "08:52", true],
  ["2026-03-12", "Hollis", "SPR", "09:00", "09:45", true],
  ["2026-03-12", "June", "FLF", "10:15", "11:12", true],
  ["2026-03-13", "Hollis", "LSH", "08:05", "08:43", true],
  ["2026-03-13", "Hollis", "ASM", "08:45", "09:36", true],
  ["2026-03-13", "June", "INS", "10:00", "10:27", true],
];

export const HERO_LIFTS = ["0.050", "0.100", "0.150", "0.200", "0.250", "0.300", "0.350", "0.400"] as const;
/** CFM at 28 inH2O by lift, as read. */
export const HERO_FLOW = {
  intake: { baseline: ["24.6", "48.9", "71.2", "90.8", "106.5", "117.9", "124.4", "127.0"], after: ["25.0", "51.6", "76.9", "99.7", "118.2", "131.8", "140.1", "143.6"] },
  exhaust: { baseline: ["21.8", "43.0", "60.7", "74.1", "83.6", "89.7", "93.1", "94.8"], after: ["22.3", "44.9", "64.8", "80.2", "91.5", "98.8", "103.2", "105.1"] },
} as const;
export const HERO_CAM_LIFT_IN = "0.340";
/** Valve heads of the casting, mm; the new valves are of the same size. */
export const HERO_VALVE_MM = { intake: "31", exhaust: "26.5" } as const;

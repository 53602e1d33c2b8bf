/** Gear of the demo's bench room. Serials, certificates and figures are invented. */
export const CHECK_PLATES = [
  { serial: "P-40", referenceFlow: "40.4", certificate: "Comparison 25-114, Pell calibration bench (invented)", dueInDays: 46 },
  { serial: "P-80", referenceFlow: "80.3", certificate: "Comparison 25-115, Pell calibration bench (invented)", dueInDays: 46 },
  { serial: "P-160", referenceFlow: "160.0", certificate: "Comparison 26-031, Pell calibration bench (invented)", dueInDays: 228 },
] as const;

/** What a bench showed for the three plates, in their order; the factor comes out of it. */
interface PlateDay { readonly at: string; readonly shown: readonly [string, string, string]; readonly note: string; /** Why a factor that moved by more than a percent was kept. */ readonly reason?: string }

/** Bench 1 drifts slowly and once by more than a percent; by the hero's two tests it reads true. */
export const BENCH_1_CHECKS: readonly PlateDay[] = [
  { at: "2025-05-02T09:10", shown: ["40.2", "80.4", "160.0"], note: "First check after it was set up." },
  { at: "2025-06-27T08:40", shown: ["40.3", "80.1", "159.6"], note: "" },
  { at: "2025-08-29T08:35", shown: ["40.2", "79.9", "159.3"], note: "" },
  { at: "2025-11-03T16:40", shown: ["39.8", "79.1", "157.5"], note: "Pressure line chafed at the clip. Line renewed, to be read again in the morning.", reason: "Plates flowed twice, both times so. The line was found chafed." },
  { at: "2025-11-04T07:50", shown: ["40.1", "79.8", "159.0"], note: "On the new line." },
  { at: "2026-01-05T08:45", shown: ["40.2", "80.2", "159.6"], note: "" },
  { at: "2026-02-20T13:30", shown: ["40.2", "80.4", "160.0"], note: "After the yearly service of the sensors." },
  { at: "2026-04-24T08:30", shown: ["40.3", "80.2", "159.7"], note: "" },
  { at: "2026-06-26T08:40", shown: ["40.2", "80.0", "159.4"], note: "" },
  { at: "2026-08-21T08:25", shown: ["40.3", "80.1", "159.5"], note: "" },
];
export const OLDER_BENCH_CHECKS: readonly PlateDay[] = [
  { at: "2025-05-02T10:20", shown: ["39.9", "79.4", "158.2"], note: "Ranges 2, 3 and 4." },
  { at: "2026-07-06T10:05", shown: ["40.0", "79.6", "158.6"], note: "Brought back for the development heads." },
];

/** The older bench: percent of a range, read from an inclined manometer. */
export const OLDER_RANGES = [{ label: "1", fullScaleCfm: 30 }, { label: "2", fullScaleCfm: 60 }, { label: "3", fullScaleCfm: 120 }, { label: "4", fullScaleCfm: 240 }, { label: "5", fullScaleCfm: 320 }] as const;

export const FIXTURES = [
  { name: "Bore 77", boreMm: "77" }, { name: "Bore 76", boreMm: "76" }, { name: "Bore 80", boreMm: "80" }, { name: "Bore 96", boreMm: "96" }, { name: "Bore 105", boreMm: "105" },
] as const;

export const LIFT_DEVICES = [
  { name: "Bridge with dial indicator", resolution: "0.01", uncertainty: "0.02" },
  { name: "Screw with digital indicator", resolution: "0.001", uncertainty: "0.008" },
] as const;

/** Lift of the valve by crank angle of the intake cam, mm: an invented raised cosine, rounded to 0.01. */
const camTable = (peakMm: number, durationDeg: number, stepDeg: number): string =>
  Array.from({ length: durationDeg / stepDeg + 1 }, (_, i) => `${i * stepDeg} ${(peakMm * Math.sin((Math.PI * i * stepDeg) / durationDeg) ** 2).toFixed(2)}`).join("\n");

export const CAMSHAFTS = [
  { label: "K7 closed course", side: "intake", maxLift: "8.64", duration: "240", profile: camTable(8.64, 240, 10), dataSource: "Measured in the head with a degree wheel, Anselm" },
  { label: "K7 road", side: "exhaust", maxLift: "8.20", duration: "238", profile: "", dataSource: "Maker's card: peak lift and duration only" },
] as const;

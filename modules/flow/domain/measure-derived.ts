import { chamberFromFills } from "./chamber-fills";
import { retainerToSeal, seatRunout, stemClearanceMm, valveToPiston } from "./clearances";
import { compressionRatio } from "./compression-ratio";
import { FLOW_FLAGS, type FlowFlag } from "./flow-flags";
import { lashShimCandidates } from "./lash-shim";
import type { DerivedKey } from "./measure-kinds";
import type { MeasureLimit } from "./measure-value";
import { valveSpring } from "./valve-spring";

/** Values of one valve, cylinder or head by kind, in base units. */
export type Measured = ReadonlyMap<string, number>;
export interface Derived {
  /** Present where the shop may set a limit for it. */
  readonly key: DerivedKey | null;
  readonly label: string;
  readonly value: number;
  readonly unit: string;
  readonly digits: number;
  /** Doubts and dangers, in words. */
  readonly words: readonly string[];
}
export type LimitOf = (key: string) => MeasureLimit | null;

const flagWords = (flags: readonly FlowFlag[]): string[] => flags.map((f) => FLOW_FLAGS[f]);
const figure = (key: DerivedKey | null, label: string, value: number, unit: string, digits: number, words: readonly string[] = []): Derived => ({ key, label, value, unit, digits, words });
const given = <K extends string>(name: K, value: number | undefined): Partial<Record<K, number>> => (value === undefined ? {} : ({ [name]: value } as Record<K, number>));
const GUIDE_KINDS = ["guide-top-x", "guide-top-y", "guide-mid-x", "guide-mid-y", "guide-low-x", "guide-low-y"];
/** Shim kits go in steps of so much, mm. Our choice; the shop's own kit may differ. */
const SHIM_STEP_MM = 0.05;

function springFigures(m: Measured, liftMm: number | null, limitOf: LimitOf): Derived[] {
  const minimum = limitOf("coil-bind-clearance")?.min;
  const spring = valveSpring({
    ...given("installedHeightMm", m.get("spring-installed")), ...given("seatLoadN", m.get("spring-seat-load")), ...given("openLoadN", m.get("spring-open-load")), ...given("rateNMm", m.get("spring-rate")),
    ...given("solidHeightMm", m.get("spring-solid")), ...given("freeLengthMm", m.get("spring-free")), ...given("shimMm", m.get("spring-shim")), ...given("liftMm", liftMm ?? undefined), ...given("minimumClearanceMm", minimum ?? undefined),
  });
  if (!spring.ok) return [];
  const { rateNMm, seatLoadN, openLoadN, coilBindClearanceMm, flags } = spring.value;
  return [
    ...(coilBindClearanceMm === undefined ? [] : [figure("coil-bind-clearance", "Coil-bind clearance", coilBindClearanceMm, "mm", 2, flagWords(flags))]),
    ...(rateNMm === undefined || m.has("spring-rate") ? [] : [figure(null, "Rate from the loads", rateNMm, "N/mm", 1)]),
    ...(seatLoadN === undefined || m.get("spring-seat-load") === seatLoadN ? [] : [figure(null, "Seat load as fitted", seatLoadN, "N", 0)]),
    ...(openLoadN === undefined || m.get("spring-open-load") === openLoadN ? [] : [figure(null, "Open load as fitted", openLoadN, "N", 0)]),
  ];
}

function lashFigures(m: Measured, limitOf: LimitOf): Derived[] {
  const [measured, shim, limit] = [m.get("lash-measured"), m.get("lash-shim"), limitOf("lash-measured")];
  if (measured === undefined || shim === undefined || limit === null || limit.min === null || limit.max === null) return [];
  const found = lashShimCandidates({ oldShimMm: shim, measuredMm: measured, minMm: limit.min, maxMm: limit.max, stepMm: SHIM_STEP_MM, smallestMm: 0.05, largestMm: 20 });
  if (!found.ok) return [];
  const [first] = found.value.candidates;
  if (!first) return [figure(null, "Lash as measured", measured, "mm", 3, flagWords(found.value.flags))];
  return [figure(null, "Shim to fit", first.shimMm, "mm", 2, [`leaves ${first.clearanceMm} mm`, ...found.value.candidates.slice(1).map((c) => `or ${c.shimMm} mm for ${c.clearanceMm} mm`)])];
}

function clearanceFigures(m: Measured, liftMm: number | null, limitOf: LimitOf): Derived[] {
  const out: Derived[] = [];
  const [clay, closed] = [m.get("piston-clay"), m.get("retainer-closed")];
  if (clay !== undefined) {
    const made = valveToPiston({ clayMm: clay, milledMm: m.get("piston-milled") ?? 0, valveAngleDeg: m.get("piston-angle") ?? 0, minimumMm: limitOf("valve-to-piston")?.min ?? 0 });
    if (made.ok) out.push(figure("valve-to-piston", "Valve to piston", made.value.clearanceMm, "mm", 2, [...flagWords(made.value.flags), "Measure before starting the engine."]));
  }
  if (closed !== undefined && liftMm !== null) {
    const made = retainerToSeal({ distanceClosedMm: closed, liftMm, minimumMm: limitOf("retainer-to-seal")?.min ?? 0 });
    if (made.ok) out.push(figure("retainer-to-seal", "Retainer to seal at full lift", made.value.clearanceMm, "mm", 2, flagWords(made.value.flags)));
  }
  return out;
}

/** What the measurements of one valve say together. @param liftMm cam lift at the valve; null = not recorded. */
export function valveFigures(m: Measured, liftMm: number | null, limitOf: LimitOf): Derived[] {
  const bores = GUIDE_KINDS.flatMap((k) => (m.has(k) ? [m.get(k) ?? 0] : []));
  const stem = m.get("stem");
  const clearance = stem === undefined || bores.length === 0 ? null : stemClearanceMm({ guideBoresMm: bores, stemsMm: [stem] });
  const runout = m.get("seat-runout");
  const offset = runout === undefined ? null : seatRunout({ totalIndicatorMm: runout, limitMm: limitOf("seat-runout")?.max ?? Number.MAX_VALUE });
  const [width, angle] = [m.get("seat-width"), m.get("seat-angle")];
  const [start, end, seconds] = [m.get("leak-start"), m.get("leak-end"), m.get("leak-seconds")];
  return [
    ...springFigures(m, liftMm, limitOf), ...lashFigures(m, limitOf), ...clearanceFigures(m, liftMm, limitOf),
    ...(width === undefined || angle === undefined ? [] : [figure(null, "Seat width, radial", width * Math.cos((angle * Math.PI) / 180), "mm", 2)]),
    ...(offset?.ok ? [figure(null, "Seat offset", offset.value.offsetMm, "mm", 3)] : []),
    ...(start === undefined || end === undefined || seconds === undefined ? [] : [figure(null, "Vacuum lost", start - end, "kPa", 1, [`in ${seconds} s`])]),
    ...(clearance?.ok ? [figure("stem-clearance", "Stem clearance, worst", clearance.value, "mm", 3, bores.length < 6 ? [`${bores.length} of 6 places measured`] : [])] : []),
  ];
}

/** Chamber and compression of one cylinder. @param boreMm, strokeMm null = not recorded: then no ratio. */
export function cylinderFigures(m: Measured, boreMm: number | null, strokeMm: number | null): Derived[] {
  const fills = ["fill-1", "fill-2", "fill-3"].flatMap((k) => (m.has(k) ? [m.get(k) ?? 0] : []));
  const chamber = chamberFromFills(fills);
  if (!chamber.ok) return [];
  const out = [figure("chamber", "Chamber, mean of the fills", chamber.value.chamberCc, "cc", 2, [`spread ${Math.round(chamber.value.spreadCc * 100) / 100} cc`, ...flagWords(chamber.value.flags)])];
  if (boreMm === null || strokeMm === null) return out;
  const hasGasket = m.has("gasket-bore") && m.has("gasket-thickness");
  const ratio = compressionRatio({
    boreMm, strokeMm, chamberCc: chamber.value.chamberCc, ...given("deckClearanceMm", m.get("deck-clearance")), ...given("pistonCc", m.get("piston-pockets")),
    ...(hasGasket ? { ...given("gasketBoreMm", m.get("gasket-bore")), ...given("gasketThicknessMm", m.get("gasket-thickness")) } : {}),
  });
  const missing = [...(hasGasket ? [] : ["gasket"]), ...(m.has("deck-clearance") ? [] : ["deck"]), ...(m.has("piston-pockets") ? [] : ["piston"])];
  if (ratio.ok) out.push(figure(null, "Compression ratio", ratio.value.ratio, ": 1", 2, missing.length === 0 ? [] : [`without ${missing.join(", ")}: not measured`]));
  return out;
}

/** The whole head: the largest feeler of the lines laid. */
export function headFigures(m: Measured): Derived[] {
  const lines = [1, 2, 3, 4, 5, 6].flatMap((n) => (m.has(`deck-flat-${n}`) ? [m.get(`deck-flat-${n}`) ?? 0] : []));
  return lines.length === 0 ? [] : [figure("deck-flatness", "Deck flatness, worst line", Math.max(...lines), "mm", 3, lines.length < 6 ? [`${lines.length} of 6 lines laid`] : [])];
}

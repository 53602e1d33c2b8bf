import { ok, type Result } from "@/modules/kernel/result";
import type { FlowFlag } from "./flow-flags";
import { refuseFlow, refuseNotFinite } from "./flow-refusal";

/**
 * Rate of a round-wire spring, N/mm: `G d^4/(8 D^3 Na)`.
 * @param shearModulusMPa about 79 000 for spring steel, from the wire's data sheet. All > 0, mean diameter > wire.
 * Source: Shigley's Mechanical Engineering Design ch. 10; EN 13906-1. Errors: GEOMETRY_INVALID.
 */
export function springRateFromWire(input: { wireMm: number; meanDiameterMm: number; activeCoils: number; shearModulusMPa: number }): Result<number> {
  const bad = refuseNotFinite(input);
  if (bad) return bad;
  const wrong = Object.entries(input).find(([, v]) => v <= 0);
  if (wrong) return refuseFlow("GEOMETRY_INVALID", wrong[0]);
  if (input.meanDiameterMm <= input.wireMm) return refuseFlow("GEOMETRY_INVALID", "meanDiameterMm");
  return ok((input.shearModulusMPa * input.wireMm ** 4) / (8 * input.meanDiameterMm ** 3 * input.activeCoils));
}

/**
 * Solid length of a spring with squared and ground ends, and the load there, in the units given.
 * Source: Mott, Machine Elements in Mechanical Design, section 19-6. Errors: GEOMETRY_INVALID.
 */
export function springAtSolid(input: { rate: number; freeLength: number; wireDiameter: number; totalCoils: number }): Result<{
  solidLength: number;
  loadAtSolid: number;
}> {
  const bad = refuseNotFinite(input);
  if (bad) return bad;
  const wrong = Object.entries(input).find(([, v]) => v <= 0);
  if (wrong) return refuseFlow("GEOMETRY_INVALID", wrong[0]);
  const solidLength = input.wireDiameter * input.totalCoils;
  if (solidLength >= input.freeLength) return refuseFlow("GEOMETRY_INVALID", "freeLength");
  return ok({ solidLength, loadAtSolid: input.rate * (input.freeLength - solidLength) });
}

export interface SpringInput {
  readonly installedHeightMm?: number;
  readonly freeLengthMm?: number;
  /** Load at the installed height, before the shim. */
  readonly seatLoadN?: number;
  /** Load at full lift, before the shim. */
  readonly openLoadN?: number;
  readonly rateNMm?: number;
  readonly liftMm?: number;
  readonly solidHeightMm?: number;
  readonly shimMm?: number;
  /** From the service manual or the spring's maker. */
  readonly minimumClearanceMm?: number;
}
/** Each figure is there when the inputs determine it. Loads and clearance are with the shim fitted. */
export interface SpringFigures {
  readonly rateNMm?: number;
  readonly seatLoadN?: number;
  readonly openLoadN?: number;
  readonly coilBindClearanceMm?: number;
  readonly flags: readonly FlowFlag[];
}

/** Flags of a coil-bind clearance. */
function bindFlags(clearanceMm: number, minimumMm: number | undefined): FlowFlag[] {
  if (clearanceMm <= 1e-9) return ["COIL_BIND"];
  return minimumMm !== undefined && clearanceMm < minimumMm - 1e-9 ? ["COIL_BIND_CLEARANCE_LOW"] : [];
}

/**
 * What a valve spring does, from whatever was measured: rate `(open - seat)/lift`, seat load `k (free - installed)`,
 * open load `seat + k lift`, coil-bind clearance `installed - lift - solid - shim`. A shim raises both loads by `k shim`.
 * Progressive springs have no one rate: use the measured load table. Minimum often 1.0 to 1.5 mm (common practice); manual first.
 * Source: Hooke's law. Errors: GEOMETRY_INVALID (a size <= 0, or nothing determined).
 */
export function valveSpring(input: SpringInput): Result<SpringFigures> {
  const { installedHeightMm, freeLengthMm, seatLoadN, openLoadN, rateNMm, liftMm, solidHeightMm, shimMm = 0, minimumClearanceMm } = input;
  const sizes = { installedHeightMm, freeLengthMm, seatLoadN, openLoadN, rateNMm, liftMm, solidHeightMm };
  const bad = refuseNotFinite({ ...sizes, shimMm, minimumClearanceMm });
  if (bad) return bad;
  const wrong = Object.entries(sizes).find(([, v]) => v !== undefined && v <= 0);
  if (wrong) return refuseFlow("GEOMETRY_INVALID", wrong[0]);
  if (shimMm < 0) return refuseFlow("GEOMETRY_INVALID", "shimMm");
  const measured = seatLoadN !== undefined && openLoadN !== undefined && liftMm !== undefined ? (openLoadN - seatLoadN) / liftMm : undefined;
  const rate = rateNMm ?? measured;
  if (rate !== undefined && rate <= 0) return refuseFlow("GEOMETRY_INVALID", "openLoadN");
  const compressed = freeLengthMm !== undefined && installedHeightMm !== undefined ? freeLengthMm - installedHeightMm : undefined;
  if (compressed !== undefined && compressed < 0) return refuseFlow("GEOMETRY_INVALID", "installedHeightMm");
  const seat = seatLoadN ?? (rate !== undefined && compressed !== undefined ? rate * compressed : undefined);
  const open = openLoadN ?? (seat !== undefined && rate !== undefined && liftMm !== undefined ? seat + rate * liftMm : undefined);
  const shimLoad = rate !== undefined ? rate * shimMm : shimMm === 0 ? 0 : undefined;
  const clearance =
    installedHeightMm !== undefined && liftMm !== undefined && solidHeightMm !== undefined
      ? installedHeightMm - liftMm - solidHeightMm - shimMm
      : undefined;
  if (rate === undefined && seat === undefined && open === undefined && clearance === undefined) return refuseFlow("GEOMETRY_INVALID");
  return ok({
    ...(rate === undefined ? {} : { rateNMm: rate }),
    ...(seat === undefined || shimLoad === undefined ? {} : { seatLoadN: seat + shimLoad }),
    ...(open === undefined || shimLoad === undefined ? {} : { openLoadN: open + shimLoad }),
    ...(clearance === undefined ? {} : { coilBindClearanceMm: clearance }),
    flags: clearance === undefined ? [] : bindFlags(clearance, minimumClearanceMm),
  });
}

/** Nested springs together: loads and rates add where every spring has them, the smallest clearance governs. Errors: TOO_FEW_POINTS. */
export function nestedSprings(springs: readonly SpringFigures[]): Result<SpringFigures> {
  if (springs.length === 0) return refuseFlow("TOO_FEW_POINTS", "springs");
  const all = (pick: (s: SpringFigures) => number | undefined): number[] | null => {
    const list = springs.map(pick).filter((v): v is number => v !== undefined);
    return list.length === springs.length ? list : null;
  };
  const sum = (list: readonly number[]) => list.reduce((a, b) => a + b, 0);
  const rates = all((s) => s.rateNMm);
  const seats = all((s) => s.seatLoadN);
  const opens = all((s) => s.openLoadN);
  const clearances = all((s) => s.coilBindClearanceMm);
  return ok({
    ...(rates ? { rateNMm: sum(rates) } : {}),
    ...(seats ? { seatLoadN: sum(seats) } : {}),
    ...(opens ? { openLoadN: sum(opens) } : {}),
    ...(clearances ? { coilBindClearanceMm: Math.min(...clearances) } : {}),
    flags: [...new Set(springs.flatMap((s) => s.flags))],
  });
}

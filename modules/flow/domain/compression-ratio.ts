import { ok, type Result } from "@/modules/kernel/result";
import { refuseFlow, refuseNotFinite } from "./flow-refusal";

const discCc = (diameterMm: number, heightMm: number): number => ((Math.PI / 4) * diameterMm ** 2 * heightMm) / 1000;

/** Volume a piston sweeps, cc. @param boreMm, strokeMm > 0. Source: geometry. Errors: GEOMETRY_INVALID. */
export function sweptVolumeCc(input: { boreMm: number; strokeMm: number }): Result<number> {
  const bad = refuseNotFinite(input);
  if (bad) return bad;
  if (input.boreMm <= 0) return refuseFlow("GEOMETRY_INVALID", "boreMm");
  if (input.strokeMm <= 0) return refuseFlow("GEOMETRY_INVALID", "strokeMm");
  return ok(discCc(input.boreMm, input.strokeMm));
}

export interface ClearanceInput {
  readonly chamberCc: number;
  /** Either the volume or the height; piston below the deck is positive, above is negative. The height needs `boreMm`. */
  readonly deckCc?: number;
  readonly deckClearanceMm?: number;
  /** Either the volume or bore and compressed thickness. */
  readonly gasketCc?: number;
  readonly gasketBoreMm?: number;
  readonly gasketThicknessMm?: number;
  /** Net addition of the piston crown: pockets less dome. */
  readonly pistonCc?: number;
  /** Dome volume, taken off. */
  readonly domeCc?: number;
}
export type CompressionInput = ClearanceInput & ({ readonly sweptCc: number; readonly boreMm?: number } | { readonly boreMm: number; readonly strokeMm: number });

/**
 * Clearance volume and compression ratio `(Vs + Vc)/Vc`.
 * Source: Heywood (1988) eq. (2.1). Errors: GEOMETRY_INVALID (a size <= 0, half a pair given, Vc <= 0).
 */
export function compressionRatio(input: CompressionInput): Result<{ sweptCc: number; clearanceCc: number; ratio: number }> {
  const { chamberCc, deckCc, deckClearanceMm, gasketCc, gasketBoreMm, gasketThicknessMm, pistonCc = 0, domeCc = 0, boreMm } = input;
  const bad = refuseNotFinite({ chamberCc, deckCc, deckClearanceMm, gasketCc, gasketBoreMm, gasketThicknessMm, pistonCc, domeCc, boreMm });
  if (bad) return bad;
  const swept = "sweptCc" in input ? ok(input.sweptCc) : sweptVolumeCc(input);
  if (!swept.ok) return swept;
  if (!(swept.value > 0)) return refuseFlow("GEOMETRY_INVALID", "sweptCc");
  if (chamberCc < 0) return refuseFlow("GEOMETRY_INVALID", "chamberCc");
  if (deckClearanceMm !== undefined && deckCc === undefined && !(boreMm !== undefined && boreMm > 0)) return refuseFlow("GEOMETRY_INVALID", "boreMm");
  if ((gasketBoreMm === undefined) !== (gasketThicknessMm === undefined)) return refuseFlow("GEOMETRY_INVALID", "gasketBoreMm");
  if ((gasketBoreMm ?? 1) <= 0 || (gasketThicknessMm ?? 0) < 0 || (gasketCc ?? 0) < 0) return refuseFlow("GEOMETRY_INVALID", "gasketThicknessMm");
  const deck = deckCc ?? discCc(boreMm ?? 0, deckClearanceMm ?? 0);
  const gasket = gasketCc ?? discCc(gasketBoreMm ?? 0, gasketThicknessMm ?? 0);
  const clearanceCc = chamberCc + gasket + deck + pistonCc - domeCc;
  if (clearanceCc <= 0) return refuseFlow("GEOMETRY_INVALID", "chamberCc");
  return ok({ sweptCc: swept.value, clearanceCc, ratio: (swept.value + clearanceCc) / clearanceCc });
}

/**
 * Chamber volume that gives a wanted ratio, cc: `Vs/(CR - 1) - other`.
 * @param targetRatio > 1. @param otherClearanceCc gasket, deck and crown together. Errors: GEOMETRY_INVALID.
 */
export function chamberForRatioCc(input: { boreMm: number; strokeMm: number; targetRatio: number; otherClearanceCc: number }): Result<number> {
  const bad = refuseNotFinite(input);
  if (bad) return bad;
  const swept = sweptVolumeCc(input);
  if (!swept.ok) return swept;
  if (input.targetRatio <= 1) return refuseFlow("GEOMETRY_INVALID", "targetRatio");
  const chamberCc = swept.value / (input.targetRatio - 1) - input.otherClearanceCc;
  return chamberCc > 0 ? ok(chamberCc) : refuseFlow("GEOMETRY_INVALID", "targetRatio");
}

/** Change of chamber volume from milling, cc (negative): `-A cut`. @param chamberAreaMm2 > 0, cutMm >= 0. Errors: GEOMETRY_INVALID. */
export function millingChangeCc(input: { chamberAreaMm2: number; cutMm: number }): Result<number> {
  const bad = refuseNotFinite(input);
  if (bad) return bad;
  if (input.chamberAreaMm2 <= 0) return refuseFlow("GEOMETRY_INVALID", "chamberAreaMm2");
  if (input.cutMm < 0) return refuseFlow("GEOMETRY_INVALID", "cutMm");
  return ok(-(input.chamberAreaMm2 * input.cutMm) / 1000);
}

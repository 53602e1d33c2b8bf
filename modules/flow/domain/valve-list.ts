import type { PortSide } from "./comparison-reasons";

/** One valve of a cylinder. Two, three, four and five valve heads differ only in the list. */
export interface ValveOfFamily {
  readonly side: PortSide;
  readonly position: "single" | "left" | "centre" | "right";
  readonly headMm: number;
  readonly stemMm: number | null;
  readonly seatAngleDeg: number | null;
}

/** Head diameters of one side, mm, in the order of the list. */
export const headDiametersMm = (valves: readonly ValveOfFamily[], side: PortSide): number[] => valves.filter((v) => v.side === side).map((v) => v.headMm);

/** `2 × 31 mm` or `23, 22, 23 mm`; empty when no valve is listed. */
export function valveListWords(valves: readonly ValveOfFamily[], side: PortSide): string {
  const sizes = headDiametersMm(valves, side);
  const [first] = sizes;
  if (first === undefined) return "";
  if (sizes.length === 1) return `${first} mm`;
  return sizes.every((d) => d === first) ? `${sizes.length} × ${first} mm` : `${sizes.join(", ")} mm`;
}

/**
 * Head diameters of the valves a test ran with, mm: as the family lists them where the test states no size; all of the stated
 * size, as many as the family lists, where it does; the stated one alone where the family lists none.
 */
export const valvesOfTest = (valveMm: number | null, listedMm: readonly number[]): number[] =>
  valveMm === null ? [...listedMm] : listedMm.length > 0 ? listedMm.map(() => valveMm) : [valveMm];

/** What an empty valve field and one number in it mean, for a side with these valves; empty where there is nothing to say. */
export function valveFieldHint(listedMm: readonly number[]): string {
  const [first] = listedMm;
  if (first === undefined || listedMm.length < 2) return "";
  const all = listedMm.length === 2 ? "both" : `all ${listedMm.length}`;
  return listedMm.every((d) => d === first) ? `One number: ${all} valves are that size.` : `Empty: ${listedMm.join(", ")} mm, as the family lists. One number: ${all} are that size.`;
}

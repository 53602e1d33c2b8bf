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

import { moistAirDensity } from "./air-density";
import { coefficientTable, STATED_AIR } from "./coefficient-rows";
import type { PortSide } from "./comparison-reasons";
import type { FlowFlag } from "./flow-flags";
import { sanityFlagsOfReading } from "./sanity-flags";
import type { SanityLimits } from "./sanity-limits";

/**
 * Can this flow pass the valves and the smallest section of the port? Doubts about one flow at one lift, in the air the
 * coefficients are stated for; none where the sizes are not known or the valve is shut.
 * Source: as `coefficientTable` and `sanityFlagsOfReading`.
 * @param valveDiametersMm every open valve of the side. @param minSectionMm2 smallest section of the port, mm2.
 */
export function geometryFlags(input: { liftUm: number; flowCfm: number; side: PortSide; atInH2O: number; valveDiametersMm?: readonly number[]; minSectionMm2?: number; limits?: SanityLimits | undefined }): FlowFlag[] {
  const { liftUm, flowCfm, side, atInH2O, valveDiametersMm = [], minSectionMm2, limits } = input;
  const flags: FlowFlag[] = [];
  if (valveDiametersMm.length > 0 && liftUm > 0) flags.push(...(coefficientTable({ readings: [{ liftUm, flowCfm }], side, valveDiametersMm, atInH2O, limits })?.rows[0]?.flags ?? []));
  if (minSectionMm2 !== undefined) {
    const air = moistAirDensity(STATED_AIR);
    const doubts = air.ok ? sanityFlagsOfReading({ flowCfm, heldInH2O: atInH2O, densityKgM3: air.value.densityKgM3, minSectionMm2 }, limits) : air;
    if (doubts.ok) flags.push(...doubts.value);
  }
  return flags;
}

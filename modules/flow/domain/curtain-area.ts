import { ok, type Result } from "@/modules/kernel/result";
import { refuseFlow, refuseNotFinite } from "./flow-refusal";
import { paired } from "./neighbours";

export interface CurtainArea {
  readonly curtainAreaMm2: number;
  /** Group ratio `A_curtain/(4 A_heads)`; for equal valves the plain lift over diameter. */
  readonly liftOverDiameter: number;
  /** Diameter of one valve with the same head area. */
  readonly equivalentSingleDiameterMm: number;
}

/**
 * Curtain area of the open valves, `pi D L` each, summed. Curtain equals head area at lift/diameter 0.25.
 * @param valveDiametersMm each > 0, at least one. @param liftMm >= 0, one for all or one for each valve.
 * Source: Heywood (1988) section 6.3.2; group ratio from equal head area. Errors: GEOMETRY_INVALID.
 */
export function curtainArea(input: { valveDiametersMm: readonly number[]; liftMm: number | readonly number[] }): Result<CurtainArea> {
  const { valveDiametersMm, liftMm } = input;
  const bad = refuseNotFinite({ valveDiametersMm, liftMm });
  if (bad) return bad;
  const lifts = typeof liftMm === "number" ? valveDiametersMm.map(() => liftMm) : liftMm;
  const valves = paired(valveDiametersMm, lifts);
  if (!valves || valves.length === 0) return refuseFlow("GEOMETRY_INVALID", "valveDiametersMm");
  if (valves.some(([d]) => d <= 0)) return refuseFlow("GEOMETRY_INVALID", "valveDiametersMm");
  if (valves.some(([, l]) => l < 0)) return refuseFlow("GEOMETRY_INVALID", "liftMm");
  const squares = valves.reduce((s, [d]) => s + d * d, 0);
  const curtainAreaMm2 = valves.reduce((s, [d, l]) => s + Math.PI * d * l, 0);
  return ok({ curtainAreaMm2, liftOverDiameter: curtainAreaMm2 / (Math.PI * squares), equivalentSingleDiameterMm: Math.sqrt(squares) });
}

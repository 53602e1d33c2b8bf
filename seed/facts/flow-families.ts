import type { PortSide } from "@/modules/flow/domain/comparison-reasons";
import { HERO_FLOW } from "./hero";

/** One side of a cylinder: valves of one size, and what an untouched port flows. */
interface SideFacts {
  readonly places: readonly ("left" | "centre" | "right")[];
  readonly headMm: number;
  readonly stemMm: number;
  /** Greatest lift of the usual cam, in. */
  readonly camLift: string;
  /** CFM at 28 in H2O by lift of the ladder, an ordinary casting before work. */
  readonly flowCfm: readonly number[];
}
export interface FamilyFacts {
  readonly cylinders: number;
  readonly boreMm: number;
  readonly strokeMm: number;
  /** Bore of the fixture it is flowed through, mm. */
  readonly fixtureMm: number;
  readonly lifts: readonly string[];
  readonly intake: SideFacts;
  readonly exhaust: SideFacts;
  readonly notes: string;
}

const TO_350 = ["0.050", "0.100", "0.150", "0.200", "0.250", "0.300", "0.350"] as const;
const TO_400 = [...TO_350, "0.400"] as const;
const TO_450 = [...TO_400, "0.450"] as const;
const PAIR = ["left", "right"] as const;
const THREE = ["left", "centre", "right"] as const;
/** Other castings of the hero's family lie near its curve; their exhaust ports were opened a little further at the works. */
const nearHero = (side: PortSide, factor: number): number[] => TO_350.map((_, i) => Math.round(Number(HERO_FLOW[side].baseline[i] ?? 0) * factor * 10) / 10);

/**
 * The engine families the demo shop flows. Names, sizes and flows are invented; they are chosen so that the discharge coefficient on
 * curtain area lies between 0.30 and 0.80 (the usual band of poppet valves; common practice), which the test beside this holds.
 */
export const FLOW_FAMILIES: Readonly<Record<string, FamilyFacts>> = {
  "S250-4V": {
    cylinders: 1, boreMm: 77, strokeMm: 53.6, fixtureMm: 77, lifts: TO_350, notes: "",
    intake: { places: PAIR, headMm: 31, stemMm: 5.5, camLift: "0.340", flowCfm: nearHero("intake", 1.02) },
    exhaust: { places: PAIR, headMm: 26.5, stemMm: 5.5, camLift: "0.340", flowCfm: nearHero("exhaust", 1.1) },
  },
  "S250-5V": {
    cylinders: 1, boreMm: 77, strokeMm: 53.6, fixtureMm: 77, lifts: TO_350, notes: "Centre intake valve sits 3 mm nearer the plug.",
    intake: { places: THREE, headMm: 23, stemMm: 4.5, camLift: "0.320", flowCfm: [32.7, 64.1, 93.4, 118.2, 136.8, 149, 158.5] },
    exhaust: { places: PAIR, headMm: 25.5, stemMm: 5, camLift: "0.310", flowCfm: [23.2, 45.6, 65.6, 82.8, 95.3, 104.6, 112.3] },
  },
  "S450-4V": {
    cylinders: 1, boreMm: 96, strokeMm: 62.1, fixtureMm: 96, lifts: TO_400, notes: "",
    intake: { places: PAIR, headMm: 36, stemMm: 5.5, camLift: "0.380", flowCfm: [39.4, 76.8, 112.2, 144.3, 172.2, 192.9, 209, 220.4] },
    exhaust: { places: PAIR, headMm: 31, stemMm: 5.5, camLift: "0.360", flowCfm: [31.6, 62.2, 90.7, 116.4, 137, 152.6, 164.1, 174] },
  },
  "S450-5V": {
    cylinders: 1, boreMm: 96, strokeMm: 62.1, fixtureMm: 96, lifts: TO_400, notes: "",
    intake: { places: THREE, headMm: 27, stemMm: 4.5, camLift: "0.360", flowCfm: [39.9, 78.2, 114, 144.6, 167.9, 186, 198.9, 209.6] },
    exhaust: { places: PAIR, headMm: 31, stemMm: 5, camLift: "0.350", flowCfm: [31, 61, 88.9, 114.1, 134.3, 149.5, 160.8, 170.5] },
  },
  "Q450-4V": {
    cylinders: 1, boreMm: 96, strokeMm: 62.1, fixtureMm: 96, lifts: TO_400, notes: "",
    intake: { places: PAIR, headMm: 35, stemMm: 5.5, camLift: "0.370", flowCfm: [37.4, 73, 106.6, 137.1, 163.6, 183.3, 198.6, 209.4] },
    exhaust: { places: PAIR, headMm: 30, stemMm: 5.5, camLift: "0.350", flowCfm: [30, 59.1, 86.2, 110.6, 130.2, 145, 155.9, 165.3] },
  },
  "T690-8V": {
    cylinders: 2, boreMm: 80, strokeMm: 68.8, fixtureMm: 80, lifts: TO_400, notes: "Two cylinders in one casting; the ports of cylinder 2 lean the other way.",
    intake: { places: PAIR, headMm: 31, stemMm: 5.5, camLift: "0.360", flowCfm: [31.1, 61, 88.1, 110.7, 128.5, 142.4, 150.3, 158.2] },
    exhaust: { places: PAIR, headMm: 27, stemMm: 5.5, camLift: "0.350", flowCfm: [26.1, 51.2, 73.8, 93.5, 108.2, 119.6, 127.4, 133.8] },
  },
  "V1200-8V": {
    cylinders: 2, boreMm: 105, strokeMm: 69.3, fixtureMm: 105, lifts: TO_450, notes: "",
    intake: { places: PAIR, headMm: 41, stemMm: 7, camLift: "0.420", flowCfm: [41.8, 82.2, 119.9, 152.4, 179.3, 201.7, 217, 230.1, 238.7] },
    exhaust: { places: PAIR, headMm: 34, stemMm: 7, camLift: "0.400", flowCfm: [33.5, 65.7, 94.9, 120.3, 141, 156.2, 166.9, 176.1, 184.1] },
  },
};

/** @throws when the demo flows a family nobody described. */
export function flowFamily(name: string): FamilyFacts {
  const facts = FLOW_FAMILIES[name];
  if (!facts) throw new Error(`no flow is known of family ${name}`);
  return facts;
}

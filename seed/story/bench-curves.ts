import type { PortSide } from "@/modules/flow/domain/comparison-reasons";
import type { BenchStory, SideStory } from "../facts/bench-stories";
import type { FamilyFacts } from "../facts/flow-families";
import { HERO_FLOW } from "../facts/hero";
import { steadyNumbers } from "../factories/steady-numbers";

/** A port's flow at one lift as the bench would state it, CFM at the nominal pressure. */
export interface Reading { readonly lift: string; readonly repeatNo: number; readonly flowCfm: number }

/** Castings of one family lie so far apart, either way. */
const CASTING_SHARE = 0.012;
/** A repeat lies so far from the first reading: from 0.2 to 0.4 CFM, either way. */
const REPEAT_CFM = { least: 0.2, more: 0.2 } as const;
/** A second cylinder is followed by template and brings so much of the first one's gain. */
const FOLLOWED_SHARE = 0.93;
/** What a wider throat costs just off the seat, as a share. */
const LOW_LOSS = [-0.028, -0.012] as const;

/** Relative gain at a rung of the ladder: the hero's shape, stretched over the ladder's own lifts. */
function shareGained(side: PortSide, story: SideStory, rung: number): number {
  if (story.shape === "none") return rung % 2 === 0 ? 0.003 : 0.0015;
  if (story.shape === "low loss" && rung < LOW_LOSS.length) return LOW_LOSS[rung] ?? 0;
  const hero = HERO_FLOW[side];
  const at = Math.min(rung, hero.baseline.length - 1);
  return (Number(hero.after[at] ?? 0) / Number(hero.baseline[at] ?? 1) - 1) * story.strength;
}

/**
 * Invented readings of one port: the family's curve, this casting a little off it, and as much of the gain as the work has brought.
 * @param share 0 before work, 1 after. @param mark which head, port and pass: the same mark reads the same for ever.
 */
export function portReadings(family: FamilyFacts, side: PortSide, story: BenchStory, share: number, mark: { salt: number; cylinder: number }): Reading[] {
  const sideNo = side === "intake" ? 1 : 2;
  const casting = 1 + (steadyNumbers(mark.salt * 97 + mark.cylinder * 13 + sideNo)() * 2 - 1) * CASTING_SHARE;
  const noise = steadyNumbers(mark.salt * 389 + mark.cylinder * 31 + sideNo * 7 + Math.round(share * 100));
  const brought = share * FOLLOWED_SHARE ** (mark.cylinder - 1);
  return family.lifts.flatMap((lift, i): Reading[] => {
    const flow = (family[side].flowCfm[i] ?? 0) * casting * (1 + shareGained(side, story[side], i) * brought);
    const times = story.again.includes(lift) ? story.times : 1;
    return Array.from({ length: times }, (_, k) => {
      const off = k === 0 ? 0 : (REPEAT_CFM.least + noise() * REPEAT_CFM.more) * (noise() < 0.5 ? -1 : 1);
      return { lift, repeatNo: k + 1, flowCfm: flow + off };
    });
  });
}

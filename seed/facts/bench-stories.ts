import type { PortSide } from "@/modules/flow/domain/comparison-reasons";
import type { HEAD_WORK } from "@/modules/flow/gear-input";

/** How a side answered the work: by how much of the hero's relative gain, and in which shape. */
export interface SideStory {
  readonly strength: number;
  /** `low loss`: a little lost at the lowest lifts, gained above. `none`: nothing the bench could tell. */
  readonly shape: "full" | "low loss" | "none";
}
/** What was particular about the bench work on one head. */
export interface BenchStory {
  readonly family: string;
  readonly intake: SideStory;
  readonly exhaust: SideStory;
  /** Lifts read again, and how often in all. */
  readonly again: readonly string[];
  readonly times: number;
  readonly bench: "now" | "older";
  /** Leak of the closed port before and after, CFM at 28 in H2O; empty = not measured. */
  readonly leak: readonly [before: string, after: string];
  readonly seats: readonly [before: string, after: string];
  /** Valve sizes fitted for the after test, mm; left out = as the family lists. */
  readonly valveAfter: Partial<Record<PortSide, number>>;
  /** Pressure held before, in H2O, where it was not the nominal. */
  readonly heldBefore?: string;
  readonly clayBefore?: boolean;
  /** Bore of the fixture the after test went through, mm, where it was another. */
  readonly fixtureAfterMm?: number;
  /** Operations after which a pass in between was flowed, with the share of the gain by then. */
  readonly passes: Readonly<Record<string, number>>;
  readonly work: readonly (typeof HEAD_WORK)[number][];
  readonly words: string;
}

const THREE_LIFTS = ["0.100", "0.200", "0.300"] as const;
const ORIGINAL = "on the cleaned original seats";
const ANGLES = "fresh, three angles 30/45/60, 1.0 mm on the 45";
const full = (strength: number): SideStory => ({ strength, shape: "full" });

/** An ordinary job of a shop that repeats two or three lifts. */
export const ORDINARY: BenchStory = {
  family: "", intake: full(0.9), exhaust: full(0.85), again: THREE_LIFTS, times: 2, bench: "now", leak: ["", ""], seats: [ORIGINAL, ANGLES], valveAfter: {}, passes: {}, work: ["port shape", "seat"],
  words: "Bowls blended, short side laid back.",
};
const story = (family: string, more: Partial<BenchStory> = {}): BenchStory => ({ ...ORDINARY, family, ...more });

/** Heads of the demo with something of their own, by the number of the job in the story. All invented. */
export const BENCH_STORIES: Readonly<Record<number, BenchStory>> = {
  0: story("S250-4V", { bench: "older", times: 1, again: [], intake: full(0.7), words: "Flowed on the range bench, the last head before Bench 1 took over." }),
  2: story("S250-5V", { intake: full(0.6), fixtureAfterMm: 76, words: "After test went through the 76 sleeve by mistake: tables side by side, no gain." }),
  3: story("S250-4V", { leak: ["0.9", "0.4"], intake: full(1.05), exhaust: full(1), words: "Guide boss thinned, bowls opened to 88 % of the valve." }),
  5: story("S250-4V", { intake: full(0.95), exhaust: { strength: 1.15, shape: "low loss" }, seats: [ORIGINAL, "fresh, five angles, 0.9 mm on the 45"], words: "Wider exhaust throat: a little lost just off the seat, gained above." }),
  6: story("S250-4V", { intake: full(0.8), exhaust: full(0.75), again: ["0.150", "0.300"], times: 3 }),
  8: story("S450-4V", { clayBefore: true, exhaust: full(0.9), words: "Intake before was read with a clay radius, after with the turned one; the intake pair does not compare." }),
  9: story("S250-4V", { intake: full(1.1), exhaust: full(0.95), leak: ["0.6", "0.5"], words: "Bench factor moved between the two tests; the sheet says so." }),
  11: story("S250-4V", { intake: { strength: 0, shape: "none" }, exhaust: full(0.5), words: "Intake only cleaned up, at the customer's wish. Exhaust bowls opened." }),
  12: story("S250-4V", { intake: full(1), exhaust: full(1), seats: [ORIGINAL, "fresh, 45 with a radius below, 1.1 mm"], work: ["port shape", "seat", "chamber"], words: "Chamber wall eased beside the intake valves." }),
  17: story("S450-4V", { intake: full(1.15), exhaust: full(1.05), passes: { PIN: 0.55, SEA: 0.85 }, words: "Flowed twice on the way: after the intake rough, and on the new seats." }),
  18: story("S250-4V", { heldBefore: "26.0", intake: full(0.85), exhaust: full(0.8), words: "Blower bag torn on the day of the baseline: 26 held, stated at 28." }),
  20: story("T690-8V", { intake: full(0.9), exhaust: full(0.8), again: ["0.100", "0.300"], words: "Both cylinders to one template; cylinder 2 gained a little less." }),
  21: story("S250-4V", { intake: full(1.25), exhaust: full(0.9), valveAfter: { intake: 32 }, work: ["valve size", "seat", "port shape"], words: "Intake valves 1 mm larger on the old rings, throats cut to follow." }),
  23: story("S450-4V", { leak: ["1.1", "0.7"], seats: ["original, three angles, 1.6 mm, pitted", "fresh, five angles, 1.2 mm on the 45"] }),
  24: story("S450-5V", { intake: full(0.7), exhaust: full(0.7) }),
  41: story("S250-4V", { intake: full(1), exhaust: { strength: 1, shape: "low loss" }, leak: ["0.7", "0.4"] }),
  42: story("S250-4V", { seats: ["original, left exhaust runs out 0.07", "fresh, three angles 30/45/60, 1.0 to 1.05 mm"], intake: full(0.95), exhaust: full(0.9) }),
  45: story("Q450-4V"),
};

import { addOwnHead } from "@/modules/flow/commands/families";
import { must, type Cast } from "../cast";
import { ORDINARY, type BenchStory } from "../facts/bench-stories";
import { flowFamily } from "../facts/flow-families";
import { flowHead, type Pass } from "./flowed";
import type { BenchRoom } from "./gear";

interface OwnHead { mark: string; castingNumber: string; salt: number; story: BenchStory; days: readonly (readonly [at: string, pass: Pass])[] }

/** Castings the shop works on for itself: no customer, no order. The second is read on the range bench, every lift twice. */
const OWN_HEADS: readonly OwnHead[] = [
  {
    mark: "DEV-1", castingNumber: "K7-2201", salt: 901,
    story: { ...ORDINARY, family: "S250-4V", intake: { strength: 1.35, shape: "full" }, exhaust: { strength: 1.2, shape: "full" }, work: ["weld", "epoxy", "port shape", "seat"], words: "Intake floor raised 4 mm with weld and epoxy, short side recut. Bought cracked, for trying only." },
    days: [["2026-05-12T13:40", { purpose: "baseline", share: 0 }], ["2026-05-20T14:10", { purpose: "interim", share: 0.6 }], ["2026-06-03T15:05", { purpose: "after", share: 1 }]],
  },
  {
    mark: "DEV-2", castingNumber: "S4-2090", salt: 902,
    story: { ...ORDINARY, family: "S450-4V", bench: "older", again: flowFamily("S450-4V").lifts, times: 2, intake: { strength: 0.9, shape: "full" }, exhaust: { strength: 0.8, shape: "full" }, valveAfter: { intake: 37 }, work: ["valve size", "seat"], words: "37 mm intake valves on new rings, ports untouched." },
    days: [["2026-07-07T10:30", { purpose: "baseline", share: 0 }], ["2026-07-21T13:20", { purpose: "after", share: 1 }]],
  },
];

/** The shop's own development heads and their passes. */
export async function ownHeads(cast: Cast, room: BenchRoom, who: string): Promise<void> {
  for (const { mark, castingNumber, salt, story, days } of OWN_HEADS) {
    const family = flowFamily(story.family);
    const head = must(await addOwnHead(cast.as(who, days[0]?.[0] ?? ""), {
      mark, family: story.family, castingNumber, cylinders: family.cylinders, bore: String(family.boreMm), stroke: String(family.strokeMm), seatMaterial: "bronze", workDone: [...story.work], notes: story.words,
    }), mark);
    for (const [at, pass] of days) await flowHead(cast, room, who, at, { headId: head.id }, pass, story, salt);
  }
}

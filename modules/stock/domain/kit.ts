import { milli, type Milli } from "@/modules/kernel/quantity";

/** One line of a kit: sold as one, issued as its parts. */
export interface KitPart {
  readonly partId: string;
  readonly needMilli: Milli;
}

/** The part quantities of `kits` whole kits. The same part on two lines comes out once. */
export function explodeKit(kit: readonly KitPart[], kits: number): KitPart[] {
  const sum = new Map<string, number>();
  for (const p of kit) sum.set(p.partId, (sum.get(p.partId) ?? 0) + p.needMilli * kits);
  return [...sum].map(([partId, need]) => ({ partId, needMilli: milli(need) }));
}

export interface KitAvailability {
  /** Whole kits that can be put together now. */
  readonly kits: number;
  /** What is missing for `wanted` kits, by part; empty when all is there. */
  readonly short: readonly { readonly partId: string; readonly shortMilli: Milli }[];
}

/** Availability = the least over the parts of floor(available / need). An empty kit is not available. */
export function kitAvailability(
  kit: readonly KitPart[],
  availableMilli: ReadonlyMap<string, number>,
  wanted = 1,
): KitAvailability {
  const have = (id: string) => Math.max(0, availableMilli.get(id) ?? 0);
  const perKit = explodeKit(kit, 1).filter((p) => p.needMilli > 0);
  const kits = perKit.length === 0 ? 0 : Math.min(...perKit.map((p) => Math.floor(have(p.partId) / p.needMilli)));
  const short = explodeKit(kit, wanted)
    .map((p) => ({ partId: p.partId, shortMilli: milli(Math.max(0, p.needMilli - have(p.partId))) }))
    .filter((p) => p.shortMilli > 0);
  return { kits, short };
}

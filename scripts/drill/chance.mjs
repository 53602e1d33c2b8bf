/** Chance from a seed (mulberry32): the same seed gives the same mix. What meets what in time is not in its hand. */
export function chanceFrom(seed) {
  let a = seed >>> 0;
  const next = () => {
    a = (a + 0x6d2b79f5) >>> 0;
    let t = a;
    t = Math.imul(t ^ (t >>> 15), t | 1);
    t ^= t + Math.imul(t ^ (t >>> 7), t | 61);
    return ((t ^ (t >>> 14)) >>> 0) / 4294967296;
  };
  return {
    next,
    below: (n) => Math.floor(next() * n),
    pick: (list) => list[Math.floor(next() * list.length)],
    /** One of `[weight, value]`. */
    weighted(list) {
      let rest = next() * list.reduce((sum, [w]) => sum + w, 0);
      for (const [w, value] of list) if ((rest -= w) < 0) return value;
      return list.at(-1)[1];
    },
  };
}

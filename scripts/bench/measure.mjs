/** Measures how long something takes under a number of clients, in rounds. */
const percentile = (sorted, p) => sorted[Math.min(sorted.length - 1, Math.floor(sorted.length * p))] ?? Number.NaN;

/** Runs `once` by `clients` at the same time until the time is over. @returns times in ms, and how many a second */
export async function round(once, { clients, ms }) {
  const times = [];
  const started = performance.now();
  const until = started + ms;
  await Promise.all(Array.from({ length: clients }, async () => {
    do {
      const from = performance.now();
      await once();
      times.push(performance.now() - from);
    } while (performance.now() < until);
  }));
  return { times, perSecond: (times.length * 1000) / (performance.now() - started) };
}

/** The rounds of one target together. */
export function summary(rounds) {
  const sorted = rounds.flatMap((r) => r.times).sort((a, b) => a - b);
  const speeds = rounds.map((r) => r.perSecond).sort((a, b) => a - b);
  return { n: sorted.length, p50: percentile(sorted, 0.5), p95: percentile(sorted, 0.95), perSecond: percentile(speeds, 0.5) };
}

/**
 * Measures all targets in turn, round after round, so that whatever else the machine does meets each of them.
 * @param targets `{ name, once }`; each is warmed up first
 */
export async function measure(targets, { clients, rounds, ms, warmMs }, told = () => {}) {
  for (const target of targets) {
    await target.once();
    await round(target.once, { clients, ms: warmMs });
  }
  const results = new Map(targets.map((t) => [t.name, []]));
  for (let i = 0; i < rounds; i++) {
    for (const target of targets) results.get(target.name).push(await round(target.once, { clients, ms }));
    told(i + 1);
  }
  return new Map([...results].map(([name, list]) => [name, summary(list)]));
}

import { expect, it } from "vitest";
import { measure, round, summary } from "./measure.mjs";

const sleep = (ms: number) => new Promise((resolve) => setTimeout(resolve, ms));

it("runs as many at once as there are clients, until the time is over", async () => {
  let now = 0;
  let most = 0;
  const r = await round(async () => { now++; most = Math.max(most, now); await sleep(5); now--; }, { clients: 4, ms: 40 });
  expect(most).toBe(4);
  expect(r.times.length).toBeGreaterThan(4);
});
it("takes the middle and the tail of all rounds together", () => {
  const s = summary([{ times: [1, 2, 3, 4], perSecond: 10 }, { times: [5, 6, 7, 100], perSecond: 30 }, { times: [8, 9], perSecond: 20 }]);
  expect(s).toEqual({ n: 10, p50: 6, p95: 100, perSecond: 20 });
});
it("warms each target up and stops at the first that fails", async () => {
  const calls: string[] = [];
  const target = (name: string) => ({ name, once: async () => { calls.push(name); await sleep(1); } });
  const results = await measure([target("a"), target("b")], { clients: 1, rounds: 2, ms: 5, warmMs: 1 });
  expect([...results.keys()]).toEqual(["a", "b"]);
  expect(calls[0]).toBe("a");
  await expect(measure([{ name: "bad", once: () => Promise.reject(new Error("answered 500")) }], { clients: 1, rounds: 1, ms: 1, warmMs: 1 })).rejects.toThrow("answered 500");
});

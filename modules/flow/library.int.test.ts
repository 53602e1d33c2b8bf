import { randomUUID } from "node:crypto";
import { eq } from "drizzle-orm";
import { beforeAll, describe, expect, it } from "vitest";
import { flowTests } from "@/db/schema";
import { withShop } from "@/db/scope";
import { NotFound } from "@/modules/access/context";
import { loadFlow, type FlowLoad } from "@/seed/factories/flow-load";
import { behindTheCurtain } from "@/tests/support/database";
import { HERO_FLOWS, HERO_LIFTS_UM } from "@/tests/support/hero-flow";
import { must, testShop, type TestShop } from "@/tests/support/shop";
import { addOwnHead, changeHeadWork } from "./commands/families";
import { addBench, addFixture, recordBenchCheck } from "./commands/gear";
import { recordReading } from "./commands/record-reading";
import { startTest } from "./commands/start-test";
import { summariseMissing } from "./commands/summarise";
import { liftText } from "./domain/lift-ladder";
import { libraryInput } from "./library-input";
import { familyNames, libraryTests } from "./queries/library";
import { familyPicture, overlayOf } from "./queries/library-family";
import { completeTest } from "./commands/finish-test";

let a: TestShop;
let b: TestShop;
let load: FlowLoad;
let bench: string;
let fixture: string;
const ask = (more: Partial<Record<keyof typeof libraryInput.shape, string | number>> = {}) => libraryInput.parse(more);

beforeAll(async () => {
  a = await testShop("first");
  b = await testShop("second");
  load = await loadFlow(a.shop.id, { operatorId: a.people.insp ?? "", tests: 96, lifts: 20, now: new Date("2026-02-18T17:00:00Z"), families: 4 });
  bench = must(await addBench(a.as("lead"), { name: "Bench 1" })).id;
  fixture = must(await addFixture(a.as("lead"), { name: "77", boreMm: "77" })).id;
});

/** A hero side read on the bench and finished. */
async function heroTest(headId: string, side: "intake" | "exhaust", when: "before" | "after", at: string): Promise<string> {
  must(await recordBenchCheck(a.as("insp", at), { benchId: bench, isFine: true }));
  const who = a.as("insp", at);
  const { testId } = must(await startTest(who, {
    headId, side, purpose: when === "before" ? "baseline" : "after", benchId: bench, fixtureId: fixture, nominal: "28", camLift: ".340", liftUnit: "in",
    lifts: HERO_LIFTS_UM.map((um) => liftText(um, "in")), entry: side === "intake" ? "radius" : "none",
  }));
  for (const [i, um] of HERO_LIFTS_UM.entries()) {
    must(await recordReading(who, { testId, lift: liftText(um, "in"), value: String(HERO_FLOWS[side][when][i]), pressure: "28.0" }));
  }
  must(await completeTest(who, { testId, version: 1 }));
  return testId;
}

describe("the library", () => {
  it("pages through every finished test once, newest first", async () => {
    const seen: string[] = [];
    let after: string | undefined;
    do {
      const page = await libraryTests(a.as("counter"), ask({ limit: 25, ...(after ? { after } : {}) }));
      seen.push(...page.rows.map((r) => r.testId));
      expect(page.rows.map((r) => r.startedAt)).toEqual(page.rows.map((r) => r.startedAt).sort().reverse());
      after = page.next ?? undefined;
    } while (after);
    expect(new Set(seen).size).toBe(96);
    expect(seen).toHaveLength(96);
  });

  it("is searched by family, side, valve size, seat, work done, owner and day", async () => {
    const family = load.families[0] ?? "";
    const rows = (await libraryTests(a.as("tech"), ask({ family, side: "intake", purpose: "after", limit: 100 }))).rows;
    expect(rows).toHaveLength(6);
    expect(new Set(rows.map((r) => `${r.family} ${r.side} ${r.purpose}`))).toEqual(new Set([`${family} intake after`]));
    const valve = (await libraryTests(a.as("tech"), ask({ valve: "30,5", limit: 100 }))).rows;
    expect(new Set(valve.map((r) => r.valveMm))).toEqual(new Set([30.5]));
    expect((await libraryTests(a.as("tech"), ask({ work: "weld", limit: 100 }))).rows.every((r) => r.workDone.includes("weld"))).toBe(true);
    const own = (await libraryTests(a.as("tech"), ask({ owner: "development", limit: 100 }))).rows;
    expect(own.length).toBeGreaterThan(0);
    expect(new Set(own.map((r) => r.ownerKind))).toEqual(new Set(["development"]));
    expect((await libraryTests(a.as("tech"), ask({ seat: "THREE" }))).rows.every((r) => r.seatNote === "three angles")).toBe(true);
    expect((await libraryTests(a.as("tech"), ask({ q: "l-00003", limit: 100 }))).rows).toHaveLength(4);
    const [newest] = (await libraryTests(a.as("tech"), ask({ limit: 1 }))).rows;
    const day = newest?.startedAt.slice(0, 10) ?? "";
    const later = (await libraryTests(a.as("tech"), ask({ from: day, limit: 100 }))).rows;
    expect(later.every((r) => r.startedAt >= `${day}T00`)).toBe(true);
    expect(later.length).toBeLessThan(96);
    expect((await libraryTests(a.as("tech"), ask({ q: "100%" }))).rows).toEqual([]);
  });

  it("keeps summaries that are the figures of the raw readings, and makes missing ones again", async () => {
    const kept = await behindTheCurtain(`select test_id || ' ' || flows_cfm::text || ' ' || round(mean_to_cam_cfm::numeric, 9) from flow_test_summaries where shop_id = '${a.shop.id}' order by 1`);
    await behindTheCurtain(`delete from flow_test_summaries where shop_id = '${a.shop.id}'`);
    const made = await withShop(a.shop.id, (tx) => summariseMissing({ ...a.system(), tx }, 500));
    expect(made).toBe(96);
    expect(await behindTheCurtain(`select test_id || ' ' || flows_cfm::text || ' ' || round(mean_to_cam_cfm::numeric, 9) from flow_test_summaries where shop_id = '${a.shop.id}' order by 1`)).toEqual(kept);
    expect(await withShop(a.shop.id, (tx) => summariseMissing({ ...a.system(), tx }))).toBe(0);
  });

  it("takes a finished test in, and a corrected or void one out", async () => {
    const { id: headId } = must(await addOwnHead(a.as("tech"), { mark: "DEV-7", family: "S250-4V", cylinders: 1, bore: "77" }));
    const testId = await heroTest(headId, "exhaust", "before", "2026-02-10T15:00:00Z");
    const of = async () => (await libraryTests(a.as("tech"), ask({ q: "DEV-7" }))).rows;
    expect(await of()).toMatchObject([{ testId, ownerKind: "development", peakCfm: 94.8, peakLiftUm: 10160, lifts: 8, atInH2O: 28 }]);
    await withShop(a.shop.id, async (tx) => {
      const [old] = await tx.select().from(flowTests).where(eq(flowTests.id, testId));
      if (!old) throw new Error("no test");
      await tx.insert(flowTests).values({ ...old, id: randomUUID(), correctsTestId: testId });
    });
    expect((await of()).map((r) => r.testId)).not.toContain(testId);
  });
});

describe("a family", () => {
  it("has a middle curve, a best one, and the gains of its last heads at each lift with their number", async () => {
    const family = load.families[1] ?? "";
    const picture = await familyPicture(a.as("counter"), { family, side: "intake", last: 10 });
    expect(picture.tests).toBe(12);
    expect(picture.after).toHaveLength(20);
    // Six flows at each lift: the middle lies between the third and the fourth.
    const flows = (await behindTheCurtain(`select flows_cfm[5] from flow_test_summaries where shop_id = '${a.shop.id}' and family = '${family}' and side = 'intake' and purpose = 'after' order by 1`)).map(Number);
    expect(flows).toHaveLength(6);
    expect(picture.after[4]).toMatchObject({ liftUm: 2500, n: 6 });
    expect(picture.after[4]?.flowCfm).toBeCloseTo(((flows[2] ?? 0) + (flows[3] ?? 0)) / 2, 9);
    const [best] = await behindTheCurtain(`select max(mean_to_cam_cfm) from flow_test_summaries where shop_id = '${a.shop.id}' and family = '${family}' and side = 'intake'`);
    expect(picture.best?.meanToCamCfm).toBeCloseTo(Number(best), 9);
    expect(picture.ports).toHaveLength(6);
    expect(picture.ports.every((p) => p.gain === "comparable")).toBe(true);
    expect(picture.gains.map((g) => g.n)).toEqual(Array.from({ length: 20 }, () => 6));
  });

  it("gives the gains of the hero figures, losses as plainly as gains", async () => {
    const heads3 = await Promise.all([1, 2, 3].map(async (n) => must(await addOwnHead(a.as("tech"), { mark: `G-${n}`, family: "Gains", cylinders: 1 })).id));
    for (const [i, headId] of heads3.entries()) {
      await heroTest(headId, "intake", "before", `2026-02-1${i}T15:00:00Z`);
      await heroTest(headId, "intake", "after", `2026-02-1${i + 4}T15:00:00Z`);
    }
    const picture = await familyPicture(a.as("tech"), { family: "Gains", side: "intake", last: 10 });
    expect(picture.ports.map((p) => p.mark)).toEqual(["G-3", "G-2", "G-1"]);
    expect(picture.gains.map((g) => [g.liftUm, g.n, g.medianCfm])).toEqual(HERO_LIFTS_UM.map((um, i) => [um, 3, Math.round(((HERO_FLOWS.intake.after[i] ?? 0) - (HERO_FLOWS.intake.before[i] ?? 0)) * 10) / 10]));
    expect(picture.gains.every((g) => !g.isThin)).toBe(true);
    const two = await familyPicture(a.as("tech"), { family: "Gains", side: "intake", last: 2 });
    expect(two.gains.every((g) => g.n === 2 && g.isThin)).toBe(true);
  });

  it("is not there for another shop or an unknown name", async () => {
    await expect(familyPicture(b.as("owner"), { family: load.families[0] ?? "", side: "intake", last: 10 })).rejects.toThrow(NotFound);
    expect((await libraryTests(b.as("owner"), ask())).rows).toEqual([]);
    expect(await familyNames(b.as("owner"))).toEqual([]);
    await expect(overlayOf(b.as("owner"), { a: load.sameFamilyTests[0], b: load.sameFamilyTests[1] })).rejects.toThrow(NotFound);
  });
});

describe("two tests over each other", () => {
  it("gives a difference where they may be compared, and none where not", async () => {
    const one = must(await addOwnHead(a.as("tech"), { mark: "O-1", family: "Over", cylinders: 1 })).id;
    const two = must(await addOwnHead(a.as("tech"), { mark: "O-2", family: "Over", cylinders: 1 })).id;
    const before = await heroTest(one, "intake", "before", "2026-01-10T15:00:00Z");
    const after = await heroTest(two, "intake", "after", "2026-01-12T15:00:00Z");
    const over = await overlayOf(a.as("tech"), { a: before, b: after });
    expect(over).toMatchObject({ comparable: true, samePort: false });
    expect(over.rows.at(-1)).toMatchObject({ liftUm: 10160, a: 127, b: 143.6, difference: 16.6 });
    expect(over.noise?.rows.at(-1)).toMatchObject({ liftUm: 10160, verdict: "not_assessed", before: 1, after: 1 });
    // The hero's means, and no cam named on the tests.
    expect(over.compared).toMatchObject({ gain: { meanGainCfm: 9.45, crossovers: [] }, means: { overLift: { fromUm: 1270 }, overCam: "no_cam" } });
    const late = await heroTest(one, "intake", "after", "2026-06-20T15:00:00Z");
    const apart = await overlayOf(a.as("tech"), { a: late, b: after });
    expect(apart.notes.map((n) => n.words)).toContain("The two were read 159 days apart.");
    const bench2 = await overlayOf(a.as("tech"), { a: before, b: load.aTest });
    expect(bench2.comparable).toBe(false);
    expect(bench2.reasons.map((r) => r.words).join(" ")).toMatch(/The first was read on Bench 1, the second on Load bench L\./);
    expect(bench2.reasons.map((r) => r.words).join(" ")).not.toMatch(/the the/i);
    const exhaust = await heroTest(two, "exhaust", "after", "2026-01-13T15:00:00Z");
    const withheld = await overlayOf(a.as("tech"), { a: before, b: exhaust });
    expect(withheld.comparable).toBe(false);
    expect(withheld.meanDifferenceCfm).toBeNull();
    expect(withheld.compared).toBeNull();
    expect(withheld.noise).toBeNull();
    expect(withheld.rows.every((r) => r.difference === null)).toBe(true);
    expect(withheld.reasons.map((r) => r.code)).toContain("SIDE_DIFFERS");
    expect(withheld.reasons.map((r) => r.words).join(" ")).not.toMatch(/\b(before|after|gain)\b/i);
  });
});

describe("work done on a head", () => {
  it("is changed once a version, and not from another shop", async () => {
    const { id } = must(await addOwnHead(a.as("tech"), { mark: "W-1", family: "Work" }));
    must(await changeHeadWork(a.as("tech"), { id, version: 1, workDone: ["epoxy", "weld"], notes: "" }));
    expect(await changeHeadWork(a.as("tech"), { id, version: 1, workDone: [], notes: "" })).toMatchObject({ ok: false, refusal: { code: "CHANGED_MEANWHILE" } });
    expect(await changeHeadWork(b.as("owner"), { id, version: 2, workDone: [], notes: "" })).toMatchObject({ ok: false, refusal: { code: "NOT_FOUND" } });
    await expect(changeHeadWork(a.as("counter"), { id, version: 2, workDone: [], notes: "" })).rejects.toThrow(NotFound);
  });
});

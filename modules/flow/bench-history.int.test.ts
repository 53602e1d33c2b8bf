import { beforeAll, describe, expect, it } from "vitest";
import { withShop } from "@/db/scope";
import { benchJob } from "@/tests/support/bench-job";
import { behindTheCurtain } from "@/tests/support/database";
import { must, testShop, type TestShop } from "@/tests/support/shop";
import { addOwnHead } from "./commands/families";
import { correctTest, completeTest, voidTest } from "./commands/finish-test";
import { addBench, addFixture, recordBenchCheck } from "./commands/gear";
import { headForPiece } from "./commands/head";
import { issueComparison } from "./commands/issue-comparison";
import { postWholeTest } from "./commands/post-test";
import { recordReading } from "./commands/record-reading";
import { gainForPiece } from "./queries/gain";
import { headFigures } from "./queries/head-figures";
import { familyPicture, overlayOf } from "./queries/library-family";
import { withRepeatHistory } from "./queries/repeat-history";
import { flowReportPdf, issuedReport } from "./queries/report";
import { flowSheetFor } from "./queries/sheet";
import { rawTests } from "./queries/tests-of-head";

const LIFTS = ["0.100", "0.200", "0.300"];
const BEFORE = "2026-02-16T15:00:00Z";
const AFTER = "2026-02-17T15:00:00Z";

let a: TestShop;
let b: TestShop;
let made = 0;
const gear = new Map<TestShop, { fixture: string }>();

beforeAll(async () => {
  a = await testShop("first");
  b = await testShop("second");
  for (const shop of [a, b]) gear.set(shop, { fixture: must(await addFixture(shop.as("lead"), { name: "77", boreMm: "77" })).id });
});
const newBench = async (shop = a): Promise<string> => must(await addBench(shop.as("lead"), { name: `Bench ${(made += 1)}` })).id;
const ownHead = async (shop = a): Promise<string> => must(await addOwnHead(shop.as("tech"), { mark: `H-${(made += 1)}`, family: "Repeats" })).id;
const base = (shop: TestShop, benchId: string) => ({ side: "intake" as const, benchId, fixtureId: gear.get(shop)?.fixture ?? "", nominal: "28", liftUnit: "in" as const, complete: true });

/** A finished test on the bench whose first `pairs` lifts were read twice, 0.4 CFM apart: one pair each, s = 0.4 / root 2. */
async function repeats(shop: TestShop, benchId: string, pairs: number, at: string, more: object = {}): Promise<string> {
  return must(await postWholeTest(shop.as("insp", at), {
    ...base(shop, benchId), headId: await ownHead(shop), purpose: "check", ...more,
    readings: Array.from({ length: pairs }, (_, i) => [30, 30.4].map((flow, k) => ({ lift: (0.02 * (i + 1)).toFixed(3), value: (flow + 8 * i).toFixed(1), repeatNo: k + 1 }))).flat(),
  })).testId;
}
/** A head of an order, each lift read once before and once after: +0.5, +3 and +6 CFM. */
async function pair(benchId: string, more: object = {}): Promise<{ headId: string; pieceId: string; before: string; after: string }> {
  const job = await benchJob(a, ["flow"]);
  const { headId } = await withShop(a.shop.id, async (tx) => must(await headForPiece({ ...a.as("tech"), tx }, job.pieceId)));
  const flow = async (purpose: "baseline" | "after", at: string, flows: readonly number[]) => {
    must(await recordBenchCheck(a.as("insp", at), { benchId, isFine: true }));
    return must(await postWholeTest(a.as("insp", at), { ...base(a, benchId), headId, purpose, ...more, readings: LIFTS.map((lift, i) => ({ lift, value: String(flows[i]) })) })).testId;
  };
  return { headId, pieceId: job.pieceId, before: await flow("baseline", BEFORE, [50, 80, 100]), after: await flow("after", AFTER, [50.5, 83, 106]) };
}
async function noiseOf(pieceId: string) {
  const intake = (await gainForPiece(a.as("counter"), pieceId)).ports[0]?.intake;
  if (!intake?.comparable) throw new Error("withheld");
  return intake.noise;
}
const verdicts = async (pieceId: string) => (await noiseOf(pieceId))?.rows.map((r) => r.words);
const NOT_ASSESSED = LIFTS.map(() => "not assessed");
const JUDGED = ["not distinguishable from zero, by bench history", ...[1, 2].map(() => "larger than the measurement noise (95 %), by bench history")];

describe("a lift read once", () => {
  it("is judged by ten repeat pairs of its bench, and not by nine", async () => {
    const bench = await newBench();
    const { pieceId } = await pair(bench);
    expect(await noiseOf(pieceId)).toMatchObject({ history: { pooledCfm: 0, pairs: 0 } });
    await repeats(a, bench, 9, "2026-01-10T15:00:00Z");
    expect((await noiseOf(pieceId))?.history).toMatchObject({ pairs: 9 });
    expect(await verdicts(pieceId)).toEqual(NOT_ASSESSED);
    await repeats(a, bench, 1, "2026-01-11T15:00:00Z");
    expect(await verdicts(pieceId)).toEqual(JUDGED);
    const noise = await noiseOf(pieceId);
    // Ten pairs 0.4 apart: root of 10 x 0.08 over 10. U = 2.23 (NIST TN 1297, Table B.1, 10) x 0.28284 x root 2 = 0.89: over the gain of 0.5, under that of 3.
    expect(noise?.history?.pairs).toBe(10);
    expect(noise?.history?.pooledCfm).toBeCloseTo(0.4 / Math.SQRT2, 6);
    expect(noise?.rows[0]?.expandedCfm).toBeCloseTo(2.228 * 0.4, 2);
  });
  it("is never judged by another bench's repeats, nor by another shop's", async () => {
    const [here, there, theirs] = [await newBench(), await newBench(), await newBench(b)];
    await repeats(a, there, 12, "2026-01-10T15:00:00Z");
    await repeats(b, theirs, 12, "2026-01-10T15:00:00Z");
    const { pieceId, headId } = await pair(here);
    expect((await noiseOf(pieceId))?.history).toEqual({ pooledCfm: 0, pairs: 0 });
    expect(await verdicts(pieceId)).toEqual(NOT_ASSESSED);
    // Handed a test that names the other shop's bench, the question is answered from one's own shop alone.
    const tests = await withShop(a.shop.id, (tx) => rawTests({ ...a.as("tech"), tx }, { headIds: [headId] }));
    const named = (id: string) => tests.map((t) => ({ ...t, bench: { ...t.bench, id } }));
    const pairsIn = async (shop: TestShop, id: string) => (await withShop(shop.shop.id, (tx) => withRepeatHistory({ ...shop.as("tech"), tx }, named(id)))).map((t) => t.history?.pairs);
    expect(await pairsIn(a, theirs)).toEqual([undefined, 0]);
    expect(await pairsIn(b, theirs)).toEqual([undefined, 12]);
    expect(await pairsIn(b, there)).toEqual([undefined, 0]);
  });
  it("is not judged by what is older than twelve months or younger than the newer test", async () => {
    const bench = await newBench();
    const { pieceId } = await pair(bench);
    await repeats(a, bench, 12, "2025-02-17T15:00:00Z");
    await repeats(a, bench, 12, "2026-02-17T15:00:01Z");
    expect((await noiseOf(pieceId))?.history?.pairs).toBe(0);
    await repeats(a, bench, 12, "2025-02-17T15:00:01Z");
    expect((await noiseOf(pieceId))?.history?.pairs).toBe(12);
    expect(await verdicts(pieceId)).toEqual(JUDGED);
  });
  it("is judged at one test pressure only: the spread is in CFM at that pressure", async () => {
    const bench = await newBench();
    const { pieceId } = await pair(bench);
    await repeats(a, bench, 12, "2026-01-10T15:00:00Z", { nominal: "10" });
    expect((await noiseOf(pieceId))?.history?.pairs).toBe(0);
  });
  it("loses the history of a test that is void, and takes a correction for what it corrects", async () => {
    const bench = await newBench();
    const { pieceId } = await pair(bench);
    const testId = await repeats(a, bench, 12, "2026-01-10T15:00:00Z");
    const fixed = must(await correctTest(a.as("insp", "2026-01-10T16:00:00Z"), { testId, reason: "second reading of the first lift" }));
    expect((await noiseOf(pieceId))?.history?.pairs).toBe(12);
    must(await recordReading(a.as("insp", "2026-01-10T16:00:00Z"), { testId: fixed.testId, lift: "0.020", value: "", repeatNo: 2, revisionSeen: 1 }));
    must(await completeTest(a.as("insp", "2026-01-10T16:10:00Z"), { testId: fixed.testId, version: 1 }));
    expect((await noiseOf(pieceId))?.history?.pairs).toBe(11);
    must(await voidTest(a.as("insp"), { testId: fixed.testId, version: 2, reason: "wrong fixture" }));
    // Its correction void, the first stands again.
    expect((await noiseOf(pieceId))?.history?.pairs).toBe(12);
    must(await voidTest(a.as("insp"), { testId, version: 2, reason: "wrong fixture" }));
    expect(await verdicts(pieceId)).toEqual(NOT_ASSESSED);
  });
});

describe("the history is where verdicts are", () => {
  it("on the sheet, the figures of the head and two tests over each other, and not in the family's picture", async () => {
    const bench = await newBench();
    await repeats(a, bench, 12, "2026-01-10T15:00:00Z");
    const { headId, before, after } = await pair(bench);
    const sheet = await flowSheetFor(a.as("tech"), headId, 1);
    expect(sheet.tests.map((t) => t.history?.pairs)).toEqual([undefined, 12]);
    const figures = (await headFigures(a.as("tech"), headId)).ports[0];
    expect([figures?.history?.pairs, figures?.noise?.map((r) => r.words)]).toEqual([12, JUDGED]);
    for (const ask of [{ a: before, b: after }, { a: after, b: before }]) {
      const over = await overlayOf(a.as("tech"), ask);
      expect([over.noise?.history?.pairs, over.noise?.rows.map((r) => r.words)]).toEqual([12, JUDGED]);
    }
    const picture = await familyPicture(a.as("tech"), { family: (await flowSheetFor(a.as("tech"), headId, 1)).head.family, side: "intake", last: 10 });
    expect(JSON.stringify(picture)).not.toMatch(/noise|history/);
  });
  it("frozen in an issued report: what happens to the bench's record later changes neither words nor paper", async () => {
    const bench = await newBench();
    const history = await repeats(a, bench, 12, "2026-01-10T15:00:00Z");
    const { headId, pieceId } = await pair(bench);
    const issue = () => issueComparison(a.as("insp", "2026-02-18T15:00:00Z"), { headId, customerWords: "" });
    const first = must(await issue());
    const noise = async (id: string) => { const gain = (await issuedReport(a.as("tech"), id)).sides[0]?.gain; return gain?.comparable ? gain.noise : undefined; };
    expect(await noise(first.comparisonId)).toMatchObject({ history: { pairs: 12 }, rows: JUDGED.map((words) => ({ words, byHistory: true })) });
    const paper = (await flowReportPdf(a.as("tech"), first.comparisonId)).bytes;
    expect(await issue()).toMatchObject({ ok: false, refusal: { code: "NOTHING_CHANGED" } });
    must(await voidTest(a.as("insp"), { testId: history, version: 2, reason: "wrong fixture" }));
    expect(await verdicts(pieceId)).toEqual(NOT_ASSESSED);
    expect((await noise(first.comparisonId))?.rows.map((r) => r.words)).toEqual(JUDGED);
    expect((await flowReportPdf(a.as("tech"), first.comparisonId)).bytes.equals(paper)).toBe(true);
    // The next one says something else, so it may be issued.
    const second = must(await issue());
    expect((await noise(second.comparisonId))?.rows.map((r) => r.words)).toEqual(NOT_ASSESSED);
  });
});

describe("what it costs", () => {
  it("the sums are kept with the test, and found by an index of tests with repeats alone", async () => {
    const bench = await newBench();
    const testId = await repeats(a, bench, 5, "2026-01-10T15:00:00Z");
    expect(await behindTheCurtain(`select repeat_dof || ' ' || round(repeat_squares_cfm2::numeric, 6) || ' ' || (bench_id = '${bench}') from flow_test_summaries where test_id = '${testId}'`)).toEqual(["5 0.400000 true"]);
    expect(await behindTheCurtain(`select indexdef from pg_indexes where indexname = 'flow_test_summaries_repeats'`)).toEqual([expect.stringMatching(/\(shop_id, bench_id, started_at\) WHERE \(repeat_dof > 0\)/)]);
    // Tests read once are not in it.
    const before = await pair(await newBench());
    expect(await behindTheCurtain(`select count(*)::text from flow_test_summaries where repeat_dof > 0 and head_id = '${before.headId}'`)).toEqual(["0"]);
  });
});

import { beforeAll, describe, expect, it } from "vitest";
import { NotFound } from "@/modules/access/context";
import { behindTheCurtain } from "@/tests/support/database";
import { must, testShop, type TestShop } from "@/tests/support/shop";
import { addOwnHead, setUpFamily } from "./commands/families";
import { addBench, addFixture } from "./commands/gear";
import { postWholeTest } from "./commands/post-test";
import { recordReading } from "./commands/record-reading";
import { setFlowLimits } from "./commands/set-limits";
import { startTest } from "./commands/start-test";
import { sheetFigures } from "./components/sheet/sheet-figures";
import { gearRoom } from "./queries/gear";
import { headFigures } from "./queries/head-figures";
import { flowSheetFor } from "./queries/sheet";

let a: TestShop;
let b: TestShop;
/** Own head, bench and adapter of a shop, with a finished before and after test of one port. */
async function tested(shop: TestShop) {
  const [benchId, fixtureId] = [must(await addBench(shop.as("lead"), { name: "Bench 1" })).id, must(await addFixture(shop.as("lead"), { name: "77", boreMm: "77" })).id];
  must(await setUpFamily(shop.as("lead"), { name: "F", bore: "77", stroke: "53.6", valves: (["left", "right"] as const).map((position) => ({ side: "intake" as const, position, head: "31", stem: "5.5" })) }));
  const headId = must(await addOwnHead(shop.as("tech"), { mark: "L-1", family: "F" })).id;
  const session = { headId, side: "intake" as const, benchId, fixtureId, nominal: "28", liftUnit: "mm" as const, complete: true };
  must(await postWholeTest(shop.as("tech"), { ...session, purpose: "baseline", readings: [{ lift: "2", value: "40" }, { lift: "4", value: "75" }, { lift: "6", value: "100" }] }));
  // 20 % more at 2 mm, less above.
  must(await postWholeTest(shop.as("tech"), { ...session, purpose: "after", readings: [{ lift: "2", value: "48" }, { lift: "4", value: "78" }, { lift: "6", value: "103" }] }));
  return { headId, benchId, fixtureId };
}
let ours: Awaited<ReturnType<typeof tested>>;
let theirs: typeof ours;
beforeAll(async () => {
  a = await testShop("first");
  b = await testShop("second");
  ours = await tested(a);
  theirs = await tested(b);
});

const none = { fallShare: "", zeroLiftExtraCfm: "", percentLow: "", percentHigh: "", cdLow: "", cdHigh: "", offNominalShare: "", outlierTimesMedian: "", outlierShareMin: "", gainShare: "", zeroDriftMm: "", leakShare: "" };
const versionOf = async (shop: TestShop) => (await gearRoom(shop.as("owner"))).limits.version;
const doubts = async (shop: TestShop, headId: string) => {
  const { tests } = await flowSheetFor(shop.as("tech"), headId, 1);
  return sheetFigures(tests, 8).sides[0]?.after?.figures.doubts.map((d) => `${d.flag}@${d.liftUm ?? ""}`);
};

describe("limits of the checks", () => {
  it("are set by the owner alone, once a version; nonsense is refused in words and changes nothing", async () => {
    const version = await versionOf(a);
    for (const who of ["tech", "lead", "mgr"] as const) await expect(setFlowLimits(a.as(who), { ...none, version, gainShare: "15" })).rejects.toThrow(NotFound);
    expect(await setFlowLimits(a.as("owner"), { ...none, version, percentLow: "60", percentHigh: "50" })).toMatchObject({ ok: false, refusal: { code: "INVALID_INPUT", fields: [{ path: "percentLow", message: "A number under the upper limit, 50 %." }] } });
    expect((await gearRoom(a.as("owner"))).limits).toEqual({ own: {}, version, maySet: true });
    must(await setFlowLimits(a.as("owner"), { ...none, version, gainShare: "15", zeroDriftMm: "0,08" }));
    expect(await setFlowLimits(a.as("owner"), { ...none, version, gainShare: "35" })).toMatchObject({ ok: false, refusal: { code: "CHANGED_MEANWHILE" } });
    expect((await gearRoom(a.as("tech"))).limits).toEqual({ own: { gainShare: 0.15, zeroDriftMm: 0.08 }, version: version + 1, maySet: false });
    expect(await behindTheCurtain(`select flow_limits::text from shop_settings where shop_id = '${b.shop.id}'`)).toEqual(["{}"]);
    expect(await behindTheCurtain(`select count(*)::text from audit_log where shop_id = '${a.shop.id}' and subject_kind = 'shop-settings' and subject_id = 'flow'`)).toEqual(["1"]);
  });
  it("decide what the sheet doubts, in their shop and no other", async () => {
    expect(await doubts(a, ours.headId)).toEqual(["GAIN_UNUSUAL@2000"]);
    expect(await doubts(b, theirs.headId)).toEqual([]);
  });
  it("decide what a reading answers with, and the coefficients of the head", async () => {
    must(await setFlowLimits(a.as("owner"), { ...none, version: await versionOf(a), offNominalShare: "5", cdHigh: "0.4" }));
    expect(await doubts(a, ours.headId)).toEqual([]);
    const answer = async (shop: TestShop, { headId, benchId, fixtureId }: typeof ours) => {
      const { testId } = must(await startTest(shop.as("tech"), { headId, side: "exhaust", purpose: "baseline", benchId, fixtureId, nominal: "28", liftUnit: "mm", lifts: ["2"] }));
      return must(await recordReading(shop.as("tech"), { testId, lift: "2", liftUnit: "mm", value: "30", pressure: "26", revisionSeen: 0 })).flags;
    };
    expect(await answer(a, ours)).toContain("PRESSURE_OFF_NOMINAL");
    expect(await answer(b, theirs)).not.toContain("PRESSURE_OFF_NOMINAL");
    const cds = async (shop: TestShop, headId: string) => (await headFigures(shop.as("tech"), headId)).ports[0]?.before?.rows.map((r) => r.flags.length > 0);
    // By the worked example of Heywood (6.10), 0.496 for 170 cfm over 1558 mm2 of curtain: 0.467, 0.438 and 0.389 here.
    expect(await cds(a, ours.headId)).toEqual([true, true, false]);
    expect(await cds(b, theirs.headId)).toEqual([false, false, false]);
  });
  it("all left empty are the product's again", async () => {
    must(await setFlowLimits(a.as("owner"), { ...none, version: await versionOf(a) }));
    expect(await behindTheCurtain(`select flow_limits::text from shop_settings where shop_id = '${a.shop.id}'`)).toEqual(["{}"]);
    const { tests } = await flowSheetFor(a.as("tech"), ours.headId, 1);
    expect(tests.every((t) => t.limits === undefined)).toBe(true);
  });
});

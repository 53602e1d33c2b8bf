import { beforeAll, describe, expect, it } from "vitest";
import { NotFound } from "@/modules/access/context";
import { HERO_FLOWS, HERO_LIFTS_UM } from "@/tests/support/hero-flow";
import { must, testShop, type TestShop } from "@/tests/support/shop";
import { addCamshaft, addOwnHead, setUpFamily } from "./commands/families";
import { addBench, addFixture, recordBenchCheck } from "./commands/gear";
import { postWholeTest } from "./commands/post-test";
import { showFlowEstimates } from "./commands/show-estimates";
import { liftText } from "./domain/lift-ladder";
import { headFigures } from "./queries/head-figures";

let a: TestShop;
let b: TestShop;
let head: string;
beforeAll(async () => {
  a = await testShop("first");
  b = await testShop("second");
  const bench = must(await addBench(a.as("lead"), { name: "Bench 1", readingUncertaintyCfm: 0.3, pressureUncertaintyInH2O: 0.1 })).id;
  const [fixture, other] = [must(await addFixture(a.as("lead"), { name: "77", boreMm: "77" })).id, must(await addFixture(a.as("lead"), { name: "80", boreMm: "80" })).id];
  must(await setUpFamily(a.as("lead"), { name: "S250-4V", bore: "77", stroke: "53.6", valves: (["left", "right"] as const).map((position) => ({ side: "intake" as const, position, head: "31", stem: "5.5" })) }));
  must(await addCamshaft(a.as("lead"), { label: "Stock", side: "intake", maxLift: ".340 in", duration: "240" }));
  head = must(await addOwnHead(a.as("tech"), { mark: "F-1", family: "S250-4V" })).id;
  for (const [when, purpose, at] of [["before", "baseline", "2026-02-16T15:00:00Z"], ["after", "after", "2026-02-17T15:00:00Z"]] as const) {
    must(await recordBenchCheck(a.as("insp", at), { benchId: bench, isFine: true }));
    for (const side of ["intake", "exhaust"] as const) {
      must(await postWholeTest(a.as("insp", at), {
        headId: head, side, purpose, benchId: bench, nominal: "28", liftUnit: "in", complete: true, camLift: ".340",
        // The exhaust was read through another sleeve afterwards: nothing may be compared.
        fixtureId: side === "exhaust" && when === "after" ? other : fixture,
        readings: HERO_LIFTS_UM.flatMap((um, i) => {
          const value = HERO_FLOWS[side][when][i] ?? 0;
          return side === "intake" && i === 3 ? [0, 0.2].map((d, k) => ({ lift: liftText(um, "in"), value: (value + d).toFixed(1), repeatNo: k + 1 })) : [{ lift: liftText(um, "in"), value: value.toFixed(1) }];
        }),
      }));
    }
  }
});

describe("coefficients and noise of a head", () => {
  it("rest on the family's valves, and judge only what was repeated", async () => {
    const { ports } = await headFigures(a.as("counter"), head);
    const intake = ports.find((p) => p.side === "intake");
    expect(intake?.valves).toBe("31 mm + 31 mm");
    expect(intake?.before?.rows).toHaveLength(8);
    expect(intake?.after?.rows.every((r) => r.cd > 0.3 && r.cd < 0.8)).toBe(true);
    expect(intake?.noise?.map((n) => n.verdict)).toEqual(["not_assessed", "not_assessed", "not_assessed", "larger_than_noise", "not_assessed", "not_assessed", "not_assessed", "not_assessed"]);
    expect(intake?.notStated).toEqual(["lift"]);
  });
  it("judge nothing and give no coefficient where tests differ or sizes are unknown", async () => {
    const exhaust = (await headFigures(a.as("tech"), head)).ports.find((p) => p.side === "exhaust");
    expect(exhaust).toMatchObject({ noise: null, before: null, after: null, valves: "" });
    expect(exhaust?.withheld.join(" ")).toMatch(/Bore fixture differs/);
  });
  it("stay in their shop", async () => {
    await expect(headFigures(b.as("owner"), head)).rejects.toThrow(NotFound);
  });
});

describe("estimates", () => {
  it("are off until the owner switches them on, once a version", async () => {
    const off = await headFigures(a.as("owner"), head);
    expect(off).toMatchObject({ estimates: null, maySwitch: true });
    await expect(showFlowEstimates(a.as("mgr"), { show: true, version: off.settingsVersion })).rejects.toThrow(NotFound);
    must(await showFlowEstimates(a.as("owner"), { show: true, version: off.settingsVersion }));
    expect(await showFlowEstimates(a.as("owner"), { show: false, version: off.settingsVersion })).toMatchObject({ ok: false, refusal: { code: "CHANGED_MEANWHILE" } });
    const on = await headFigures(a.as("tech"), head);
    expect(on.estimates).toMatchObject({ boreMm: 77, strokeMm: 53.6, cylinders: 1, cams: [{ label: "Stock", maxLiftUm: 8636, durationDeg: 240 }], ports: [{ when: "before" }, { when: "after" }] });
    expect(on.maySwitch).toBe(false);
    expect((await headFigures(b.as("owner"), must(await addOwnHead(b.as("tech"), { mark: "B-1", family: "X" })).id)).estimates).toBeNull();
  });
});

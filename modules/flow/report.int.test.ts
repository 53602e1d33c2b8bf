import { beforeAll, describe, expect, it } from "vitest";
import { NotFound } from "@/modules/access/context";
import { HERO_FLOWS, HERO_LIFTS_UM } from "@/tests/support/hero-flow";
import { must, testShop, type TestShop } from "@/tests/support/shop";
import { addCamshaft, addOwnHead } from "./commands/families";
import { addBench, addFixture, recordBenchCheck } from "./commands/gear";
import { completeTest, correctTest } from "./commands/finish-test";
import { issueComparison } from "./commands/issue-comparison";
import { postWholeTest } from "./commands/post-test";
import { recordReading } from "./commands/record-reading";
import { liftText } from "./domain/lift-ladder";
import { pagesOf } from "./pdf/report-on-one-page";
import { headFigures } from "./queries/head-figures";
import { issuedReports } from "./queries/issued-reports";
import { flowReportPdf, issuedReport } from "./queries/report";

const AFTER = "2026-02-17T15:00:00Z";
let a: TestShop;
let b: TestShop;
let head: string;
const tests: Record<string, string> = {};
beforeAll(async () => {
  a = await testShop("first");
  b = await testShop("second");
  const bench = must(await addBench(a.as("lead"), { name: "Bench 1" })).id;
  const fixture = must(await addFixture(a.as("lead"), { name: "77", boreMm: "77" })).id;
  const camshaft = must(await addCamshaft(a.as("lead"), { label: "Stock", side: "intake", maxLift: ".340 in", duration: "240" })).id;
  head = must(await addOwnHead(a.as("tech"), { mark: "R-1", family: "S250-4V" })).id;
  for (const [when, purpose, at] of [["before", "baseline", "2026-02-16T15:00:00Z"], ["after", "after", AFTER]] as const) {
    must(await recordBenchCheck(a.as("insp", at), { benchId: bench, isFine: true }));
    for (const side of ["intake", "exhaust"] as const) {
      const made = must(await postWholeTest(a.as("insp", at), {
        headId: head, side, purpose, benchId: bench, fixtureId: fixture, nominal: "28", liftUnit: "in", complete: true, camLift: ".340", ...(side === "intake" ? { camshaftId: camshaft } : {}),
        readings: HERO_LIFTS_UM.map((um, i) => ({
          lift: liftText(um, "in"), value: (HERO_FLOWS[side][when][i] ?? 0).toFixed(1), ...(side === "exhaust" && when === "before" && i === 5 ? { excludedReason: "clay had moved" } : {}),
        })),
      }));
      tests[`${side}-${when}`] = made.testId;
    }
  }
});
const issue = (customerWords = "") => issueComparison(a.as("insp", AFTER), { headId: head, customerWords });

describe("a report and the ones after it", () => {
  it("freezes means, ratio and what was left out, and each newer one says what it replaces and why; all stay reachable", async () => {
    const first = must(await issue());
    const frozen = await issuedReport(a.as("tech"), first.comparisonId);
    expect(frozen.kind).toBe(4);
    expect(frozen.replaces).toBeUndefined();
    const intake = frozen.sides.find((s) => s.side === "intake");
    expect(intake?.means).toMatchObject({ overLift: { fromUm: 1270, toUm: 8636 }, overCam: { camLabel: "Stock", isSynthetic: true, spanDeg: 240 } });
    expect(frozen.sides.find((s) => s.side === "exhaust")?.means?.overCam).toBe("no_cam");
    expect(frozen.ratios?.map((r) => [r.when, r.basis])).toEqual([["before", "own_cam_lift"], ["after", "own_cam_lift"]]);
    expect(frozen.notTested.join(" ")).toContain("Exhaust before: .300 read and left out: clay had moved.");
    expect(frozen.notTested.join(" ")).not.toContain("planned, not read");
    // The same, asked again from what the database gave back, is still the same.
    expect(await issue()).toMatchObject({ ok: false, refusal: { code: "NOTHING_CHANGED" } });
    const paper = (await flowReportPdf(a.as("tech"), first.comparisonId)).bytes;
    expect(pagesOf(paper)).toBe(1);

    const fixed = must(await correctTest(a.as("insp", AFTER), { testId: tests["intake-after"] ?? "", reason: "wrong range plate" }));
    must(await recordReading(a.as("insp", AFTER), { testId: fixed.testId, lift: ".050", value: "24.9", revisionSeen: 1 }));
    must(await completeTest(a.as("insp", AFTER), { testId: fixed.testId, version: 1 }));
    const second = must(await issue());
    expect((await issuedReport(a.as("tech"), second.comparisonId)).replaces).toMatchObject({ comparisonNo: 1, why: "intake after corrected (wrong range plate)" });
    const third = must(await issue("Ported to the drawing."));
    expect((await issuedReport(a.as("tech"), third.comparisonId)).replaces).toMatchObject({ comparisonNo: 2, why: "words to the customer changed" });

    const listed = await issuedReports(a.as("counter"), [head]);
    expect(listed.map((r) => [r.comparisonNo, r.replaces?.comparisonNo ?? null])).toEqual([[3, 2], [2, 1], [1, null]]);
    expect((await flowReportPdf(a.as("tech"), first.comparisonId)).bytes.equals(paper)).toBe(true);
    expect(pagesOf((await flowReportPdf(a.as("tech"), third.comparisonId)).bytes)).toBe(1);
  });
  it("shows the same figures on the page of figures, with every report", async () => {
    const figures = await headFigures(a.as("counter"), head);
    expect(figures.ports.find((p) => p.side === "intake")?.means).toMatchObject({ overCam: { camLabel: "Stock", isSynthetic: true } });
    expect(figures.ports.find((p) => p.side === "exhaust")?.readings.before).toHaveLength(7);
    expect(figures.ratios).toMatchObject([{ cylinder: 1, ratios: [{ when: "before" }, { when: "after" }] }]);
    expect(figures.reports).toHaveLength(3);
  });
  it("is not told in another shop, nor to who may not see flow", async () => {
    expect(await issuedReports(b.as("owner"), [head])).toEqual([]);
    const customer = { ...a.as("tech"), actor: { kind: "customer" as const, id: "22222222-2222-4222-8222-222222222222", name: "C", linkId: "l", purpose: "gain", subjectId: head } };
    await expect(issuedReports(customer, [head])).rejects.toThrow(NotFound);
  });
});

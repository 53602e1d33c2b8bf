import { liftWords } from "@/modules/flow/components/flow-words";
import type { NamedCam } from "@/modules/flow/domain/comparison-means";
import { ratiosOfPort } from "@/modules/flow/domain/port-ratios";
import type { RawTest } from "@/modules/flow/domain/raw-test";
import { notTestedWords, reportSide, type ReportSnapshot } from "@/modules/flow/domain/report-snapshot";
import { sideGain } from "@/modules/flow/domain/side-gain";
import { standingTests } from "@/modules/flow/domain/standing-tests";
import { valueOf } from "./value-of";

/** A report of tests as it would be issued today, for the hero's head. */
export function reportOf(tests: readonly RawTest[], more: Partial<ReportSnapshot> & { cam?: NamedCam } = {}): ReportSnapshot {
  const { cam, ...rest } = more;
  const sides = (["intake", "exhaust"] as const).map((side) => {
    const standing = standingTests(tests, side, "complete");
    return { side, standing, gain: valueOf(sideGain(standing, side, 8)) };
  });
  const [intake, exhaust] = sides;
  return {
    kind: 4, shop: { name: "Ninebark Headworks", address: "4 Sluice Road", phone: "555-0110", email: "counter@ninebark.example" }, locale: "en-US", zone: "America/Denver",
    head: { mark: "260224-07", family: "S250-4V", castingNumber: "K7-2201", orderNumber: "WO-2026-0118", customerName: "Odalys Brennan" },
    cylinder: 1, cylinders: 1, comparisonNo: 1, sides: sides.map((s) => reportSide(s, cam ?? null)), ratios: intake && exhaust ? ratiosOfPort(intake.standing, exhaust.standing) : [],
    notTested: notTestedWords(sides, 1, 1, (um) => liftWords(um, "in", "en-US")), customerWords: "", issuedBy: "June", issuedAt: "2026-03-12T18:00:00.000Z",
    ...rest,
  };
}

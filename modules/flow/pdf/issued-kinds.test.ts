import { createHash } from "node:crypto";
import { describe, expect, it } from "vitest";
import issued from "@/tests/support/issued-report.json";
import type { ReportSnapshot } from "../domain/report-snapshot";
import { flowReport } from "./flow-report";
import { reportPaper } from "./report-on-one-page";

/** A report as a shop's records hold it from before the fourth kind; JSON knows no narrower types. */
const snapshot = issued as unknown as ReportSnapshot;
/** SHA-256 of each kind's description, taken when that kind was the newest. */
const DESCRIPTIONS = {
  1: "171a9aed5bc7e42359b11b15dfc8324d6dd4012e9680da5be668ce5bf9af5fc3",
  2: "ee8e6ac09c56706620ab1e7a8e233187e76a55b856a73dfd123b20d6117d639c",
  3: "29068a9f8ad02ceed3fde52ae00aa95f200995a0d40ded3133b7052adb8ca627",
} as const;

describe("a report issued under an older kind", () => {
  it.each([1, 2, 3] as const)("is described as it was: kind %i", (kind) => {
    expect(createHash("sha256").update(JSON.stringify(flowReport({ ...snapshot, kind }).content)).digest("hex")).toBe(DESCRIPTIONS[kind]);
  });
  it("comes out the same twice, and has nothing of later kinds on it", async () => {
    const [one, two] = [await reportPaper(snapshot), await reportPaper(snapshot)];
    expect(one.equals(two)).toBe(true);
    expect(JSON.stringify(flowReport(snapshot).content)).not.toMatch(/Mean over|Valve lift|Exhaust to intake|Replaces/);
  });
});

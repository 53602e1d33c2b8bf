import { describe, expect, it } from "vitest";
import { minor } from "@/modules/kernel/money";
import { agingOf, bucketOf } from "./aging";

describe("aging", () => {
  it.each([
    ["2026-11-15", "not due"], ["2026-10-31", "not due"], ["2026-10-30", "1-30"], ["2026-10-01", "1-30"],
    ["2026-09-30", "31-60"], ["2026-09-01", "31-60"], ["2026-08-31", "61-90"], ["2026-08-02", "61-90"], ["2026-08-01", "over 90"],
  ])("due %s on 31 October is %s", (due, bucket) => expect(bucketOf(due, "2026-10-31")).toBe(bucket));

  it("the buckets add up to the total, credits with their invoice", () => {
    const a = agingOf([{ due: "2026-10-30", openMinor: minor(12_550) }, { due: "2026-10-29", openMinor: minor(-550) }, { due: "2026-01-01", openMinor: minor(100) }], "2026-10-31");
    expect(a).toEqual({ buckets: { "not due": 0, "1-30": 12_000, "31-60": 0, "61-90": 0, "over 90": 100 }, totalMinor: 12_100 });
    expect(agingOf([], "2026-10-31").totalMinor).toBe(0);
  });
});

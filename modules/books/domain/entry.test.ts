import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { minor } from "@/modules/kernel/money";
import { checkEntry, credit, debit, entryOf, mirror } from "./entry";

describe("journal entry", () => {
  it("is refused with the difference when it does not balance", () => {
    const lines = [{ account: "1100", amountMinor: minor(10_000) }, { account: "4000", amountMinor: minor(-9999) }];
    expect(checkEntry(lines)).toMatchObject({ ok: false, refusal: { code: "ENTRY_NOT_BALANCED", data: { differenceMinor: 1 } } });
    expect(checkEntry([...lines, { account: "4100", amountMinor: minor(-1) }])).toMatchObject({ ok: true });
  });

  it("is refused when empty or on an account that is not in the chart", () => {
    expect(checkEntry([])).toMatchObject({ refusal: { code: "ENTRY_EMPTY" } });
    expect(checkEntry([{ account: "1100", amountMinor: minor(0) }])).toMatchObject({ refusal: { code: "ENTRY_EMPTY" } });
    expect(checkEntry([{ account: "1100", amountMinor: minor(1) }, { account: "4999", amountMinor: minor(-1) }])).toMatchObject({
      refusal: { code: "ACCOUNT_UNKNOWN", field: "lines.1.account" },
    });
  });

  it("leaves out lines of nothing", () => {
    expect(entryOf(debit("1100", 5), debit("4900", 0), credit("4000", 5))).toEqual([{ account: "1100", amountMinor: 5 }, { account: "4000", amountMinor: -5 }]);
  });

  it("its mirror undoes it, line by line", () => {
    fc.assert(fc.property(fc.array(fc.integer({ min: -1e9, max: 1e9 }), { minLength: 1, maxLength: 9 }), (amounts) => {
      const lines = entryOf(...amounts.map((a) => debit("1100", a)), credit("4000", amounts.reduce((a, b) => a + b, 0)));
      const back = mirror(lines);
      expect(back.map((l, i) => l.amountMinor + (lines[i]?.amountMinor ?? NaN))).toEqual(lines.map(() => 0));
      if (lines.length > 1) expect(checkEntry(lines).ok && checkEntry(back).ok).toBe(true);
    }));
  });
});

import { describe, expect, it } from "vitest";
import { minor } from "@/modules/kernel/money";
import { applyDeposit, depositDue } from "./deposit-due";

describe("deposit", () => {
  // docs/hero-job.md: 30 % of 2,410.32 = 723.096.
  it.each([[241_032, 3000, 72_310], [241_032, 0, 0], [241_032, 10_000, 241_032]])("of %i at %i bp is %i", (total, bp, due) => {
    expect(depositDue(minor(total), bp)).toEqual({ ok: true, value: due });
  });

  it.each([-1, 10_001, 12.5])("refuses %d bp", (bp) => {
    expect(depositDue(minor(100), bp)).toMatchObject({ ok: false, refusal: { code: "PERCENT_OUT_OF_RANGE", field: "percent" } });
  });

  it.each([
    [263_343, 72_310, { appliedMinor: 72_310, surplusMinor: 0, openMinor: 191_033 }],
    [9500, 72_310, { appliedMinor: 9500, surplusMinor: 62_810, openMinor: 0 }],
    [9500, 0, { appliedMinor: 0, surplusMinor: 0, openMinor: 9500 }],
  ])("on an invoice of %i with %i held", (total, held, use) => expect(applyDeposit(minor(total), minor(held))).toEqual(use));
});

import { describe, expect, it } from "vitest";
import { leftToPay, owedBeforeLeaving, type OrderMoney } from "./may-leave";

// Figures: docs/hero-job.md, version 2 and its deposit.
const agreed: OrderMoney = { agreedMinor: 263_343, invoicedMinor: 0, invoices: 0, depositHeldMinor: 72_310, openMinor: 0 };
const billed: OrderMoney = { ...agreed, invoicedMinor: 263_343, invoices: 1, depositHeldMinor: 0, openMinor: 191_033 };

describe("may it leave", () => {
  it("counts the deposit before the invoice, and the open sum after it", () => {
    expect(leftToPay(agreed)).toBe(191_033);
    expect(leftToPay(billed)).toBe(191_033);
  });
  it("keeps it while money is owed, lets it go when paid", () => {
    expect(owedBeforeLeaving(billed, "receipt")).toBe(191_033);
    expect(owedBeforeLeaving({ ...billed, openMinor: 0 }, "receipt")).toBeNull();
  });
  it("lets customers with terms take it once billed, not before", () => {
    expect(owedBeforeLeaving(billed, "net_30")).toBeNull();
    expect(owedBeforeLeaving(agreed, "net_30")).toBe(191_033);
  });
});

import { renderToStaticMarkup } from "react-dom/server";
import { describe, expect, it } from "vitest";
import type { DisputeView } from "../queries";
import { DisputeList } from "./dispute-list";

const place = { id: "s", slug: "ninebark", name: "Ninebark Headworks", zone: "America/Denver", currency: "USD", locale: "en-US" };
const row: DisputeView = {
  id: "du_1", paymentId: "p", receiptNumber: "RC-2026-00004", customer: "Odalys Brennan", invoice: { id: "i", number: "INV-2026-00319" }, amountMinor: 33_000, phase: "taken",
  since: "2026-03-20T17:00:00Z", evidenceBy: "2026-03-27T17:00:00Z",
};
const textOf = (rows: readonly DisputeView[]) => renderToStaticMarkup(<DisputeList rows={rows} place={place} />).replace(/<[^>]+>/g, " ").replace(/\s+/g, " ");

describe("disputed charges on the bookkeeper's list", () => {
  it("say how much, whose, of which invoice, how it stands and until when evidence is taken", () => {
    const text = textOf([row]);
    for (const words of ["330.00", "Odalys Brennan", "RC-2026-00004", "INV-2026-00319", "taken back by the customer’s bank", "Mar 27, 2026, 11:00"]) expect(text).toContain(words);
  });
  it("ask for no evidence once it is over, and are not there when there are none", () => {
    expect(textOf([{ ...row, phase: "lost", evidenceBy: null }])).not.toContain("Evidence");
    expect(textOf([])).toBe("");
  });
});

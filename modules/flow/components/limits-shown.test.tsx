import { renderToStaticMarkup } from "react-dom/server";
import { describe, expect, it, vi } from "vitest";
import { PlaceProvider } from "@/modules/ui/place";
import { ToastProvider } from "@/modules/ui/toast";
import { LIMIT_FACTS, LIMIT_KEYS, sanityLimits, type OwnLimits } from "../domain/sanity-limits";
import { heroTest } from "@/tests/support/hero-tests";
import { HERO_FLOWS } from "@/tests/support/hero-flow";
import { flowLimitsInput } from "../limits-input";
import { LimitsForm, LimitsTable } from "./limits-form";
import { cellDoubts } from "./sheet/cell-words";
import { cellAt, sheetFigures } from "./sheet/sheet-figures";

vi.mock("next/navigation", () => ({ useRouter: () => ({ replace: () => undefined, refresh: () => undefined }) }));
vi.mock("../limits-actions", () => ({ setFlowLimitsAction: () => Promise.resolve(null) }));

const form = (own: OwnLimits, locale = "en-US") => renderToStaticMarkup(
  <PlaceProvider place={{ slug: "s", locale, currency: "USD", zone: "America/Denver" }}><ToastProvider><LimitsForm own={own} version={3} /></ToastProvider></PlaceProvider>,
);
const empty = { version: 1, ...Object.fromEntries(LIMIT_KEYS.map((k) => [k, ""])) };
const said = (typed: object) => { const r = flowLimitsInput.safeParse({ ...empty, ...typed }); return r.success ? [] : r.error.issues.map((i) => [i.path[0], i.message]); };

describe("the limits as the owner sees them", () => {
  it("each has a well with its unit, and the product's beside it", () => {
    const html = form({ gainShare: 0.25 });
    for (const key of LIMIT_KEYS) expect(html).toContain(LIMIT_FACTS[key].label);
    expect(html).toContain("Product default 40 %.");
    expect(html).toContain("Product default 0.05 mm.");
    expect(html).toMatch(/name="gainShare"[^>]*value="25"|value="25"[^>]*name="gainShare"/);
  });
  it("only one that was set has a way back", () => {
    expect(form({ gainShare: 0.25 }).match(/>Back to default</g)).toHaveLength(1);
    expect(form({})).not.toContain("Back to default");
  });
  it("who may not set them reads what holds and what the product says", () => {
    const words = renderToStaticMarkup(<LimitsTable own={{ gainShare: 0.25 }} locale="de-DE" />).replace(/<[^>]+>/g, " ").replace(/ +/g, " ");
    expect(words).toMatch(/Gain over the before test at a lift over 25 % 40 %/);
    expect(words).toContain("0,05 mm");
  });
});

describe("limits as typed", () => {
  it("take point or comma, and nothing for the product's", () => {
    expect(said({})).toEqual([]);
    expect(said({ zeroDriftMm: "0,08", gainShare: "12.5" })).toEqual([]);
  });
  it("refuse what is no number or beyond its range, in words", () => {
    expect(said({ gainShare: "much" })).toEqual([["gainShare", "A number from 5 to 200 %, with a point or a comma for decimals. Or leave it empty."]]);
    expect(said({ cdHigh: "1.2" })[0]?.[0]).toBe("cdHigh");
    expect(said({ leakShare: "0" })[0]?.[0]).toBe("leakShare");
  });
  it("refuse a lower limit at or over its upper one, the product's included", () => {
    expect(said({ percentLow: "60", percentHigh: "50" })).toEqual([["percentLow", "A number under the upper limit, 50 %."]]);
    expect(said({ cdLow: "0.8" })).toEqual([["cdLow", "A number under the upper limit, 0.8 Cd."]]);
    expect(said({ percentHigh: "20" })).toEqual([["percentHigh", "A number over the lower limit, 30 %."]]);
  });
  it("refuse a limit that is none", () => expect(flowLimitsInput.safeParse({ ...empty, choke: "1" }).success).toBe(false));
});

describe("the sheet", () => {
  it("judges by the shop's limit and says which it was", () => {
    const limits = sanityLimits({ gainShare: 0.1 });
    const tests = [heroTest("intake", "before", { limits }), heroTest("intake", "after", { limits, flows: HERO_FLOWS.intake.before.map((f) => f * 1.2) })];
    const col = sheetFigures(tests, 8).sides[0]?.after;
    if (!col) throw new Error("no column");
    const doubts = cellDoubts({ cell: cellAt(col, 1270), figures: col.figures, stuck: null, liftUm: 1270, text: "29.5", isTyping: false });
    expect(doubts).toEqual([{ short: "gain over 10 %", words: "Gain over 10 %. Check range and pressure of both tests.", isWrong: false, isCheck: true }]);
  });
});

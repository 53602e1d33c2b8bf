import { renderToStaticMarkup } from "react-dom/server";
import { describe, expect, it, vi } from "vitest";
import { PlaceProvider } from "@/modules/ui/place";
import { POWER_ESTIMATE_WORDS } from "../../domain/power-estimate";
import { WORKINGS } from "../../workings/registry";
import { addressOf, exampleTyped, type Typed } from "../../workings/typed-inputs";
import { WorkingsDesk } from "./workings-desk";
import { groupsFor } from "./workings-list";

const address = vi.hoisted(() => ({ search: "" }));
vi.mock("next/navigation", () => ({ useSearchParams: () => new URLSearchParams(address.search) }));

const place = { slug: "s", locale: "en-US", currency: "USD", zone: "America/Denver" };
function shown(name: string, typed: Typed = {}, estimatesOn = true, locale = "en-US"): string {
  address.search = name === "" ? "" : addressOf(name, typed);
  return renderToStaticMarkup(<PlaceProvider place={{ ...place, locale }}><WorkingsDesk estimatesOn={estimatesOn} /></PlaceProvider>);
}
/** What a person reads, tags taken out. */
const read = (html: string): string => html.replace(/<[^>]*>/g, " ").replaceAll("&#x27;", "'").replaceAll("&amp;", "&").replaceAll("&quot;", '"').replace(/\s+/g, " ");

describe("workings on a screen", () => {
  it.each(WORKINGS.map((w) => [w.name, w] as const))("%s shows its example with an answer, source and caution, every well with its own label", (_, w) => {
    const html = shown(w.name, exampleTyped(w, place.zone));
    const text = read(html);
    expect(text).toContain(w.purpose);
    expect(text).toContain(w.source);
    if (w.caution) expect(text).toContain(w.caution);
    expect(text).not.toMatch(/NaN|undefined|\[object|No answer\./);
    const answer = read(html.slice(html.indexOf('aria-live="polite"')));
    for (const o of w.outputs.filter((x) => !x.sometimes)) expect(answer).toContain(o.label);
    const labelled = new Set([...html.matchAll(/<label[^>]* for="([^"]+)"/g)].map((m) => m[1]));
    const wells = [...html.matchAll(/<(?:input|select|textarea)[^>]* id="([^"]+)"/g)].map((m) => m[1]);
    expect(wells.length).toBeGreaterThan(0);
    for (const id of wells) expect(labelled).toContain(id);
    for (const m of html.matchAll(/aria-describedby="([^"]+)"/g)) for (const id of (m[1] ?? "").split(" ")) expect(html).toContain(`id="${id}"`);
  });
  it("stand empty in words, list every function once, and say where there is none", () => {
    const html = shown("");
    expect(read(html)).toContain("No working in hand");
    for (const w of WORKINGS) expect(html.split(`href="${addressOf(w.name, {})}"`)).toHaveLength(2);
    expect(read(shown("no_such"))).toContain("There is no working of this name");
  });
  it("mark the one in hand, and give examples where nothing stands", () => {
    const html = shown("swept_volume");
    expect(html).toMatch(/aria-current="page"[^>]*>Swept volume/);
    expect(html).toContain('placeholder="61.2"');
    expect(read(html)).toContain("The answer stands here as you type.");
    expect(read(shown("swept_volume", { bore_mm: "72" }))).toContain("Still to type: Stroke, mm.");
  });
  it("write figures for the place, with no more digits than they have", () => {
    expect(read(shown("convert_test_pressure", { flow_cfm: "121", from_inH2O: "10", to_inH2O: "28" }))).toContain("202.5 CFM");
    expect(read(shown("convert_test_pressure", { flow_cfm: "121", from_inH2O: "10", to_inH2O: "28" }, true, "de-DE"))).toContain("202,5 CFM");
  });
  it("say a doubt in words beside its shape, and a loss as plainly as a gain", () => {
    const doubted = shown("convert_test_pressure", { flow_cfm: "121", from_inH2O: "10", to_inH2O: "28" });
    expect(doubted).toMatch(/<ul class="wk-flags"[^>]*><li><svg/);
    expect(read(doubted)).toContain("Converted from another test pressure.");
    const gain = read(shown("gain_table", { lifts_mm: "1 2 3", before_cfm: "14.2 27.8 40.1", after_cfm: "13.6 27.5 41.9" }));
    expect(gain).toMatch(/▼ −0\.6/);
    expect(gain).toContain("1.8");
    expect(read(shown("sanity_flags", { lifts_mm: "2 4 6 8", flows_cfm: "30 55 70 68.2" }))).toContain("At lift 8: Flow falls here.");
    expect(read(shown("sanity_flags", { lifts_mm: "2 4 6 8", flows_cfm: "30 55 70 78" }))).toContain("Nothing here deserves a second look.");
    expect(read(shown("comparability", { "before.bench": "A", "after.bench": "B" }))).toMatch(/May be compared no .*another bench/);
  });
  it("refuse in words, beside the well, and keep what was typed", () => {
    const html = shown("flow_from_range_percent", { range_cfm: "60", percent: "103" });
    expect(read(html)).toContain("No answer. The reading is outside the scale.");
    expect(html).toMatch(/value="103"[^>]*aria-invalid="true"|aria-invalid="true"[^>]*value="103"/);
    expect(read(html.slice(html.indexOf('aria-live="polite"')))).not.toMatch(/Flow \d/);
  });
  it("fold long forms, and unfold them where something stands", () => {
    expect(shown("spring")).toMatch(/<details class="mt-4"><summary/);
    expect(shown("spring", { wire_mm: "3.8" })).toMatch(/<details class="mt-4" open=""><summary/);
    expect(shown("lash_shim")).not.toContain("<details");
  });
  it("give no estimate in a shop that did not switch them on, whatever stands in the address", () => {
    for (const w of WORKINGS.filter((x) => x.isEstimate)) {
      const text = read(shown(w.name, exampleTyped(w, place.zone), false));
      expect(text).toContain("Estimates from airflow are off in this shop");
      expect(text.split(POWER_ESTIMATE_WORDS)).toHaveLength(2);
      expect(text.slice(text.indexOf("Answer"))).not.toMatch(/\d+ (kW|hp|r\/min)/);
    }
    const on = read(shown("power_bracket", { mean_flow_cfm: "64.80064", dp_inH2O: "28", density_kg_m3: "1.199314", engine_air_density_kg_m3: "1.2041", sound_speed_m_s: "343.2337", cylinders: "1" }));
    expect(on).toContain("10 kW, estimate");
    expect(on).toContain(POWER_ESTIMATE_WORDS);
  });
});

describe("the search", () => {
  it("finds by word of the title, by name and by group", () => {
    expect(groupsFor("shim").flatMap((g) => g.workings.map((w) => w.name))).toContain("lash_shim");
    expect(groupsFor("moist_air")[0]?.workings[0]?.name).toBe("moist_air_density");
    expect(groupsFor("Epoxy").map((g) => g.key)).toEqual(["epoxy"]);
    expect(groupsFor("engine estimates").map((g) => g.key)).toContain("engine");
    expect(groupsFor("quillfinch")).toEqual([]);
    expect(groupsFor("").flatMap((g) => g.workings)).toHaveLength(WORKINGS.length);
  });
});

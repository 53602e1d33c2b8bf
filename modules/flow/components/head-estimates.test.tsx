import { readdirSync, readFileSync } from "node:fs";
import path from "node:path";
import { renderToStaticMarkup } from "react-dom/server";
import { describe, expect, it } from "vitest";
import { PlaceProvider } from "@/modules/ui/place";
import { HERO_FLOWS, HERO_LIFTS_UM } from "@/tests/support/hero-flow";
import { POWER_ESTIMATE_WORDS } from "../domain/power-estimate";
import type { EstimateFacts } from "../queries/head-figures";
import { HeadEstimates } from "./head-estimates";
import { NoiseVerdicts } from "./noise-verdicts";

const place = { slug: "s", locale: "en-US", currency: "USD", zone: "America/Denver" };
const facts: EstimateFacts = {
  cylinders: 1, boreMm: 77, strokeMm: 53.6, cams: [{ id: "c", label: "Stock", maxLiftUm: 8636, durationDeg: 240, profile: [] }],
  ports: [{ cylinder: 1, when: "after", atInH2O: 28, readings: HERO_LIFTS_UM.map((liftUm, i) => ({ liftUm, flowCfm: HERO_FLOWS.intake.after[i] ?? 0 })) }],
};
const render = (f: EstimateFacts) => renderToStaticMarkup(<PlaceProvider place={place}><HeadEstimates facts={f} /></PlaceProvider>);

describe("estimates on a screen", () => {
  it("stand under the fixed words, and every figure of power says estimate beside it", () => {
    const html = render(facts);
    expect(html).toContain(POWER_ESTIMATE_WORDS);
    expect(html).toMatch(/\d+ to \d+ hp/);
    for (const m of html.matchAll(/\d+ to \d+ hp/g)) expect(html.slice(Math.max(0, m.index - 40), m.index)).toContain("estimate");
    expect(html).toContain("cam drawn from lift and duration");
  });
  it("keep their words when there is nothing to estimate from", () => {
    const html = render({ ...facts, cams: [] });
    expect(html).toContain(POWER_ESTIMATE_WORDS);
    expect(html).not.toMatch(/\d+ to \d+ hp/);
  });
  it("are made in the flow room only: no paper, invoice, payment or customer page takes them in", () => {
    const root = path.join(import.meta.dirname, "../../..");
    const takers = ["modules", "app", "worker"].flatMap((folder) => readdirSync(path.join(root, folder), { recursive: true, withFileTypes: true })
      .filter((e) => e.isFile() && /\.tsx?$/.test(e.name) && !/\.test\.tsx?$/.test(e.name)).map((e) => path.relative(root, path.join(e.parentPath, e.name))))
      .filter((file) => /from "[^"]*(engine-estimate|power-estimate|head-estimates|workings\/(registry|engine)|\.\/registry|\.\/engine)"/.test(readFileSync(path.join(root, file), "utf8")));
    expect(takers.sort()).toEqual([
      "app/s/[shop]/flow/figures/[head]/page.tsx", "modules/flow/components/head-estimates.tsx", "modules/flow/components/workings/workings-desk.tsx", "modules/flow/components/workings/workings-list.tsx", "modules/flow/domain/engine-estimate.ts",
      "modules/flow/workings-endpoints.ts", "modules/flow/workings-input.ts", "modules/flow/workings/engine.ts", "modules/flow/workings/listing.ts", "modules/flow/workings/registry.ts", "modules/flow/workings/typed-inputs.ts",
    ]);
  });
});

describe("the noise verdict on a screen", () => {
  it("is said in words beside its shape, and nothing is called a gain where the tests differ", () => {
    const shown = renderToStaticMarkup(<NoiseVerdicts locale="en-US" port={{ liftUnit: "in", withheld: [], notStated: ["lift"], noise: [
      { liftUm: 1270, verdict: "not_assessed", words: "not assessed", differenceCfm: 0.4, expandedCfm: null, marginCfm: null, before: 1, after: 1 },
      { liftUm: 2540, verdict: "within_noise", words: "not distinguishable from zero", differenceCfm: -0.2, expandedCfm: 0.9, marginCfm: 0.9, before: 3, after: 3 },
    ] }} />);
    expect(shown).toContain("not assessed");
    expect(shown).toContain("not distinguishable from zero");
    expect(shown).toContain("−0.2");
    const withheld = renderToStaticMarkup(<NoiseVerdicts locale="en-US" port={{ liftUnit: "in", noise: null, withheld: ["Bore fixture differs: before 77 mm, after 80 mm."], notStated: [] }} />);
    expect(withheld).toContain("Bore fixture differs");
    expect(withheld).not.toMatch(/gain/i);
  });
});

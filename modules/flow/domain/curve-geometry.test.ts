import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { HERO_CAM_UM, heroSet } from "@/tests/support/hero-flow";
import { refusalOf, valueOf } from "@/tests/support/value-of";
import { curveGeometry, type CurveGeometry, type CurveGeometryInput, type CurveLine } from "./curve-geometry";
import { interpolateFlow } from "./interpolate-flow";
import { overlaps, spreadApart } from "./label-placement";
import { neighbours } from "./neighbours";
import { pathText, type Segment } from "./path-segments";

const line = (side: "intake" | "exhaust", gain: CurveLine["gain"] = "shown"): CurveLine => ({
  side,
  before: heroSet(side, "before").readings,
  after: heroSet(side, "after").readings,
  gain,
});
const draw = (change: Partial<CurveGeometryInput> = {}): CurveGeometry =>
  valueOf(
    curveGeometry({
      widthPx: 620,
      heightPx: 420,
      unit: "in",
      atInH2O: 28,
      camLiftUm: HERO_CAM_UM,
      lines: [line("intake"), line("exhaust")],
      ...change,
    }),
  );
const lossLine: CurveLine = {
  side: "exhaust",
  before: [14.2, 27.8, 40.1, 50.6, 58.4, 63.0].map((flowCfm, i) => ({ liftUm: (i + 1) * 1000, flowCfm })),
  after: [13.6, 27.5, 41.9, 54.8, 64.9, 71.3].map((flowCfm, i) => ({ liftUm: (i + 1) * 1000, flowCfm })),
  gain: "shown",
};

/** Walks a cubic and gives points on it. */
function pointsAlong(segments: readonly Segment[], parts = 20): { x: number; y: number }[] {
  const out: { x: number; y: number }[] = [];
  let at = { x: 0, y: 0 };
  for (const s of segments) {
    if (s.kind === "close") continue;
    if (s.kind === "curve") {
      for (let i = 1; i <= parts; i += 1) {
        const t = i / parts;
        const u = 1 - t;
        const mix = (a: number, b: number, c: number, d: number) => u ** 3 * a + 3 * u * u * t * b + 3 * u * t * t * c + t ** 3 * d;
        out.push({ x: mix(at.x, s.x1, s.x2, s.x), y: mix(at.y, s.y1, s.y2, s.y) });
      }
    } else out.push({ x: s.x, y: s.y });
    at = { x: s.x, y: s.y };
  }
  return out;
}

describe("flow curve", () => {
  it("draws exactly the interpolated figures, through every reading", () => {
    const g = draw();
    const top = g.points.find((p) => p.liftUm === 10160 && p.side === "intake" && p.when === "after");
    const perCfm = (g.plot.bottom - (top?.y ?? 0)) / 143.6;
    const perUm = (g.plot.right - g.plot.left) / 10160;
    const after = heroSet("intake", "after").readings;
    const table = { lifts: after.map((r) => r.liftUm), flowsCfm: after.map((r) => r.flowCfm) };
    const drawn = g.lines.find((l) => l.side === "intake" && l.when === "after");
    const walked = pointsAlong(drawn?.segments ?? []);
    expect(walked.length).toBe(7 * 20 + 1);
    for (const p of walked) {
      const lift = Math.min(10160, (p.x - g.plot.left) / perUm);
      expect((g.plot.bottom - p.y) / perCfm).toBeCloseTo(valueOf(interpolateFlow(table, lift)), 6);
    }
  });
  it("intake solid and filled, exhaust dashed and open; before thin, after thick", () => {
    const g = draw();
    expect(g.lines.map((l) => [l.side, l.when, l.isDashed, l.widthPx])).toEqual([
      ["intake", "before", false, 1.6],
      ["intake", "after", false, 2.6],
      ["exhaust", "before", true, 1.6],
      ["exhaust", "after", true, 2.6],
    ]);
    expect(g.points).toHaveLength(32);
    expect(g.points.every((p) => p.isFilled === (p.side === "intake"))).toBe(true);
  });
  it("begins at the first reading, with both axes from zero", () => {
    const g = draw();
    expect(g.liftTicks[0]).toMatchObject({ liftUm: 0, x: g.plot.left });
    expect(g.flowTicks[0]).toEqual({ flowCfm: 0, y: g.plot.bottom, text: "0" });
    expect(g.lines[0]?.segments[0]).toMatchObject({ kind: "move" });
    expect(Math.min(...pointsAlong(g.lines[0]?.segments ?? []).map((p) => p.x))).toBeGreaterThan(g.plot.left + 10);
  });
  it("scale: long tick per .100, short per .050, only long ones named", () => {
    const g = draw();
    expect(g.liftTicks.map((t) => [t.lengthPx, t.text ?? ""])).toEqual([
      [8, ""],
      [4, ""],
      [8, ".100"],
      [4, ""],
      [8, ".200"],
      [4, ""],
      [8, ".300"],
      [4, ""],
      [8, ".400"],
    ]);
    expect(g.flowTicks.map((t) => t.text)).toEqual(["0", "20", "40", "60", "80", "100", "120", "140"]);
    expect(g.flowTitle?.text).toBe("CFM at 28 in H₂O");
    expect(draw({ unit: "mm", lines: [lossLine], camLiftUm: null }).liftTicks.flatMap((t) => t.text ?? [])).toEqual(["2.0", "4.0", "6.0"]);
  });
  it("the reader's decimal sign is used", () => {
    const g = draw({ unit: "mm", decimalText: (v, d) => v.toFixed(d).replace(".", ",") });
    expect(g.cam?.text).toBe("Cam lift 8,6");
  });
  it("cam lift stands at its place on the scale, its plate inside the box", () => {
    const g = draw();
    expect(g.cam?.x).toBeCloseTo(g.plot.left + (HERO_CAM_UM / 10160) * (g.plot.right - g.plot.left), 6);
    expect(g.cam?.text).toBe("Cam lift .340");
    const far = draw({ camLiftUm: 30_000 });
    expect(far.cam?.x).toBeCloseTo(far.plot.right, 6);
    for (const s of far.cam?.plate?.segments ?? []) if (s.kind !== "close") expect(s.x).toBeLessThanOrEqual(620);
  });
  it("path text says the same as the segments", () => {
    for (const l of draw().lines) {
      expect(l.path).toBe(pathText(l.segments));
      expect(l.path.match(/C/g)).toHaveLength(7);
      expect(l.path).not.toMatch(/NaN|Infinity|undefined/);
    }
  });
  it("mini form below 480 px: no plates, fewer ticks, the after lines named", () => {
    const g = draw({ widthPx: 360, heightPx: 240 });
    expect(g.mini).toBe(true);
    expect(g.flowTicks.map((t) => t.text)).toEqual(["0", "50", "100", "150"]);
    expect(g.labels.map((l) => l.lines)).toEqual([
      ["Intake", "after"],
      ["Exhaust", "after"],
    ]);
    expect(g.cam?.plate).toBeNull();
    expect(draw({ widthPx: 360, heightPx: 240, lines: [lossLine] }).losses.map((l) => [l.gainCfm, l.plate])).toEqual([
      [-0.6, null],
      [-0.3, null],
    ]);
  });
  it("says the key readings in words", () => {
    expect(draw().description).toBe(
      "Flow in CFM against valve lift. Intake at .400: 127.0 before, 143.6 after. Exhaust at .400: 94.8 before, 105.1 after. Cam lift .340.",
    );
    expect(draw({ lines: [lossLine], unit: "mm" }).description).toContain("Exhaust lost 0.6 at 1.0. Exhaust lost 0.3 at 2.0.");
  });
});

describe("area between before and after", () => {
  it("is one gain for each hero side, between the two curves", () => {
    const g = draw();
    expect(g.areas.map((a) => [a.side, a.kind])).toEqual([
      ["intake", "gain"],
      ["exhaust", "gain"],
    ]);
    expect(g.areas[0]?.segments.filter((s) => s.kind === "curve")).toHaveLength(14);
    expect(g.areas[0]?.path.endsWith("Z")).toBe(true);
  });
  it("has the size of the integral of the gain", () => {
    const g = draw({ lines: [line("intake")] });
    const outline = pointsAlong(g.areas[0]?.segments ?? [], 200);
    const shoelace = Math.abs(outline.reduce((s, p, i) => s + p.x * ((outline[(i + 1) % outline.length]?.y ?? 0) - (outline.at(i - 1)?.y ?? 0)), 0) / 2);
    const flows = (when: "before" | "after") => {
      const { readings } = heroSet("intake", when);
      return { lifts: readings.map((r) => r.liftUm), flowsCfm: readings.map((r) => r.flowCfm) };
    };
    let integral = 0;
    const n = 4000;
    for (let i = 0; i < n; i += 1) {
      const lift = 1270 + ((10160 - 1270) * (i + 0.5)) / n;
      integral += (valueOf(interpolateFlow(flows("after"), lift)) - valueOf(interpolateFlow(flows("before"), lift))) * ((10160 - 1270) / n);
    }
    const perUm = (g.plot.right - g.plot.left) / 10160;
    const perCfm = (g.plot.bottom - g.plot.top) / (143.6 * 1.05);
    expect(shoelace).toBeCloseTo(integral * perUm * perCfm, 0);
  });
  it("parts into loss and gain where the curves meet, and the parts do not overlap", () => {
    const g = draw({ lines: [lossLine], unit: "mm", camLiftUm: null });
    expect(g.areas.map((a) => a.kind)).toEqual(["loss", "gain"]);
    const spans = g.areas.map((a) => pointsAlong(a.segments).map((p) => p.x));
    expect(Math.max(...(spans[0] ?? []))).toBeCloseTo(Math.min(...(spans[1] ?? [])), 3);
    // Near the straight-line crossover of the figures, 2.143 mm.
    const meet = (Math.max(...(spans[0] ?? [])) - g.plot.left) / ((g.plot.right - g.plot.left) / 6);
    expect(meet).toBeGreaterThan(2);
    expect(meet).toBeLessThan(2.3);
  });
  it("goes only as far as both have been read", () => {
    const partial = { ...line("intake"), after: heroSet("intake", "after").readings.slice(0, 4) };
    const g = draw({ lines: [partial] });
    const end = g.points.find((p) => p.when === "after" && p.liftUm === 5080)?.x ?? 0;
    expect(Math.max(...pointsAlong(g.areas[0]?.segments ?? []).map((p) => p.x))).toBeCloseTo(end, 6);
  });
  it("is not made when the gain is withheld, and no loss is marked or told", () => {
    const g = draw({ lines: [{ ...lossLine, gain: "withheld" }], unit: "mm" });
    expect(g.areas).toEqual([]);
    expect(g.losses).toEqual([]);
    expect(g.description).not.toContain("lost");
    expect(g.lines).toHaveLength(2);
  });
});

describe("losses", () => {
  it("every loss has its plate, off the other plates, the labels and the curve", () => {
    const g = draw({ lines: [lossLine], unit: "mm" });
    expect(g.losses.map((l) => [l.liftUm, l.gainCfm, l.text])).toEqual([
      [1000, -0.6, "▼ loss −0.6"],
      [2000, -0.3, "▼ loss −0.3"],
    ]);
    const boxes = [...g.losses.flatMap((l) => (l.plate ? [l.plate] : [])), ...g.labels.map((l) => l.box)];
    expect(boxes).toHaveLength(4);
    boxes.forEach((a, i) => boxes.slice(i + 1).forEach((b) => expect(overlaps(a, b)).toBe(false)));
    const curve = g.lines.flatMap((l) => pointsAlong(l.segments));
    for (const { plate } of g.losses) for (const p of curve) expect(plate && overlaps(plate, { ...p, width: 0.01, height: 0.01 })).toBe(false);
  });
});

describe("labels at the line ends", () => {
  it("never overlap, whatever the readings", () => {
    const flows = fc.array(fc.integer({ min: 0, max: 3000 }), { minLength: 0, maxLength: 8 });
    fc.assert(
      fc.property(flows, flows, flows, flows, fc.constantFrom([620, 420], [360, 240], [280, 180], [900, 500]), (a, b, c, d, [widthPx = 0, heightPx = 0]) => {
        const set = (list: readonly number[]) => list.map((n, i) => ({ liftUm: (i + 1) * 1270, flowCfm: n / 10 }));
        const g = draw({
          widthPx,
          heightPx,
          lines: [
            { side: "intake", before: set(a), after: set(b), gain: "shown" },
            { side: "exhaust", before: set(c), after: set(d), gain: "shown" },
          ],
        });
        const boxes = g.labels.map((l) => l.box);
        boxes.forEach((p, i) => boxes.slice(i + 1).forEach((q) => expect(overlaps(p, q)).toBe(false)));
        for (const p of boxes) {
          expect(p.x + p.width).toBeLessThanOrEqual(widthPx);
          expect(p.y).toBeGreaterThanOrEqual(0);
        }
        const plates = g.losses.flatMap((l) => (l.plate ? [l.plate] : []));
        plates.forEach((p, i) => [...plates.slice(i + 1), ...boxes].forEach((q) => expect(overlaps(p, q)).toBe(false)));
        for (const l of [...g.lines, ...g.areas]) expect(l.path).not.toMatch(/NaN|Infinity/);
      }),
    );
  });
  it("spread keeps the gap, the range and the order of the wishes", () => {
    fc.assert(
      fc.property(fc.array(fc.double({ min: -50, max: 350, noNaN: true }), { maxLength: 8 }), (wanted) => {
        const placed = spreadApart(wanted, 15, 20, 300);
        const sorted = wanted.map((w, i) => ({ w, p: placed[i] ?? NaN })).sort((a, b) => a.p - b.p);
        for (const [a, b] of neighbours(sorted)) {
          expect(b.p - a.p).toBeGreaterThanOrEqual(15 - 1e-9);
          expect(b.w).toBeGreaterThanOrEqual(a.w);
        }
        for (const p of placed) expect(p >= 20 - 1e-9 && p <= 300 + 1e-9).toBe(true);
      }),
    );
    expect(spreadApart([50, 100], 15, 0, 300)).toEqual([50, 100]);
    expect(spreadApart([100, 100], 15, 0, 300)).toEqual([92.5, 107.5]);
  });
});

describe("what cannot be drawn", () => {
  it("is refused", () => {
    const base = { widthPx: 620, heightPx: 420, unit: "in" as const, atInH2O: 28, camLiftUm: null };
    const twice = { ...line("intake"), before: [{ liftUm: 1, flowCfm: 1 }, { liftUm: 1, flowCfm: 2 }] };
    expect(refusalOf(curveGeometry({ ...base, lines: [twice] })).code).toBe("LIFTS_NOT_INCREASING");
    expect(refusalOf(curveGeometry({ ...base, widthPx: 100, lines: [] })).code).toBe("GEOMETRY_INVALID");
    const negative = { ...line("intake"), before: [{ liftUm: 1, flowCfm: -1 }] };
    expect(refusalOf(curveGeometry({ ...base, lines: [negative] })).code).toBe("READING_OUT_OF_RANGE");
  });
  it("an empty sheet still has its axes; one reading is a point", () => {
    const empty = draw({ lines: [], camLiftUm: null });
    expect([empty.lines, empty.points, empty.areas]).toEqual([[], [], []]);
    expect(empty.flowTicks.length).toBeGreaterThan(1);
    const one = draw({ lines: [{ side: "intake", before: [{ liftUm: 1270, flowCfm: 24.6 }], after: [], gain: "shown" }] });
    expect(one.points).toHaveLength(1);
    expect(one.lines).toEqual([]);
  });
});

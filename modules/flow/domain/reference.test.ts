import { jStat } from "jstat";
import { unit } from "mathjs";
import { describe, expect, it } from "vitest";
import pchip from "@/tests/checks/pchip-scipy.json";
import { moistAirDensity } from "./air-density";
import { correctToReferenceDensity } from "./density-reference";
import { knotOfTable } from "./interpolate-flow";
import { idealMassFlow } from "./ideal-mass-flow";
import { seatFlowArea } from "./seat-flow-area";
import { speedOfSound } from "./speed-of-sound";
import { tFactor } from "./t-factor";
import { convertUnit, unitKind, UNIT_NAMES, type UnitName } from "./units";
import { valueOf } from "@/tests/support/value-of";

const within = (actual: number, expected: number, share: number) =>
  expect(Math.abs(actual / expected - 1), `${actual} against ${expected}`).toBeLessThanOrEqual(share);

describe("units against mathjs", () => {
  /** How mathjs writes our units; its inch of water is the conventional one, built from mmH2O. */
  const theirs: Readonly<Partial<Record<UnitName, string>>> = {
    Pa: "Pa",
    hPa: "hPa",
    kPa: "kPa",
    psi: "psi",
    "ft3/min": "ft^3/minute",
    "L/s": "L/s",
    "m3/h": "m^3/hour",
    "m3/s": "m^3/s",
    mm: "mm",
    in: "in",
    mm2: "mm^2",
    in2: "in^2",
    "lbf/in": "lbf/in",
    "N/mm": "N/mm",
    lbf: "lbf",
    N: "N",
    cc: "cm^3",
    in3: "in^3",
  };
  const pairs = UNIT_NAMES.flatMap((from) =>
    UNIT_NAMES.filter((to) => to !== from && unitKind(to) === unitKind(from)).flatMap((to) => {
      const a = theirs[from];
      const b = theirs[to];
      return a && b ? [[from, to, a, b] as const] : [];
    }),
  );
  it("has pairs of every kind but mass flow to try", () => expect(pairs.length).toBeGreaterThanOrEqual(30));
  it.each(pairs)("%s to %s", (from, to, a, b) => {
    within(valueOf(convertUnit(123.4, from, to)), unit(123.4, a).toNumber(b), 1e-9);
  });
  it("an inch of water is 25.4 mm of water", () => {
    within(valueOf(convertUnit(28, "inH2O_conventional", "Pa")), unit(28 * 25.4, "mmH2O").toNumber("Pa"), 1e-12);
  });
  it("the three inches of water and mercury as printed in NIST SP 811 B.8", () => {
    expect(valueOf(convertUnit(1, "inH2O_39.2F", "Pa"))).toBeCloseTo(249.082, 9);
    expect(valueOf(convertUnit(1, "inH2O_60F", "Pa"))).toBeCloseTo(248.84, 9);
    expect(valueOf(convertUnit(1, "inHg_conventional", "Pa"))).toBeCloseTo(3386.389, 9);
    expect(valueOf(convertUnit(1, "inH2O_conventional", "Pa"))).toBeCloseTo(249.0889, 3);
  });
  it("mass flow is volume flow times density", () => {
    within(valueOf(convertUnit(100, "ft3/min", "kg/h", 1.2)), unit(100, "ft^3/minute").toNumber("m^3/hour") * 1.2, 1e-9);
    within(valueOf(convertUnit(203.88, "kg/h", "m3/h", 1.2)), 169.9, 1e-9);
  });
});

describe("t factor", () => {
  it.each([0.5, 0.6827, 0.9, 0.95, 0.9545, 0.99, 0.9973].flatMap((c) => [1, 2, 3, 4, 5, 7.5, 10, 29, 125, 1000].map((dof) => [c, dof] as const)))(
    "agrees with jstat at confidence %d and %d degrees of freedom",
    (confidence, dof) => within(valueOf(tFactor(confidence, dof)), jStat.studentt.inv((1 + confidence) / 2, dof), 2e-6),
  );
  it("is the normal quantile without end of freedom", () => {
    within(valueOf(tFactor(0.95, Infinity)), jStat.normal.inv(0.975, 0, 1), 1e-7);
    within(valueOf(tFactor(0.95, 999_999)), valueOf(tFactor(0.95, 1_000_000)), 5e-6);
  });
  it.each([
    [1, 12.71],
    [2, 4.3],
    [3, 3.18],
    [4, 2.78],
    [5, 2.57],
    [10, 2.23],
    [20, 2.09],
    [50, 2.01],
    [100, 1.984],
    [Infinity, 1.96],
  ])("NIST TN 1297 Table B.1, 95 %%, %d degrees: %d", (dof, printed) => {
    expect(Math.abs(valueOf(tFactor(0.95, dof)) - printed)).toBeLessThanOrEqual(0.005);
  });
});

describe("monotone cubic against SciPy", () => {
  it.each(pchip.cases.map((c) => [c.title, c] as const))("%s", (_, c) => {
    expect(c.at.length).toBeGreaterThan(0);
    c.at.forEach((at, i) => {
      const knot = valueOf(knotOfTable(c, at, c.addZero));
      expect(knot.flowCfm).toBeCloseTo(c.flowCfm[i] ?? NaN, 9);
      expect(knot.slope).toBeCloseTo(c.slope[i] ?? NaN, 8);
    });
  });
});

describe("air", () => {
  it.each([
    [18, 95_000, 0.3],
    [20, 101_325, 0.5],
    [25, 84_000, 0.7],
    [27, 105_000, 0.1],
  ])("CIPM-2007 agrees with the OIML R 111 approximation at %d °C, %d Pa, %d", (t, p, h) => {
    const oiml = (0.34848 * (p / 100) - 0.009 * (h * 100) * Math.exp(0.061 * t)) / (273.15 + t);
    within(valueOf(moistAirDensity({ temperatureC: t, pressurePa: p, relativeHumidity: h })).densityKgM3, oiml, 2e-4);
  });
  it("speed of sound at 1000 m, ISO 2533: 336.434 m/s at 281.65 K", () => {
    expect(valueOf(speedOfSound({ temperatureC: 8.5 }))).toBeCloseTo(336.434, 2);
  });
  it("a bench in series: 20 K warmer air at the orifice reads high, 100 becomes 96.754", () => {
    const r = valueOf(correctToReferenceDensity({ method: "series_orifice", flowCfm: 100, portAirK: 293.15, orificeAirK: 313.15 }));
    expect(r.flowCfm).toBeCloseTo(96.754, 3);
  });
  it("ideal mass flow agrees with the energy equation", () => {
    const p0 = 101_325;
    const t0 = 293.15;
    const cp = (1.4 / 0.4) * 287.05287;
    for (const dp of [500, 6974.49, 30_000]) {
      const t = t0 * ((p0 - dp) / p0) ** (0.4 / 1.4);
      const density = (p0 - dp) / (287.05287 * t);
      const byEnergy = 1e-3 * density * Math.sqrt(2 * cp * (t0 - t));
      within(valueOf(idealMassFlow({ areaMm2: 1000, p0Pa: p0, t0K: t0, dpPa: dp })).massFlowKgS, byEnergy, 1e-9);
    }
  });
});

describe("seat flow area against the shortest distance from seat to valve", () => {
  /** Area of the frustum on the shortest line from the inner seat edge to a point of the valve's face. */
  function byForce(D: number, w: number, betaDeg: number, lift: number): number {
    const beta = (betaDeg * Math.PI) / 180;
    const inner = D / 2 - w;
    let best = { distance: Infinity, r: 0 };
    for (let i = 0; i <= 200_000; i += 1) {
      const r = inner + (w * i) / 200_000;
      const h = lift - (r - inner) * Math.tan(beta);
      const distance = Math.hypot(r - inner, h);
      if (distance < best.distance) best = { distance, r };
    }
    return Math.PI * (inner + best.r) * best.distance;
  }
  it.each([
    [31, 1, 45, 1.5],
    [31, 1, 45, 5],
    [26, 1.3, 30, 1.1],
    [26, 1.3, 30, 4],
    [23, 0.8, 45, 1.6],
  ])("valve %d, width %d, %d degrees, lift %d", (D, w, beta, lift) => {
    const ours = valueOf(
      seatFlowArea({ valveDiameterMm: D, seatRadialWidthMm: w, seatAngleDeg: beta, portDiameterMm: D - 2 * w + 2, stemDiameterMm: 1, liftMm: lift }),
    );
    expect(ours.stage).not.toBe(3);
    within(ours.areaMm2, byForce(D, w, beta, lift), 1e-4);
  });
  it("stages join without a step", () => {
    const at = (liftMm: number) =>
      valueOf(seatFlowArea({ valveDiameterMm: 31, seatRadialWidthMm: 1, seatAngleDeg: 45, portDiameterMm: 27, stemDiameterMm: 5.5, liftMm }));
    within(at(2 - 1e-9).areaMm2, at(2 + 1e-9).areaMm2, 1e-7);
    within(at(6.7355).areaMm2, at(6.7365).areaMm2, 1e-3);
    expect([at(2).stage, at(2.001).stage, at(6.73).stage, at(6.74).stage]).toEqual([1, 2, 2, 3]);
  });
});

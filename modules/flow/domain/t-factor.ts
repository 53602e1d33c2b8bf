import { ok, type Result } from "@/modules/kernel/result";
import { refuseFlow, refuseNotFinite } from "./flow-refusal";

/** Natural log of the gamma function, x > 0. Lanczos series, g = 7, nine terms. */
function lnGamma(x: number): number {
  const c = [
    0.99999999999980993, 676.5203681218851, -1259.1392167224028, 771.32342877765313, -176.61502916214059, 12.507343278686905,
    -0.13857109526572012, 9.9843695780195716e-6, 1.5056327351493116e-7,
  ];
  if (x < 0.5) return Math.log(Math.PI / Math.sin(Math.PI * x)) - lnGamma(1 - x);
  const y = x - 1;
  const sum = c.reduce((s, term, i) => (i === 0 ? term : s + term / (y + i)), 0);
  const t = y + 7.5;
  return 0.5 * Math.log(2 * Math.PI) + (y + 0.5) * Math.log(t) - t + Math.log(sum);
}

/** Continued fraction of the incomplete beta function (Abramowitz & Stegun 26.5.8), by Lentz's method. */
function betaFraction(x: number, a: number, b: number): number {
  const tiny = 1e-300;
  const keep = (v: number) => (Math.abs(v) < tiny ? tiny : v);
  let c = 1;
  let d = 1 / keep(1 - ((a + b) * x) / (a + 1));
  let f = d;
  for (let m = 1; m <= 500; m += 1) {
    for (const term of [
      (m * (b - m) * x) / ((a + 2 * m - 1) * (a + 2 * m)),
      (-(a + m) * (a + b + m) * x) / ((a + 2 * m) * (a + 2 * m + 1)),
    ]) {
      d = 1 / keep(1 + term * d);
      c = keep(1 + term / c);
      f *= c * d;
    }
    if (Math.abs(c * d - 1) < 1e-15) break;
  }
  return f;
}

/** Regularised incomplete beta function I_x(a, b), 0 <= x <= 1. */
function incompleteBeta(x: number, a: number, b: number): number {
  if (x <= 0) return 0;
  if (x >= 1) return 1;
  const front = Math.exp(lnGamma(a + b) - lnGamma(a) - lnGamma(b) + a * Math.log(x) + b * Math.log(1 - x));
  return x < (a + 1) / (a + b + 2) ? (front * betaFraction(x, a, b)) / a : 1 - (front * betaFraction(1 - x, b, a)) / b;
}

/** Share of a normal distribution within +-z, by the series without alternating signs. */
function normalWithin(z: number): number {
  let term = z;
  let sum = z;
  for (let n = 1; n < 400 && term > 1e-17 * sum; n += 1) {
    term *= (z * z) / (2 * n + 1);
    sum += term;
  }
  return Math.min(1, sum * Math.sqrt(2 / Math.PI) * Math.exp((-z * z) / 2));
}

/** Degrees of freedom from which the normal distribution stands in; the two differ by less than 1e-6 there. */
const NORMAL_FROM_DOF = 1e6;

/**
 * Two-sided Student t factor.
 * @param confidence 0 to 1, both excluded, at most 0.9999. @param dof >= 1, Infinity gives the normal distribution.
 * Source: JCGM 100:2008 (GUM) Annex G; tabulated in NIST TN 1297 Table B.1. Errors: READING_OUT_OF_RANGE, TOO_FEW_POINTS.
 */
export function tFactor(confidence: number, dof: number): Result<number> {
  const bad = refuseNotFinite({ confidence });
  if (bad) return bad;
  if (confidence <= 0 || confidence > 0.9999) return refuseFlow("READING_OUT_OF_RANGE", "confidence", { min: 0, max: 0.9999 });
  if (Number.isNaN(dof) || dof < 1) return refuseFlow("TOO_FEW_POINTS", "dof");
  const within = (t: number) => (dof >= NORMAL_FROM_DOF ? normalWithin(t) : 1 - incompleteBeta(dof / (dof + t * t), dof / 2, 0.5));
  let low = 0;
  let high = 1;
  while (within(high) < confidence) high *= 2;
  for (let i = 0; i < 200 && high - low > 1e-13 * high; i += 1) {
    const middle = (low + high) / 2;
    if (within(middle) < confidence) low = middle;
    else high = middle;
  }
  return ok((low + high) / 2);
}

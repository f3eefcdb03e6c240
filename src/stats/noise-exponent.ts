import type { NoiseExponent } from './power-law-covariance.js';

/** Fewer points than this tell nothing about a correlation. */
const MIN_POINTS = 30;

/**
 * The power-law noise that prevails at an averaging time, from the lag-1 autocorrelation.
 *
 * @param phase - shape (n), the integral of the rate.
 * @param averaged - m >= 1, samples averaged.
 * @param maxDifferences - 2 for Allan, 3 for Hadamard variances: how steep a noise is looked for.
 * @returns null where fewer than 30 averages fit in.
 * @see Riley & Greenhall (2004), Power law noise identification using the lag 1 autocorrelation, 18th
 *   EFTF; Riley (2008), NIST Special Publication 1065, section 5.5.4.
 */
export function noiseExponent(
  phase: Float64Array,
  averaged: number,
  maxDifferences: 2 | 3,
): NoiseExponent | null {
  let n = Math.floor((phase.length - 1) / averaged) + 1;
  if (n < MIN_POINTS) return null;
  const x = new Float64Array(n);
  for (let i = 0; i < n; i++) x[i] = phase[i * averaged]!;
  removeParabola(x);
  for (let differences = 0; ; differences++) {
    const r = lagOne(x.subarray(0, n));
    const fraction = r / (1 + r);
    if (differences === maxDifferences || fraction < 0.25) {
      const exponent = 2 - Math.round(2 * fraction) - 2 * differences;
      const steepest = maxDifferences === 2 ? -2 : -4;
      return Math.min(2, Math.max(steepest, exponent)) as NoiseExponent;
    }
    n--;
    for (let i = 0; i < n; i++) x[i] = x[i + 1]! - x[i]!;
  }
}

function lagOne(x: Float64Array): number {
  let mean = 0;
  for (const value of x) mean += value / x.length;
  let squares = 0;
  let products = 0;
  for (let i = 0; i < x.length; i++) {
    const d = x[i]! - mean;
    squares += d * d;
    if (i > 0) products += d * (x[i - 1]! - mean);
  }
  return squares > 0 ? products / squares : 0;
}

/** Takes the least-squares parabola out, by orthogonal polynomials on an even grid. */
function removeParabola(x: Float64Array): void {
  const n = x.length;
  const centre = (n - 1) / 2;
  const level = (n * n - 1) / 12; // mean of the squared distance from the centre
  let [sum, slope, bend, slopeNorm, bendNorm] = [0, 0, 0, 0, 0];
  for (let i = 0; i < n; i++) {
    const t = i - centre;
    const q = t * t - level;
    sum += x[i]!;
    slope += x[i]! * t;
    bend += x[i]! * q;
    slopeNorm += t * t;
    bendNorm += q * q;
  }
  for (let i = 0; i < n; i++) {
    const t = i - centre;
    x[i]! -= sum / n + (slope / slopeNorm) * t + (bend / bendNorm) * (t * t - level);
  }
}

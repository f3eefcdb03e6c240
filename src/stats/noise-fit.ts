import { InputError } from '../errors.js';
import type { AllanDeviation } from './allan.js';
import { solveNonNegative } from './non-negative-fit.js';
import { integralCovariance, type NoiseExponent } from './power-law-covariance.js';

export interface NoiseParameter {
  value: number;
  /** Where the value is 0: the size that would not have shown. */
  standardError: number;
}

/** With the rate in u: N in u/√Hz, B in u, K in u·√Hz. */
export interface NoiseFit {
  /** N: Allan deviation N/√tau, read at tau = 1 s. Of an accelerometer: velocity random walk. */
  angleRandomWalk: NoiseParameter;
  /** B: flat Allan deviation 0.664 B. */
  biasInstability: NoiseParameter;
  /** K: Allan deviation K √(tau/3), read at tau = 3 s. */
  rateRandomWalk: NoiseParameter;
  /** Misfit of the Allan variances; about `degreesOfFreedom` where these three noises are all there is. */
  chiSquare: number;
  degreesOfFreedom: number;
  /** The averaging times used. */
  tauS: number[];
}

interface Noise {
  /** Allan variance at an averaging time, for a parameter of 1. */
  variance: (tauS: number) => number;
  /** Of the rate's spectrum plus 2: then {@link integralCovariance} is that of its first integral. */
  exponent: NoiseExponent;
}

/** Angle random walk, bias instability, rate random walk. */
const NOISES: readonly Noise[] = [
  { variance: (tauS) => 1 / tauS, exponent: 2 },
  { variance: () => (2 * Math.LN2) / Math.PI, exponent: 1 },
  { variance: (tauS) => tauS / 3, exponent: 0 },
];
/** Scales the covariance so that the mean square of a second difference is 2 tau² times the Allan variance. */
const SCALES = NOISES.map((noise) => (2 * noise.variance(1)) / secondDifferences(0, 1, 1, noise.exponent));

/** Averaging times closer than this tell the same thing twice. */
const MIN_RATIO = 1.4;
/** Beyond a fifth of the record an Allan variance has hardly two degrees of freedom. */
const LONGEST_SHARE = 1 / 5;
const ROUNDS = 8;

/**
 * Angle random walk, bias instability and rate random walk from Allan deviations.
 *
 * Generalised least squares on the variances, none below 0. Overlapping estimates of one record are
 * correlated from tau to tau; their covariance under the fitted noise is worked out, so that the standard
 * errors mean what they say. The signs of trouble are a chi-square well above its degrees of freedom:
 * quantisation, a filter in the sensor, temperature. Then narrow the range of tau.
 *
 * @param allan - of kind `overlapping-allan`, at least 4 averaging times in the range used.
 * @param range.fromS - shortest averaging time used, seconds; default all.
 * @param range.toS - longest, seconds; default, and at most, a fifth of the record.
 * @throws InputError `allan-kind`, `too-few-taus`, `no-noise`.
 * @see IEEE Std 952-1997, annex C (definitions of N, B and K).
 * @see Greenhall & Riley (2003), 35th PTTI meeting, 267-280 (generalised autocovariances).
 */
export function fitNoise(allan: AllanDeviation, range: { fromS?: number; toS?: number } = {}): NoiseFit {
  if (allan.kind !== 'overlapping-allan')
    throw new InputError('allan-kind', `fitNoise: needs overlapping-allan deviations, got ${allan.kind}`);
  const dt = 1 / allan.sampleRateHz;
  const longestS = Math.min(range.toS ?? Number.POSITIVE_INFINITY, allan.nSamples * dt * LONGEST_SHARE);
  const chosen: number[] = [];
  for (let k = 0; k < allan.tauS.length; k++) {
    const tauS = allan.tauS[k]!;
    if (tauS < (range.fromS ?? 0) || tauS > longestS * (1 + 1e-12)) continue;
    if (chosen.length === 0 || tauS >= MIN_RATIO * allan.tauS[chosen.at(-1)!]!) chosen.push(k);
  }
  if (chosen.length < NOISES.length + 1)
    throw new InputError(
      'too-few-taus',
      `fitNoise: needs at least 4 averaging times a factor ${MIN_RATIO} apart up to a fifth of the record, got ${chosen.length}; record for longer or widen the range`,
    );
  const tauS = chosen.map((k) => allan.tauS[k]!);
  const variances = chosen.map((k) => allan.deviation[k]! ** 2);
  if (!variances.every((v) => v > 0))
    throw new InputError('no-noise', 'fitNoise: an Allan deviation is 0; the sensor repeats one value');
  const design = tauS.map((tau) => NOISES.map((noise) => noise.variance(tau)));

  // Products of covariances, one a pair of taus and a pair of noises; the fit only weighs them.
  const products = covarianceProducts(
    tauS.map((tau) => Math.round(tau / dt)),
    allan.nSamples + 1,
    dt,
  );
  const covarianceFor = (squares: readonly number[]) =>
    products.map((row) =>
      row.map((pair) => {
        let sum = 0;
        for (let a = 0; a < NOISES.length; a++)
          for (let b = 0; b < NOISES.length; b++) sum += squares[a]! * squares[b]! * pair[a]![b]!;
        return sum;
      }),
    );
  // First with independent relative errors, then with the covariance that the fit before it implies.
  let solution = solveNonNegative(
    design,
    variances,
    variances.map((v, i) => variances.map((_, j) => (i === j ? v * v : 0))),
  );
  for (let round = 0; round < ROUNDS; round++)
    solution = solveNonNegative(design, variances, covarianceFor(solution.values));

  const parameter = (k: number): NoiseParameter => {
    const square = solution.values[k]!;
    const spread = solution.standardErrors[k]!;
    const value = Math.sqrt(square);
    return { value, standardError: Math.min(spread / (2 * value), Math.sqrt(spread)) };
  };
  return {
    angleRandomWalk: parameter(0),
    biasInstability: parameter(1),
    rateRandomWalk: parameter(2),
    chiSquare: solution.chiSquare,
    degreesOfFreedom: tauS.length - solution.values.filter((v) => v > 0).length,
    tauS,
  };
}

/** The Allan deviation that the fitted noises make at an averaging time, in the rate's unit. */
export function fittedAllanDeviation(fit: NoiseFit, tauS: number): number {
  const values = [fit.angleRandomWalk.value, fit.biasInstability.value, fit.rateRandomWalk.value];
  return Math.sqrt(NOISES.reduce((sum, noise, k) => sum + values[k]! ** 2 * noise.variance(tauS), 0));
}

/**
 * [i][j][a][b]: what noises a and b add, per unit of their squared parameters, to the covariance of the
 * overlapping Allan variances at averages i and j.
 */
function covarianceProducts(averages: number[], nPhase: number, dt: number): number[][][][] {
  const all: number[][][][] = averages.map(() => []);
  for (const [i, mi] of averages.entries())
    for (const [j, mj] of averages.entries()) {
      if (j < i) {
        all[i]![j] = all[j]![i]!;
        continue;
      }
      all[i]![j] = pairProducts(mi, mj, nPhase, dt);
    }
  return all;
}

function pairProducts(mi: number, mj: number, nPhase: number, dt: number): number[][] {
  const larger = Math.max(mi, mj);
  const [ni, nj] = [nPhase - 2 * mi, nPhase - 2 * mj];
  // Lags of this many samples share one value where the covariance changes more slowly.
  const step = Math.max(1, Math.floor(Math.min(mi, mj) / 8), Math.floor(larger / 96));
  const sums = NOISES.map(() => NOISES.map(() => 0));
  const at = new Float64Array(NOISES.length);
  const reach = 2 * larger; // flicker noise alone is correlated beyond the windows, ever more weakly
  const first = -Math.ceil((2 * mi + reach) / step) * step;
  for (let lag = first; lag <= 2 * mj + reach; lag += step) {
    const pairs = Math.min(ni, nj + lag) - Math.max(0, lag);
    if (pairs <= 0) continue;
    for (const [a, noise] of NOISES.entries())
      at[a] = SCALES[a]! * secondDifferences(lag * dt, mi * dt, mj * dt, noise.exponent);
    for (let a = 0; a < at.length; a++)
      for (let b = 0; b < at.length; b++) sums[a]![b]! += pairs * step * at[a]! * at[b]!;
  }
  const divisor = 4 * (mi * dt) ** 2 * (mj * dt) ** 2 * ni * nj;
  return sums.map((row) => row.map((sum) => (2 * sum) / divisor));
}

/** Covariance of the second differences over two spacings whose starts are `lag` apart. */
function secondDifferences(lag: number, spacing: number, other: number, exponent: NoiseExponent): number {
  let sum = 0;
  for (let i = 0; i <= 2; i++)
    for (let j = 0; j <= 2; j++)
      sum +=
        (i === 1 ? -2 : 1) * (j === 1 ? -2 : 1) * integralCovariance(lag + i * spacing - j * other, exponent);
  return sum;
}

import { integralCovariance, type NoiseExponent } from './power-law-covariance.js';

/** More lags than this are represented by fewer, evenly spaced ones: the edf hardly notices. */
const MAX_LAGS = 600;
/** Flicker phase noise has spikes between lags that must not be stepped over. */
const MAX_LAGS_FLICKER_PHASE = 30_000;

/** Binomial coefficients of the difference of order 2d, by their distance from the middle. */
const MIDDLE_BINOMIALS: Record<2 | 3, readonly number[]> = { 2: [6, 4, 1], 3: [20, 15, 6, 1] };

/**
 * Equivalent degrees of freedom of a fully overlapping stability variance: the chi-square distribution
 * with as many has the mean and variance of the estimate.
 *
 * The sum over lags of the squared autocorrelation of the overlapping differences, as published, with
 * two departures. Long sums are thinned at the same ratio of data to averaging time, where the paper has
 * fitted tables. And for plain variances of white and steeper rate noise the phase is a sum of samples, not
 * an average over a sample interval as the paper has it: exact for white samples (341 in place of 400 at
 * m = 1, n = 513), and nearer for a random walk.
 *
 * @param exponent - the noise's; at least -2 for order 2, at least -4 for order 3.
 * @param order - of the phase differences: 2 Allan, 3 Hadamard.
 * @param averaged - m >= 1, samples averaged.
 * @param nPhase - phase points, one more than rate samples; at least order × m + 1, and order × m + m for
 *   modified variances.
 * @param modified - whether phases are averaged too (modified Allan, time deviation).
 * @see Greenhall & Riley (2003), Uncertainty of stability variances based on finite differences, 35th
 *   PTTI meeting, 267-280; also Riley (2008), NIST Special Publication 1065, section 5.4.1.
 */
export function equivalentDegreesOfFreedom(
  exponent: NoiseExponent,
  order: 2 | 3,
  averaged: number,
  nPhase: number,
  modified: boolean,
): number {
  // A modified variance at m = 1 is the plain one.
  const smoothed = modified && averaged > 1;
  const span = modified ? (order + 1) * averaged : order * averaged + 1;
  const nTerms = 1 + nPhase - span;
  if (exponent === 2 && !smoothed) return nTerms / whitePhaseSum(order, averaged, nTerms);

  const limit = exponent === 1 && !smoothed ? MAX_LAGS_FLICKER_PHASE : MAX_LAGS;
  const perTau = Math.min(averaged, Math.floor(limit / (order + 1)));
  const terms = (nTerms * perTau) / averaged;
  const filter = smoothed ? 1 : exponent <= 0 ? Number.POSITIVE_INFINITY : perTau;
  const correlation = (lag: number) => differenceCovariance(lag, filter, exponent, order);
  const atZero = correlation(0);
  const last = Math.min(terms, (order + 1) * perTau);
  let sum = 1;
  for (let j = 1; j < last; j++) sum += 2 * (1 - j / terms) * (correlation(j / perTau) / atZero) ** 2;
  return terms / sum;
}

/** White phase noise: differences are correlated only at whole multiples of the averaging time. */
function whitePhaseSum(order: 2 | 3, averaged: number, nTerms: number): number {
  const weights = MIDDLE_BINOMIALS[order];
  let sum = 1;
  for (let k = 1; k <= order && k * averaged < nTerms; k++)
    sum += 2 * (1 - (k * averaged) / nTerms) * (weights[k]! / weights[0]!) ** 2;
  return sum;
}

/** Covariance of two differences, `lag` averaging times apart; `filter` is F of the paper. */
function differenceCovariance(lag: number, filter: number, exponent: NoiseExponent, order: 2 | 3): number {
  const weights = MIDDLE_BINOMIALS[order];
  let sum = weights[0]! * averagedCovariance(lag, filter, exponent);
  for (let k = 1; k <= order; k++)
    sum +=
      (k % 2 ? -1 : 1) *
      weights[k]! *
      (averagedCovariance(lag - k, filter, exponent) + averagedCovariance(lag + k, filter, exponent));
  return sum;
}

function averagedCovariance(t: number, filter: number, exponent: NoiseExponent): number {
  if (filter === Number.POSITIVE_INFINITY) return integralCovariance(t, (exponent + 2) as NoiseExponent);
  const reach = 1 / filter;
  return (
    filter *
    filter *
    (2 * integralCovariance(t, exponent) -
      integralCovariance(t - reach, exponent) -
      integralCovariance(t + reach, exponent))
  );
}

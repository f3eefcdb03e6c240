import { InputError } from '../errors.js';
import { incompleteGamma, logGamma } from './incomplete-functions.js';
import { normalQuantile } from './normal.js';
import { solveIncreasing } from './solve-increasing.js';

/**
 * Chi-square distribution function.
 *
 * @param x - 0..Infinity.
 * @param degrees - degrees of freedom, above 0, need not be whole.
 * @throws InputError `range`.
 */
export function chiSquareCdf(x: number, degrees: number): number {
  requireDegrees('chiSquareCdf', degrees);
  if (!(x >= 0)) throw new InputError('range', `chiSquareCdf: x must be at least 0, got ${x}`);
  return incompleteGamma(degrees / 2, x / 2).lower;
}

/**
 * Chi-square quantile, relative error about 1e-13.
 *
 * @param probability - 0..1, 1 gives Infinity.
 * @param degrees - degrees of freedom, above 0, need not be whole.
 * @throws InputError `probability`, `range`.
 * @see Wilson & Hilferty (1931), PNAS 17(12), 684-688: the first guess; then Newton steps on the cdf.
 */
export function chiSquareQuantile(probability: number, degrees: number): number {
  requireDegrees('chiSquareQuantile', degrees);
  if (!(probability >= 0 && probability <= 1))
    throw new InputError('probability', `chiSquareQuantile: probability must be in 0..1, got ${probability}`);
  if (probability === 0) return 0;
  if (probability === 1) return Number.POSITIVE_INFINITY;
  const half = degrees / 2;
  const ninth = 2 / (9 * degrees);
  const cube = 1 - ninth + normalQuantile(probability) * Math.sqrt(ninth);
  const lowerTail = 2 * Math.exp((Math.log(probability * half) + logGamma(half)) / half);
  const guess = cube > 0.2 ? degrees * cube ** 3 : lowerTail;
  const logNorm = half * Math.log(2) + logGamma(half);
  const density = (x: number) => Math.exp((half - 1) * Math.log(x) - x / 2 - logNorm);
  let high = Math.max(2 * guess, degrees);
  const upperTail = (x: number) => incompleteGamma(half, x / 2).upper;
  while (upperTail(high) > 1 - probability) high *= 2;
  // In the upper tail the complement keeps the digits.
  return probability <= 0.5
    ? solveIncreasing((x) => incompleteGamma(half, x / 2).lower, density, probability, guess, 0, high)
    : solveIncreasing((x) => -upperTail(x), density, probability - 1, guess, 0, high);
}

function requireDegrees(caller: string, degrees: number): void {
  if (!(degrees > 0 && degrees < Number.POSITIVE_INFINITY))
    throw new InputError('range', `${caller}: degrees of freedom must be above 0, got ${degrees}`);
}

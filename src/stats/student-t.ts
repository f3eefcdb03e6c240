import { InputError } from '../errors.js';
import { incompleteBeta, logGamma } from './incomplete-functions.js';
import { normalQuantile } from './normal.js';
import { solveIncreasing } from './solve-increasing.js';

/**
 * Student's t distribution function.
 *
 * @param t - any number but NaN.
 * @param degrees - degrees of freedom, above 0, need not be whole.
 * @throws InputError `range`.
 * @see Abramowitz & Stegun (1964), 26.7.1.
 */
export function studentTCdf(t: number, degrees: number): number {
  requireDegrees('studentTCdf', degrees);
  if (Number.isNaN(t)) throw new InputError('range', 'studentTCdf: t is NaN');
  if (!Number.isFinite(t)) return t < 0 ? 0 : 1;
  const tail = upperTail(Math.abs(t), degrees);
  return t < 0 ? tail : 1 - tail;
}

/**
 * Student's t quantile, relative error about 1e-12.
 *
 * @param probability - 0..1; the ends give ∓Infinity.
 * @param degrees - degrees of freedom, above 0, need not be whole.
 * @throws InputError `probability`, `range`.
 */
export function studentTQuantile(probability: number, degrees: number): number {
  requireDegrees('studentTQuantile', degrees);
  if (!(probability >= 0 && probability <= 1))
    throw new InputError('probability', `studentTQuantile: probability must be in 0..1, got ${probability}`);
  if (probability === 0.5) return 0;
  const tail = Math.min(probability, 1 - probability);
  const sign = probability < 0.5 ? -1 : 1;
  if (tail === 0) return sign * Number.POSITIVE_INFINITY;
  const logNorm = logGamma((degrees + 1) / 2) - logGamma(degrees / 2) - 0.5 * Math.log(degrees * Math.PI);
  const density = (t: number) => Math.exp(logNorm - ((degrees + 1) / 2) * Math.log1p((t * t) / degrees));
  const guess = -normalQuantile(tail);
  let high = 2 * guess + 1;
  while (upperTail(high, degrees) > tail) high *= 2;
  return sign * solveIncreasing((t) => -upperTail(t, degrees), density, -tail, guess, 0, high);
}

/** P(T > t) for t >= 0. */
function upperTail(t: number, degrees: number): number {
  const square = t * t;
  const fromTail = degrees / (degrees + square);
  const fromCentre = square / (degrees + square);
  // Near the centre the tail is a half less a little; further out that subtraction would eat its digits.
  return square > 1
    ? 0.5 * incompleteBeta(fromTail, degrees / 2, 0.5, fromCentre)
    : 0.5 - 0.5 * incompleteBeta(fromCentre, 0.5, degrees / 2, fromTail);
}

function requireDegrees(caller: string, degrees: number): void {
  if (!(degrees > 0 && degrees < Number.POSITIVE_INFINITY))
    throw new InputError('range', `${caller}: degrees of freedom must be above 0, got ${degrees}`);
}

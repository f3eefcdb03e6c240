import { InputError } from '../errors.js';
import { median } from './quantile.js';

/**
 * Arithmetic mean, in two passes so that a large offset costs no digits.
 *
 * @param values - shape (n), n >= 1, any unit; every value finite.
 * @throws InputError `empty`, `not-finite`.
 */
export function mean(values: ArrayLike<number>): number {
  const n = values.length;
  if (n === 0) throw new InputError('empty', 'mean: needs at least one value, got none');
  let sum = 0;
  for (let i = 0; i < n; i++) sum += finite(values, i, 'mean');
  const first = sum / n;
  let rest = 0;
  for (let i = 0; i < n; i++) rest += values[i]! - first;
  return first + rest / n;
}

/**
 * Root of the mean square, about zero: of errors, bias included.
 *
 * @param errors - shape (n), n >= 1, any unit; every value finite.
 * @throws InputError `empty`, `not-finite`.
 */
export function rootMeanSquare(errors: ArrayLike<number>): number {
  const n = errors.length;
  if (n === 0) throw new InputError('empty', 'rootMeanSquare: needs at least one value, got none');
  let sum = 0;
  for (let i = 0; i < n; i++) sum += finite(errors, i, 'rootMeanSquare') ** 2;
  return Math.sqrt(sum / n);
}

/**
 * Sample standard deviation, divisor n - 1, corrected two-pass form.
 *
 * @param values - shape (n), n >= 2, any unit; every value finite.
 * @throws InputError `too-short`, `not-finite`.
 * @see Chan, Golub & LeVeque (1983), The American Statistician 37(3), 242-247.
 */
export function standardDeviation(values: ArrayLike<number>): number {
  const n = values.length;
  if (n < 2) throw new InputError('too-short', `standardDeviation: needs at least 2 values, got ${n}`);
  const centre = mean(values);
  let squares = 0;
  let drift = 0; // rounding left in the mean; exactly 0 in real arithmetic
  for (let i = 0; i < n; i++) {
    const d = values[i]! - centre;
    squares += d * d;
    drift += d;
  }
  return Math.sqrt((squares - (drift * drift) / n) / (n - 1));
}

/**
 * Median absolute deviation from the median, not scaled.
 *
 * Times 1.4826 it estimates the standard deviation of a normal distribution, and a few wild values
 * leave it alone.
 *
 * @param values - shape (n), n >= 1, any unit; every value finite.
 * @throws InputError `empty`, `not-finite`.
 */
export function medianAbsoluteDeviation(values: ArrayLike<number>): number {
  const centre = median(values);
  return median(Float64Array.from(values, (x) => Math.abs(x - centre)));
}

/**
 * The value that splits the total weight in halves; where a value ends exactly at the half, the mean of
 * it and the next. Equal weights give the ordinary median.
 *
 * @param values - shape (n), n >= 1, any unit; every value finite.
 * @param weights - shape (n), any unit; each finite, >= 0, not all 0.
 * @throws InputError `empty`, `not-finite`, `weights`.
 */
export function weightedMedian(values: ArrayLike<number>, weights: ArrayLike<number>): number {
  const n = values.length;
  if (n === 0) throw new InputError('empty', 'weightedMedian: needs at least one value, got none');
  if (weights.length !== n)
    throw new InputError('weights', `weightedMedian: ${n} values need ${n} weights, got ${weights.length}`);
  let total = 0;
  const order: number[] = [];
  for (let i = 0; i < n; i++) {
    finite(values, i, 'weightedMedian');
    const weight = weights[i]!;
    if (!(weight >= 0 && weight < Number.POSITIVE_INFINITY))
      throw new InputError(
        'weights',
        `weightedMedian: weights must be finite and at least 0, weight ${i} is ${weight}`,
      );
    total += weight;
    if (weight > 0) order.push(i);
  }
  if (!(total > 0)) throw new InputError('weights', 'weightedMedian: the weights are all 0');
  order.sort((a, b) => values[a]! - values[b]!);
  let reached = 0;
  for (let k = 0; k < order.length; k++) {
    reached += weights[order[k]!]!;
    if (2 * reached > total || k === order.length - 1) return values[order[k]!]!;
    if (2 * reached === total) return (values[order[k]!]! + values[order[k + 1]!]!) / 2;
  }
  throw new Error('weightedMedian: the half was never reached');
}

function finite(values: ArrayLike<number>, i: number, caller: string): number {
  const x = values[i]!;
  if (!Number.isFinite(x)) throw new InputError('not-finite', `${caller}: value ${i} is ${x}`);
  return x;
}

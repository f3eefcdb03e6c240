import { InputError } from '../errors.js';
import { normalQuantile } from './normal.js';
import { median, quantileSorted } from './quantile.js';

export interface RobustLine {
  slope: number;
  /** Median of y minus slope times the median of x. */
  intercept: number;
  slopeLow: number;
  slopeHigh: number;
}

/** 12.5 million pairs, 100 MB. */
const MAX_POINTS = 5000;

/**
 * Theil-Sen line: the median of the slopes between all pairs of points, with Sen's interval.
 *
 * Up to 29 % of the points may be wild without moving the slope far.
 *
 * @param x - shape (n), 2 <= n <= 5000, any unit; every value finite, not all equal. Equal values allowed.
 * @param y - shape (n), any unit; every value finite.
 * @param confidence - of the interval, default 0.95. The interval takes the points as independent.
 * @throws InputError `shape`, `too-short`, `too-long`, `not-finite`, `constant`, `confidence`.
 * @see Sen (1968), JASA 63(324), 1379-1389, with his correction of the variance for ties.
 */
export function robustLine(x: ArrayLike<number>, y: ArrayLike<number>, confidence = 0.95): RobustLine {
  const n = x.length;
  if (y.length !== n) throw new InputError('shape', `robustLine: x has ${n} values, y has ${y.length}`);
  if (n < 2) throw new InputError('too-short', `robustLine: needs at least 2 points, got ${n}`);
  if (n > MAX_POINTS)
    throw new InputError(
      'too-long',
      `robustLine: takes at most ${MAX_POINTS} points, got ${n}; thin them out`,
    );
  if (!(confidence > 0 && confidence < 1))
    throw new InputError('confidence', `robustLine: confidence must be between 0 and 1, got ${confidence}`);
  for (let i = 0; i < n; i++)
    if (!Number.isFinite(x[i]!) || !Number.isFinite(y[i]!))
      throw new InputError('not-finite', `robustLine: point ${i} is (${x[i]}, ${y[i]})`);

  const slopes = new Float64Array((n * (n - 1)) / 2);
  let count = 0;
  for (let i = 1; i < n; i++)
    for (let j = 0; j < i; j++) {
      const run = x[i]! - x[j]!;
      if (run !== 0) slopes[count++] = (y[i]! - y[j]!) / run;
    }
  if (count === 0)
    throw new InputError('constant', `robustLine: all ${n} values of x are ${x[0]}; a slope needs two`);
  const sorted = slopes.subarray(0, count).sort();
  const slope = quantileSorted(sorted, 0.5);

  const variance = (pairTerm(n) - tieTerms(x) - tieTerms(y)) / 18;
  const half = normalQuantile((1 + confidence) / 2) * Math.sqrt(Math.max(0, variance));
  const lowRank = Math.max(0, Math.round((count - half) / 2) - 1);
  const highRank = Math.min(count - 1, Math.round((count + half) / 2));
  return {
    slope,
    intercept: median(y) - slope * median(x),
    slopeLow: sorted[lowRank]!,
    slopeHigh: sorted[highRank]!,
  };
}

function pairTerm(k: number): number {
  return k * (k - 1) * (2 * k + 5);
}

/** Sum of the pair terms of groups of equal values. */
function tieTerms(values: ArrayLike<number>): number {
  const counts = new Map<number, number>();
  for (let i = 0; i < values.length; i++) counts.set(values[i]!, (counts.get(values[i]!) ?? 0) + 1);
  let sum = 0;
  for (const k of counts.values()) sum += pairTerm(k);
  return sum;
}

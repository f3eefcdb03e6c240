import { InputError } from '../errors.js';

/**
 * Quantile by linear interpolation between order statistics at h = (n - 1) p, known as type 7.
 *
 * Quartiles of small samples differ between conventions; this one is used everywhere in the program.
 *
 * @param values - shape (n), n >= 1, any order, any unit; every value finite. Not changed.
 * @param probability - 0..1.
 * @returns the unit of `values`.
 * @throws InputError `empty`, `not-finite`, `probability`.
 * @see Hyndman & Fan (1996), The American Statistician 50(4), 361-365, definition 7.
 */
export function quantile(values: ArrayLike<number>, probability: number): number {
  return quantileSorted(sortedCopy(values), probability);
}

/** {@link quantile} of values already ascending and free of NaN, as {@link sortedCopy} gives them. */
export function quantileSorted(sorted: ArrayLike<number>, probability: number): number {
  const n = sorted.length;
  if (n === 0) throw new InputError('empty', 'quantile: needs at least one value, got none');
  if (!(probability >= 0 && probability <= 1))
    throw new InputError('probability', `quantile: probability must be in 0..1, got ${probability}`);
  const place = (n - 1) * probability;
  const below = Math.floor(place);
  const low = sorted[below]!;
  const share = place - below;
  return share === 0 ? low : low + share * (sorted[below + 1]! - low);
}

/** The middle value; of an even number of values the mean of the two in the middle. */
export function median(values: ArrayLike<number>): number {
  return quantile(values, 0.5);
}

/**
 * The values ascending.
 *
 * @throws InputError `not-finite` on NaN or ±Infinity: a missing value is the caller's to leave out.
 */
export function sortedCopy(values: ArrayLike<number>): Float64Array {
  const sorted = Float64Array.from(values);
  for (let i = 0; i < sorted.length; i++)
    if (!Number.isFinite(sorted[i]))
      throw new InputError('not-finite', `every value must be finite, value ${i} is ${sorted[i]}`);
  return sorted.sort();
}

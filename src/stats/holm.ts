import { InputError } from '../errors.js';

/**
 * Holm's step-down correction: p values adjusted so that the chance of one false finding among all of
 * them stays below the level they are compared with, whatever their dependence.
 *
 * @param pValues - shape (n), each in 0..1; may be empty.
 * @returns shape (n), in the order given, each in 0..1 and not below its own p.
 * @throws InputError `probability`.
 * @see Holm (1979), Scandinavian Journal of Statistics 6(2), 65-70.
 */
export function holmAdjusted(pValues: ArrayLike<number>): Float64Array {
  const n = pValues.length;
  for (let i = 0; i < n; i++)
    if (!(pValues[i]! >= 0 && pValues[i]! <= 1))
      throw new InputError('probability', `holmAdjusted: p value ${i} must be in 0..1, got ${pValues[i]}`);
  const order = Array.from({ length: n }, (_, i) => i).sort((a, b) => pValues[a]! - pValues[b]!);
  const adjusted = new Float64Array(n);
  let largest = 0;
  for (const [rank, i] of order.entries()) {
    largest = Math.max(largest, Math.min(1, (n - rank) * pValues[i]!));
    adjusted[i] = largest;
  }
  return adjusted;
}

/**
 * A copy of the signal in which every value that is not finite is bridged by a straight line between
 * its finite neighbours (held level at the ends), for filters that cannot start anew at each gap.
 * What is made of such values must not reach a table: the rows stay flagged.
 *
 * @param values - shape (n), any unit; all values not finite gives zeros.
 * @returns shape (n); the very same array where nothing had to be bridged.
 */
export function fillGaps(values: Float64Array): Float64Array {
  const n = values.length;
  let i = 0;
  while (i < n && Number.isFinite(values[i]!)) i++;
  if (i === n) return values;
  const out = values.slice();
  let before = i - 1;
  while (i < n) {
    let after = i;
    while (after < n && !Number.isFinite(out[after]!)) after++;
    const left = before >= 0 ? out[before]! : after < n ? out[after]! : 0;
    const right = after < n ? out[after]! : left;
    const span = after - before;
    for (let k = i; k < after; k++) out[k] = left + ((right - left) * (k - before)) / span;
    i = after;
    while (i < n && Number.isFinite(out[i]!)) i++;
    before = i - 1;
  }
  return out;
}

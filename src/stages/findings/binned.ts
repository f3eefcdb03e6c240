/**
 * Readings averaged over bins of one length, for checks that look at several sensors at once.
 *
 * @param t - times, s, ascending.
 * @param columns - each of shape (t.length).
 * @param binS - length of a bin, s.
 * @param bins - how many, from time 0 on.
 * @returns a column each of shape (bins); NaN where a bin has no reading.
 */
export function binned(
  t: Float64Array,
  columns: readonly Float64Array[],
  binS: number,
  bins: number,
): Float64Array[] {
  const count = new Int32Array(bins);
  const sums = columns.map(() => new Float64Array(bins));
  for (let i = 0; i < t.length; i++) {
    const b = Math.floor(t[i]! / binS);
    if (b < 0 || b >= bins) continue;
    count[b]!++;
    for (let c = 0; c < columns.length; c++) sums[c]![b]! += columns[c]![i]!;
  }
  return sums.map((sum) => sum.map((value, b) => (count[b]! > 0 ? value / count[b]! : Number.NaN)));
}

/**
 * Piecewise linear interpolation at ascending times.
 *
 * @param t - shape (n), ascending (equal times allowed: the later reading counts from there on), n >= 1.
 * @param values - shape (n), any unit.
 * @param at - shape (m), ascending, the unit of `t`; before the first and after the last reading the
 *   nearest value holds.
 * @returns shape (m).
 */
export function interpolateLinear(t: Float64Array, values: Float64Array, at: Float64Array): Float64Array {
  const n = t.length;
  const out = new Float64Array(at.length);
  let j = 0;
  for (let i = 0; i < at.length; i++) {
    const x = at[i]!;
    while (j + 1 < n && t[j + 1]! <= x) j++;
    const t0 = t[j]!;
    if (x <= t0 || j + 1 >= n) out[i] = values[j]!;
    else out[i] = values[j]! + ((values[j + 1]! - values[j]!) * (x - t0)) / (t[j + 1]! - t0);
  }
  return out;
}

/**
 * Piecewise cubic interpolation at ascending times through readings at uneven times.
 *
 * Hermite pieces with the slope at each reading from the parabola through it and its neighbours: passes
 * through every reading, needs no system of equations, keeps quadratics exactly.
 *
 * @param t - shape (n), strictly ascending, n >= 1.
 * @param values - shape (n), finite.
 * @param from - first time to evaluate; times before the first or after the last reading take its value.
 * @param step - spacing of the times.
 * @param count - how many.
 * @returns shape (count).
 */
export function interpolateCubic(
  t: Float64Array,
  values: Float64Array,
  from: number,
  step: number,
  count: number,
): Float64Array {
  const n = t.length;
  const out = new Float64Array(count);
  let j = 0;
  let loaded = -1;
  let width = 1;
  let slopeLeft = 0;
  let slopeRight = 0;
  for (let i = 0; i < count; i++) {
    const at = from + i * step;
    while (j + 2 < n && t[j + 1]! <= at) j++;
    if (at <= t[0]!) {
      out[i] = values[0]!;
      continue;
    }
    if (at >= t[n - 1]!) {
      out[i] = values[n - 1]!;
      continue;
    }
    if (loaded !== j) {
      loaded = j;
      width = t[j + 1]! - t[j]!;
      slopeLeft = slopeAt(t, values, j);
      slopeRight = slopeAt(t, values, j + 1);
    }
    const u = (at - t[j]!) / width;
    const v = 1 - u;
    out[i] =
      values[j]! * (1 + 2 * u) * v * v +
      slopeLeft * width * u * v * v +
      values[j + 1]! * u * u * (3 - 2 * u) -
      slopeRight * width * u * u * v;
  }
  return out;
}

function slopeAt(t: Float64Array, values: Float64Array, i: number): number {
  const n = t.length;
  if (n < 2) return 0;
  if (i === 0) return (values[1]! - values[0]!) / (t[1]! - t[0]!);
  if (i === n - 1) return (values[n - 1]! - values[n - 2]!) / (t[n - 1]! - t[n - 2]!);
  const before = t[i]! - t[i - 1]!;
  const after = t[i + 1]! - t[i]!;
  const left = (values[i]! - values[i - 1]!) / before;
  const right = (values[i + 1]! - values[i]!) / after;
  return (left * after + right * before) / (before + after);
}

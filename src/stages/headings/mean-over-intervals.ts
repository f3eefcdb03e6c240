/**
 * Mean direction over each of some intervals: the direction of the integral of the unit vectors, so that a turn inside
 * an interval counts as it was walked and not as it stood at one instant.
 *
 * @param t - times of the rows, s, uniform.
 * @param east - east part of the direction at each row.
 * @param north - north part.
 * @param from - starts of the intervals, shape (n), s.
 * @param to - their ends.
 * @returns shape (n), rad clockwise from north, -pi to pi.
 */
export function meanOverIntervals(
  t: Float64Array,
  east: Float64Array,
  north: Float64Array,
  from: Float64Array,
  to: Float64Array,
): Float64Array {
  const rows = t.length;
  const sumEast = new Float64Array(rows);
  const sumNorth = new Float64Array(rows);
  for (let i = 1; i < rows; i++) {
    const h = 0.5 * (t[i]! - t[i - 1]!);
    sumEast[i] = sumEast[i - 1]! + h * (east[i]! + east[i - 1]!);
    sumNorth[i] = sumNorth[i - 1]! + h * (north[i]! + north[i - 1]!);
  }
  const out = new Float64Array(from.length);
  const stepS = rows > 1 ? (t[rows - 1]! - t[0]!) / (rows - 1) : 1;
  const at = (sums: Float64Array, time: number): number => {
    const place = Math.max(0, Math.min(rows - 1, (time - t[0]!) / stepS));
    const below = Math.min(rows - 2, Math.floor(place));
    return rows < 2 ? 0 : sums[below]! + (place - below) * (sums[below + 1]! - sums[below]!);
  };
  for (let k = 0; k < out.length; k++) {
    const e = at(sumEast, to[k]!) - at(sumEast, from[k]!);
    const n = at(sumNorth, to[k]!) - at(sumNorth, from[k]!);
    out[k] = Math.atan2(e, n);
  }
  return out;
}

import type { Path } from '../../tables/schemas.js';

export interface PathPoint {
  east_m: number;
  north_m: number;
  cov_ee_m2: number;
  cov_en_m2: number;
  cov_nn_m2: number;
}

/**
 * Position along a path at a time: on the straight line between the rows before and after.
 *
 * Before the first row the start, after the last row the last position. Where two rows lie further apart
 * than one step takes, the walker stood at the earlier one until that long before the later one.
 *
 * @param path - rows in time order, at least one.
 * @param t_s - seconds.
 * @param longestStepS - longest time that one step takes, seconds.
 */
export function pathAt(path: Path, t_s: number, longestStepS: number): PathPoint {
  const last = path.t_s.length - 1;
  const row = rowAtOrBefore(path.t_s, t_s);
  if (row < 0) return pointBetween(path, 0, 0, 0);
  if (row >= last) return pointBetween(path, last, last, 0);
  const to = path.t_s[row + 1]!;
  const from = Math.max(path.t_s[row]!, to - longestStepS);
  return pointBetween(path, row, row + 1, t_s <= from ? 0 : (t_s - from) / (to - from));
}

/** Last row whose time is not after `t`; -1 where all are. */
function rowAtOrBefore(times: Float64Array, t: number): number {
  let low = -1;
  let high = times.length;
  while (high - low > 1) {
    const middle = (low + high) >> 1;
    if (times[middle]! <= t) low = middle;
    else high = middle;
  }
  return low;
}

function pointBetween(path: Path, a: number, b: number, share: number): PathPoint {
  const between = (values: Float64Array) => values[a]! + share * (values[b]! - values[a]!);
  return {
    east_m: between(path.east_m),
    north_m: between(path.north_m),
    cov_ee_m2: between(path.cov_ee_m2),
    cov_en_m2: between(path.cov_en_m2),
    cov_nn_m2: between(path.cov_nn_m2),
  };
}

import type { Attitude, Steps } from '../../tables/schemas.js';

/** A run of steps with the phone carried in one way: [from, to). */
export interface CarrySpell {
  from: number;
  to: number;
  /** Which way is up, seen from the device, on average over the spell; unit length. */
  up: readonly [number, number, number];
}

/** Steps before and after that are held against each other: two strides, so that the swing of an arm averages out. */
const REACH = 4;

/** A phone whose mean lie changes by this has been put somewhere else; arms and thighs wander by some ten degrees. */
const CHANGED_RAD = (35 * Math.PI) / 180;

/**
 * Parts a walk where the phone was moved from one place to another: where the direction of gravity in the device
 * before and after differ. Turns of the walker about the vertical change nothing in it.
 *
 * @returns at least one spell where there is a step; together they hold every step once.
 */
export function carrySpells(attitude: Attitude, steps: Steps): CarrySpell[] {
  const n = steps.t_s.length;
  if (n === 0) return [];
  const up = meanUp(attitude, steps);
  const change = new Float64Array(n);
  for (let k = 1; k < n; k++) {
    const before = average(up, Math.max(0, k - REACH), k);
    const after = average(up, k, Math.min(n, k + REACH));
    change[k] = Math.acos(Math.max(-1, Math.min(1, dot(before, after))));
  }
  const starts = [0];
  for (let k = 1; k < n; k++) {
    if (!(change[k]! >= CHANGED_RAD)) continue;
    let most = true;
    for (let i = Math.max(1, k - REACH); i <= Math.min(n - 1, k + REACH); i++)
      if (change[i]! > change[k]! || (change[i] === change[k] && i < k)) most = false;
    if (most) starts.push(k);
  }
  return starts.map((from, i) => {
    const to = starts[i + 1] ?? n;
    return { from, to, up: average(up, from, to) };
  });
}

type Vector = [number, number, number];

/** Up in the device frame, summed over each step. */
function meanUp(attitude: Attitude, steps: Steps): Vector[] {
  const rows = attitude.t_s.length;
  const stepS = rows > 1 ? (attitude.t_s[rows - 1]! - attitude.t_s[0]!) / (rows - 1) : 1;
  const rowAt = (t: number) => Math.max(0, Math.min(rows - 1, Math.round((t - attitude.t_s[0]!) / stepS)));
  return Array.from(steps.t_s, (_, k) => {
    const sum: Vector = [0, 0, 0];
    for (let i = rowAt(steps.start_s[k]!); i <= rowAt(steps.end_s[k]!); i++) {
      const w = attitude.qw[i]!;
      const x = attitude.qx[i]!;
      const y = attitude.qy[i]!;
      const z = attitude.qz[i]!;
      sum[0] += 2 * (x * z - w * y);
      sum[1] += 2 * (y * z + w * x);
      sum[2] += 1 - 2 * (x * x + y * y);
    }
    return sum;
  });
}

function average(vectors: readonly Vector[], from: number, to: number): Vector {
  const sum: Vector = [0, 0, 0];
  for (let i = from; i < to; i++) for (let a = 0; a < 3; a++) sum[a]! += vectors[i]![a]!;
  const length = Math.hypot(...sum);
  return length > 0 ? [sum[0] / length, sum[1] / length, sum[2] / length] : [0, 0, 1];
}

function dot(a: Vector, b: Vector): number {
  return a[0] * b[0] + a[1] * b[1] + a[2] * b[2];
}

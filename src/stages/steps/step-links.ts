import type { PeakCandidates } from './peak-candidates.js';
import {
  intervalEvidence,
  likenessEvidence,
  passedOverEvidence,
  peakEvidence,
  rhythmEvidence,
} from './step-evidence.js';

/**
 * Everything that a chain of steps can be put together from: links between peaks that could be consecutive steps, and
 * joints between consecutive links, with the evidence of each.
 */
export interface StepLinks {
  peaks: number;
  /** Evidence of each peak being a step, shape (peaks). */
  peak: Float64Array;
  /** First peak that still counts as just before each, shape (peaks). */
  recentFrom: Int32Array;
  /** Links into peak i are firstInto[i] to firstInto[i + 1], shape (peaks + 1). */
  firstInto: Int32Array;
  /** The peak that each link comes from and goes to, shape (links). */
  from: Int32Array;
  to: Int32Array;
  /** Evidence of a link: its later peak, its interval, the peaks it passes over, shape (links). */
  link: Float64Array;
  /** Joints of link l with the links into its `from` peak, in their order, start at firstJoint[l]. */
  firstJoint: Int32Array;
  /** Evidence of each joint: rhythm and likeness. */
  rhythm: Float64Array;
  likeness: Float64Array;
}

/** A pause this long is one of a walk that goes on: at a door, at a checkpoint. */
const RECENT_S = 10;

/**
 * Half of the stretch around a peak whose likeness is compared, s: about a step on either side, so that the times of
 * the neighbours count too; more where steps are slower than one a second, or any two single pushes would be alike.
 */
function likenessHalfS(strideS: number): number {
  return 0.55 + 0.4 * Math.max(0, Math.min(2, strideS - 2));
}

/** Finds all links and joints. */
export function stepLinks(
  candidates: PeakCandidates,
  typical: Float64Array,
  shortestS: number,
  longestS: number,
): StepLinks {
  const { count: n, at, prominence, rateHz } = candidates;
  const peak = prominence.map((height, i) => peakEvidence(height, typical[i]!));
  const passed = new Float64Array(n + 1);
  for (let i = 0; i < n; i++) passed[i + 1] = passed[i]! + passedOverEvidence(prominence[i]!, typical[i]!);
  const from: number[] = [];
  const to: number[] = [];
  const link: number[] = [];
  const firstInto = new Int32Array(n + 1);
  for (let i = 0, low = 0; i < n; i++) {
    firstInto[i] = from.length;
    while (at[i]! - at[low]! > longestS * rateHz) low++;
    for (let p = low; p < i && at[i]! - at[p]! >= shortestS * rateHz; p++) {
      from.push(p);
      to.push(i);
      link.push(peak[i]! + intervalEvidence((at[i]! - at[p]!) / rateHz) + passed[i]! - passed[p + 1]!);
    }
  }
  firstInto[n] = from.length;
  const recentFrom = new Int32Array(n);
  for (let i = 0, low = 0; i < n; i++) {
    while (at[i]! - at[low]! > RECENT_S * rateHz) low++;
    recentFrom[i] = low;
  }
  const joints = jointsOf(candidates, firstInto, from, to);
  return {
    peaks: n,
    peak,
    recentFrom,
    firstInto,
    from: Int32Array.from(from),
    to: Int32Array.from(to),
    link: Float64Array.from(link),
    ...joints,
  };
}

function jointsOf(
  { at, level, rateHz }: PeakCandidates,
  firstInto: Int32Array,
  from: readonly number[],
  to: readonly number[],
) {
  const firstJoint = new Int32Array(from.length + 1);
  for (let l = 0; l < from.length; l++)
    firstJoint[l + 1] = firstJoint[l]! + firstInto[from[l]! + 1]! - firstInto[from[l]!]!;
  const rhythm = new Float64Array(firstJoint[from.length]!);
  const likeness = new Float64Array(rhythm.length);
  for (let l = 0; l < from.length; l++) {
    const p = from[l]!;
    const i = to[l]!;
    for (let k = firstInto[p]!, j = firstJoint[l]!; k < firstInto[p + 1]!; k++, j++) {
      const h = from[k]!;
      const half = Math.round(rateHz * likenessHalfS((at[i]! - at[h]!) / rateHz));
      rhythm[j] = rhythmEvidence(at[i]! - at[p]!, at[p]! - at[h]!);
      likeness[j] = likenessEvidence(correlation(level, Math.round(at[h]!), Math.round(at[i]!), half));
    }
  }
  return { firstJoint, rhythm, likeness };
}

/** Correlation of the signal around two places, over `half` samples on either side; 0 where it is flat. */
function correlation(level: Float64Array, a: number, b: number, half: number): number {
  const from = Math.max(-half, -a);
  const to = Math.min(half, level.length - 1 - b);
  const n = to - from + 1;
  let sx = 0;
  let sy = 0;
  let sxx = 0;
  let syy = 0;
  let sxy = 0;
  for (let k = from; k <= to; k++) {
    const x = level[a + k]!;
    const y = level[b + k]!;
    sx += x;
    sy += y;
    sxx += x * x;
    syy += y * y;
    sxy += x * y;
  }
  const vx = sxx - (sx * sx) / n;
  const vy = syy - (sy * sy) / n;
  return vx > 0 && vy > 0 ? (sxy - (sx * sy) / n) / Math.sqrt(vx * vy) : 0;
}

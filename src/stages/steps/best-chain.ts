import type { StepLinks } from './step-links.js';

export interface ChainOdds {
  /** Log odds against a bout of walking beginning at a given peak. */
  startCost: number;
  /** The same where another bout ended not long before: who walked just now walks on. */
  restartCost: number;
}

/** Least evidence of the first and the last step of a bout, which are weaker than the others. */
const EDGE_PEAK = 0.4;
/** Least evidence of the joint next to them: they are also less alike and less in time. */
const EDGE_JOINT = -0.8;

/**
 * The most probable bouts of walking: chains of links through the peaks, each with at least two steps.
 *
 * Dynamic programming over links, since the evidence of a step depends on the two before it.
 *
 * @returns the peaks that are steps, ascending.
 * @see Viterbi (1967), IEEE Trans. Information Theory 13(2), 260-269.
 */
export function bestChain(links: StepLinks, { startCost, restartCost }: ChainOdds): Int32Array {
  const { peaks, peak, firstInto, recentFrom, from, link, firstJoint, rhythm, likeness } = links;
  const count = link.length;
  const best = new Float64Array(count);
  const before = new Int32Array(count);
  /** The link before, where the link is the last of its bout and judged as such; -2: judged like any other. */
  const beforeLast = new Int32Array(count).fill(-2);
  // The best of what has ended before each peak, and the link that it ended with.
  const ended = new Float64Array(peaks + 1);
  const endedWith = new Int32Array(peaks + 1).fill(-1);
  // The best that ends at each peak itself.
  const endsHere = new Float64Array(peaks).fill(Number.NEGATIVE_INFINITY);
  const endsHereWith = new Int32Array(peaks).fill(-1);
  // The best start of a bout at each peak, and the link that the bout before ended with.
  const started = new Float64Array(peaks);
  const startedAfter = new Int32Array(peaks);
  for (let i = 0; i < peaks; i++) {
    started[i] = ended[i]! - startCost;
    startedAfter[i] = endedWith[i]!;
    for (let e = recentFrom[i]!; e < i; e++)
      if (endsHere[e]! - restartCost > started[i]!) {
        started[i] = endsHere[e]! - restartCost;
        startedAfter[i] = endsHereWith[e]!;
      }
    started[i]! += Math.max(peak[i]!, EDGE_PEAK);
    for (let l = firstInto[i]!; l < firstInto[i + 1]!; l++) {
      const p = from[l]!;
      let value = started[p]!;
      let through = -1;
      let lastValue = Number.NEGATIVE_INFINITY;
      let lastThrough = -1;
      for (let k = firstInto[p]!, j = firstJoint[l]!; k < firstInto[p + 1]!; k++, j++) {
        const edge = best[k]! + Math.max(rhythm[j]!, EDGE_JOINT) + Math.max(likeness[j]!, EDGE_JOINT);
        const joined = before[k]! < 0 ? edge : best[k]! + rhythm[j]! + likeness[j]!;
        if (joined > value) {
          value = joined;
          through = k;
        }
        if (edge > lastValue) {
          lastValue = edge;
          lastThrough = k;
        }
      }
      best[l] = value + link[l]!;
      before[l] = through;
      const last = lastValue + link[l]! + Math.max(0, EDGE_PEAK - peak[i]!);
      if (last > best[l]!) beforeLast[l] = lastThrough;
      const end = Math.max(last, best[l]!);
      if (end > endsHere[i]!) {
        endsHere[i] = end;
        endsHereWith[i] = l;
      }
    }
    const better = endsHere[i]! > ended[i]!;
    ended[i + 1] = better ? endsHere[i]! : ended[i]!;
    endedWith[i + 1] = better ? endsHereWith[i]! : endedWith[i]!;
  }
  return traceBack(links, before, beforeLast, startedAfter, endedWith[peaks]!);
}

function traceBack(
  { from, to }: StepLinks,
  before: Int32Array,
  beforeLast: Int32Array,
  startedAfter: Int32Array,
  end: number,
): Int32Array {
  const steps: number[] = [];
  for (let l = end; l >= 0; ) {
    steps.push(to[l]!);
    let next = beforeLast[l]! !== -2 ? beforeLast[l]! : before[l]!;
    while (next >= 0) {
      l = next;
      steps.push(to[l]!);
      next = before[l]!;
    }
    steps.push(from[l]!);
    l = startedAfter[from[l]!]!;
  }
  return Int32Array.from(steps.reverse());
}

import type { StepLinks } from './step-links.js';

/** Log of the sum of two numbers given by their logarithms. */
function logAdd(a: number, b: number): number {
  if (a === Number.NEGATIVE_INFINITY) return b;
  return a > b ? a + Math.log1p(Math.exp(b - a)) : b + Math.log1p(Math.exp(a - b));
}

/**
 * Probability of each peak being a step, over all ways in which bouts of steps can go through the peaks.
 *
 * Forward and backward sums over links. Neighbouring pieces of evidence see the same samples and are not independent,
 * so each counts only in part.
 *
 * @param startCost - log odds against a bout beginning at a given peak.
 * @param share - 0 to 1, what a piece of evidence counts; the smaller, the less sure.
 * @returns shape (peaks), 0 to 1.
 * @see Rabiner (1989), Proc. IEEE 77(2), 257-286: the forward-backward procedure.
 */
export function stepProbability(links: StepLinks, startCost: number, share: number): Float64Array {
  const { peaks, peak, firstInto, from, link, firstJoint, rhythm, likeness } = links;
  const count = link.length;
  const joint = (j: number) => share * (rhythm[j]! + likeness[j]!);
  const start = (l: number) => share * (peak[from[l]!]! - startCost);
  const forward = new Float64Array(count);
  const ended = new Float64Array(peaks + 1);
  for (let i = 0; i < peaks; i++) {
    ended[i + 1] = ended[i]!;
    for (let l = firstInto[i]!; l < firstInto[i + 1]!; l++) {
      const p = from[l]!;
      let sum = ended[p]! + start(l);
      for (let k = firstInto[p]!, j = firstJoint[l]!; k < firstInto[p + 1]!; k++, j++)
        sum = logAdd(sum, forward[k]! + joint(j));
      forward[l] = sum + share * link[l]!;
      ended[i + 1] = logAdd(ended[i + 1]!, forward[l]!);
    }
  }
  const backward = new Float64Array(count).fill(Number.NEGATIVE_INFINITY);
  const ahead = new Float64Array(peaks + 1);
  // What begins at each peak, gathered from the links that leave it: they all end later.
  const begins = new Float64Array(peaks).fill(Number.NEGATIVE_INFINITY);
  const total = ended[peaks]!;
  const probability = new Float64Array(peaks);
  for (let i = peaks - 1; i >= 0; i--) {
    ahead[i] = logAdd(ahead[i + 1]!, begins[i]!);
    for (let l = firstInto[i]!; l < firstInto[i + 1]!; l++) {
      const p = from[l]!;
      backward[l] = logAdd(backward[l]!, ahead[i + 1]!);
      const after = share * link[l]! + backward[l]!;
      begins[p] = logAdd(begins[p]!, start(l) + after);
      for (let k = firstInto[p]!, j = firstJoint[l]!; k < firstInto[p + 1]!; k++, j++)
        backward[k] = logAdd(backward[k]!, joint(j) + after);
      probability[i]! += Math.exp(forward[l]! + backward[l]! - total);
      probability[p]! += Math.exp(ended[p]! + start(l) + after - total);
    }
  }
  return probability.map((value) => Math.min(1, value));
}

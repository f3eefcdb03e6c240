/** Pairs of indices, in time order. */
export interface Matching {
  /** Indices into the detected instants. */
  detected: Int32Array;
  /** Indices into the true instants, one for each detected one. */
  truth: Int32Array;
}

/**
 * Pairs detected with true instants, one to one and in time order, as many as possible; among these, the
 * pairing whose times differ least in sum.
 *
 * Found exactly, by dynamic programming over each group of instants that lies apart from the others.
 *
 * @param detected - shape (n), ascending, seconds.
 * @param truth - shape (m), ascending, seconds.
 * @param toleranceS - largest difference within a pair, inclusive, seconds.
 */
export function matchInstants(detected: Float64Array, truth: Float64Array, toleranceS: number): Matching {
  const pairs: { detected: number; truth: number }[] = [];
  let i = 0;
  let j = 0;
  while (i < detected.length && j < truth.length) {
    const fromI = i;
    const fromJ = j;
    // A group: instants of both kinds of which none lies further from the next than a pair may.
    let latest = Math.min(detected[i]!, truth[j]!);
    let next = latest;
    do {
      if (detected[i] === next) i++;
      else j++;
      latest = next;
      next = Math.min(detected[i] ?? Number.POSITIVE_INFINITY, truth[j] ?? Number.POSITIVE_INFINITY);
    } while (next - latest <= toleranceS);
    matchGroup(detected, fromI, i, truth, fromJ, j, toleranceS, pairs);
  }
  return {
    detected: Int32Array.from(pairs, (pair) => pair.detected),
    truth: Int32Array.from(pairs, (pair) => pair.truth),
  };
}

const SKIP_DETECTED = 1;
const SKIP_TRUTH = 2;
const PAIR = 3;

/** Best pairing of detected[i0, i1) with truth[j0, j1), appended to `pairs`. */
function matchGroup(
  detected: Float64Array,
  i0: number,
  i1: number,
  truth: Float64Array,
  j0: number,
  j1: number,
  toleranceS: number,
  pairs: { detected: number; truth: number }[],
): void {
  const n = i1 - i0;
  const m = j1 - j0;
  if (n === 0 || m === 0) return;
  const width = m + 1;
  const choice = new Uint8Array((n + 1) * width);
  // Best over prefixes, kept for the row before and this one: pairs counted, then summed difference.
  let countBefore = new Int32Array(width);
  let costBefore = new Float64Array(width);
  let count = new Int32Array(width);
  let cost = new Float64Array(width);
  for (let i = 1; i <= n; i++) {
    count[0] = 0;
    cost[0] = 0;
    for (let j = 1; j <= m; j++) {
      let best = countBefore[j]!;
      let bestCost = costBefore[j]!;
      let chosen = SKIP_DETECTED;
      if (count[j - 1]! > best || (count[j - 1]! === best && cost[j - 1]! < bestCost)) {
        best = count[j - 1]!;
        bestCost = cost[j - 1]!;
        chosen = SKIP_TRUTH;
      }
      const difference = Math.abs(detected[i0 + i - 1]! - truth[j0 + j - 1]!);
      const paired = countBefore[j - 1]! + 1;
      const pairedCost = costBefore[j - 1]! + difference;
      if (difference <= toleranceS && (paired > best || (paired === best && pairedCost < bestCost))) {
        best = paired;
        bestCost = pairedCost;
        chosen = PAIR;
      }
      count[j] = best;
      cost[j] = bestCost;
      choice[i * width + j] = chosen;
    }
    [countBefore, count] = [count, countBefore];
    [costBefore, cost] = [cost, costBefore];
  }
  const found: { detected: number; truth: number }[] = [];
  for (let i = n, j = m; i > 0 && j > 0; ) {
    const chosen = choice[i * width + j];
    if (chosen === PAIR) found.push({ detected: i0 + --i, truth: j0 + --j });
    else if (chosen === SKIP_DETECTED) i--;
    else j--;
  }
  pairs.push(...found.reverse());
}

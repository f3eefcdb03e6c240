import { matchInstants } from '../stats/match-instants.js';
import { median } from '../stats/quantile.js';
import { rootMeanSquare } from '../stats/summary.js';

/** Largest time between a detected and a labelled step that are one: half of a step at two steps a second. */
export const STEP_TOLERANCE_S = 0.25;

/** Lags looked through for the one that pairs most. */
const LAG_RANGE_S = 0.5;
const LAG_STEP_S = 0.02;

export interface StepAgreement {
  true_positives: number;
  false_positives: number;
  misses: number;
  precision: number;
  recall: number;
  f1: number;
  count_error_pct: number;
  lag_s: number;
  timing_rmse_s: number;
}

/**
 * Detected against labelled steps of one walk.
 *
 * A detector's event and a foot contact are different instants of the same step, so a constant lag (at
 * most half a second either way) is taken off first: the median difference of the pairs at the smallest lag that
 * pairs as many as any, or nearly. Judged is the labelled span and a quarter of a second beyond its ends: outside it nobody
 * looked.
 *
 * @param detected - shape (n), ascending, seconds.
 * @param labelled - shape (m), ascending, m >= 1, seconds.
 */
export function stepAgreement(detected: Float64Array, labelled: Float64Array): StepAgreement {
  const lag_s = lagOf(detected, labelled);
  const from = labelled[0]! - STEP_TOLERANCE_S;
  const to = labelled.at(-1)! + STEP_TOLERANCE_S;
  const judged = detected.map((t) => t - lag_s).filter((t) => t >= from && t <= to);
  const pairs = matchInstants(judged, labelled, STEP_TOLERANCE_S);
  const paired = pairs.detected.length;
  const precision = judged.length > 0 ? paired / judged.length : Number.NaN;
  const recall = paired / labelled.length;
  return {
    true_positives: paired,
    false_positives: judged.length - paired,
    misses: labelled.length - paired,
    precision,
    recall,
    f1: (2 * paired) / (judged.length + labelled.length),
    count_error_pct: (100 * (judged.length - labelled.length)) / labelled.length,
    lag_s,
    timing_rmse_s: paired > 0 ? rootMeanSquare(differences(judged, labelled, pairs)) : Number.NaN,
  };
}

/** Lags that pair this share of the most are as good: a whole step's shift may pair one step more at an end. */
const AS_GOOD = 0.98;

/** Median of detected minus labelled over the pairs at the smallest of the good lags; 0 where nothing pairs. */
function lagOf(detected: Float64Array, labelled: Float64Array): number {
  const half = Math.round(LAG_RANGE_S / LAG_STEP_S);
  // From 0 outwards.
  const lags = Array.from({ length: 2 * half + 1 }, (_, k) => LAG_STEP_S * (k % 2 ? (k + 1) / 2 : -k / 2));
  const paired = lags.map((lag) => countPairs(detected, labelled, lag));
  const most = Math.max(...paired);
  if (most === 0) return 0;
  let lag = lags[paired.findIndex((pairs) => pairs >= AS_GOOD * most)]!;
  // The good lags reach to either side of the best one: the median of the differences goes to their middle.
  for (let round = 0; round < 3; round++) {
    const moved = detected.map((t) => t - lag);
    lag += median(differences(moved, labelled, matchInstants(moved, labelled, STEP_TOLERANCE_S)));
  }
  return lag;
}

function differences(
  detected: Float64Array,
  labelled: Float64Array,
  pairs: { detected: Int32Array; truth: Int32Array },
): Float64Array {
  return Float64Array.from(pairs.detected, (i, k) => detected[i]! - labelled[pairs.truth[k]!]!);
}

/** As many pairs as can be made: for a count alone, the earliest partner is never worse. */
function countPairs(detected: Float64Array, labelled: Float64Array, lag: number): number {
  let pairs = 0;
  let j = 0;
  for (let i = 0; i < detected.length && j < labelled.length; ) {
    const difference = detected[i]! - lag - labelled[j]!;
    if (Math.abs(difference) <= STEP_TOLERANCE_S) {
      pairs++;
      i++;
      j++;
    } else if (difference < 0) i++;
    else j++;
  }
  return pairs;
}

import { InputError } from '../errors.js';
import { drawClusters, groupByCluster, largestCluster } from './cluster-resampling.js';
import { normalCdf, normalQuantile } from './normal.js';
import { quantileSorted } from './quantile.js';
import { randomStream } from './random.js';
import { mean as meanOf, standardDeviation } from './summary.js';

/** An estimate with the ends of its interval. */
export interface BootstrapInterval {
  /** The statistic of the data themselves. */
  estimate: number;
  low: number;
  high: number;
  /** Standard deviation of the replicates. */
  standardError: number;
}

/** Writes the statistics of the items at `indices` (repeats allowed) into `out`. Keeps neither. */
export type IndexStatistics = (indices: Int32Array, out: Float64Array) => void;

export interface BootstrapOptions {
  /** A whole number; the same seed gives the same intervals. */
  seed: number;
  /** Default 2000; at least 100. */
  replicates?: number;
  /** Default 0.95. */
  confidence?: number;
  /** `bca`, the default, corrects bias and skew by a jackknife over clusters; `percentile` does not. */
  interval?: 'bca' | 'percentile';
  /** Items inside a drawn cluster: `resample` (the default) or `all` as they are. */
  inner?: 'resample' | 'all';
}

/**
 * Cluster bootstrap: draws clusters with replacement, then items inside each drawn cluster.
 *
 * Walks of one walker are alike; drawing walks alone would take them for independent and give intervals
 * that are too narrow. Drawing inside clusters too errs a little to the wide side (`inner: 'all'` does
 * not), which is welcome with few clusters: below about ten, percentile intervals cover too seldom.
 * All statistics share one draw, so intervals of several columns cost one pass.
 *
 * @param clusterOf - shape (n), the cluster of each item; at least 2 clusters.
 * @param nStatistics - how many numbers `statistics` writes.
 * @param statistics - any order of indices must give the same; every number it writes must be finite.
 * @returns one interval a statistic. Where all replicates are equal, both ends are that value.
 * @throws InputError `too-few-clusters`, `not-finite`, `replicates`, `confidence`, `seed`.
 * @see Davison & Hinkley (1997), Bootstrap Methods and their Application, Cambridge, section 3.8.
 * @see Field & Welsh (2007), JRSS B 69(3), 369-390 (consistency of drawing whole clusters).
 * @see Efron (1987), JASA 82(397), 171-185 (BCa).
 */
export function clusterBootstrap(
  clusterOf: ArrayLike<number | string>,
  nStatistics: number,
  statistics: IndexStatistics,
  options: BootstrapOptions,
): BootstrapInterval[] {
  const { seed, replicates = 2000, confidence = 0.95, interval = 'bca', inner = 'resample' } = options;
  if (!(Number.isInteger(replicates) && replicates >= 100))
    throw new InputError(
      'replicates',
      `bootstrap replicates must be a whole number of at least 100, got ${replicates}`,
    );
  if (!(confidence > 0 && confidence < 1))
    throw new InputError('confidence', `bootstrap confidence must be between 0 and 1, got ${confidence}`);
  const clusters = groupByCluster(clusterOf);
  if (clusters.nClusters < 2)
    throw new InputError(
      'too-few-clusters',
      `a cluster bootstrap needs at least 2 clusters, got ${clusters.nClusters}`,
    );

  const out = new Float64Array(nStatistics);
  const evaluate = (indices: Int32Array, where: string) => {
    statistics(indices, out);
    for (let s = 0; s < nStatistics; s++)
      if (!Number.isFinite(out[s]))
        throw new InputError('not-finite', `bootstrap: statistic ${s} of ${where} is ${out[s]}`);
  };

  evaluate(clusters.items, 'the data');
  const estimates = out.slice();
  const drawn = Array.from({ length: nStatistics }, () => new Float64Array(replicates));
  const buffer = new Int32Array(clusters.nClusters * largestCluster(clusters));
  const random = randomStream(seed, 'cluster-bootstrap');
  for (let r = 0; r < replicates; r++) {
    const n = drawClusters(clusters, inner, random, buffer);
    evaluate(buffer.subarray(0, n), `replicate ${r}`);
    for (let s = 0; s < nStatistics; s++) drawn[s]![r] = out[s]!;
  }

  const jackknife = interval === 'bca' ? leaveOneOut() : null;
  return drawn.map((values, s) => {
    values.sort();
    const [low, high] = jackknife
      ? acceleratedProbabilities(values, estimates[s]!, jackknife[s]!, confidence)
      : [(1 - confidence) / 2, (1 + confidence) / 2];
    return {
      estimate: estimates[s]!,
      low: quantileSorted(values, low),
      high: quantileSorted(values, high),
      standardError: standardDeviation(values),
    };
  });

  /** The statistics with each cluster left out in turn. */
  function leaveOneOut(): Float64Array[] {
    const { nClusters, items, starts } = clusters;
    const left = Array.from({ length: nStatistics }, () => new Float64Array(nClusters));
    const rest = new Int32Array(items.length);
    for (let c = 0; c < nClusters; c++) {
      rest.set(items.subarray(0, starts[c]!));
      rest.set(items.subarray(starts[c + 1]!), starts[c]!);
      evaluate(
        rest.subarray(0, items.length - (starts[c + 1]! - starts[c]!)),
        `the data without cluster ${c}`,
      );
      for (let s = 0; s < nStatistics; s++) left[s]![c] = out[s]!;
    }
    return left;
  }
}

/** The percentiles that BCa reads off, both at (1 ∓ confidence)/2 without bias and skew. */
function acceleratedProbabilities(
  sorted: Float64Array,
  estimate: number,
  jackknife: Float64Array,
  confidence: number,
): [low: number, high: number] {
  const n = sorted.length;
  let below = 0;
  let equal = 0;
  for (const value of sorted) {
    if (value < estimate) below++;
    else if (value === estimate) equal++;
  }
  // Ties count half. A share of 0 or 1 would shift by infinity: half a replicate is the finest it can tell.
  const share = Math.min(1 - 0.5 / n, Math.max(0.5 / n, (below + equal / 2) / n));
  const shift = normalQuantile(share);
  const mean = meanOf(jackknife);
  let squares = 0;
  let cubes = 0;
  for (const value of jackknife) {
    squares += (mean - value) ** 2;
    cubes += (mean - value) ** 3;
  }
  const acceleration = squares > 0 ? cubes / (6 * squares ** 1.5) : 0;
  const moved = (probability: number) => {
    const z = shift + normalQuantile(probability);
    const scale = 1 - acceleration * z;
    // Skew beyond what the correction can express: its limit is the end of the replicates.
    if (!(scale > 0)) return z > 0 ? 1 : 0;
    return normalCdf(shift + z / scale);
  };
  return [moved((1 - confidence) / 2), moved((1 + confidence) / 2)];
}

import { InputError } from '../errors.js';
import { groupByCluster } from './cluster-resampling.js';
import { randomStream } from './random.js';

export interface SignFlipTest {
  /** Mean of the differences. */
  meanDifference: number;
  pValue: number;
  clusters: number;
  /** Whether every assignment of signs was counted. */
  exact: boolean;
}

/** Up to this many clusters every assignment of signs is counted. */
const EXACT_CLUSTERS = 12;

/**
 * Sign-flip permutation test of paired differences, flipping whole clusters.
 *
 * If neither side is better, a walker's differences might as well have come with the other sign, all of
 * them together. With k clusters the smallest two-sided p is 2^(1 - k): 5 walkers can never reach 0.05.
 *
 * @param differences - shape (n), n >= 1, any unit; every value finite. Tested is their mean.
 * @param clusterOf - shape (n), the cluster of each.
 * @param options.alternative - `two-sided` (default), `less`: the mean is below 0, or `greater`.
 * @param options.seed - of the random assignments where there are more than 12 clusters.
 * @param options.replicates - default 10000; p is (1 + as extreme)/(1 + replicates), never 0.
 * @throws InputError `empty`, `shape`, `not-finite`, `replicates`, `seed`.
 * @see Winkler et al. (2014), NeuroImage 92, 381-397, section "exchangeability blocks" (whole-block flips).
 * @see Phipson & Smyth (2010), Stat. Appl. Genet. Mol. Biol. 9(1), 39 (why 1 is added).
 */
export function signFlipTest(
  differences: ArrayLike<number>,
  clusterOf: ArrayLike<number | string>,
  options: { seed: number; replicates?: number; alternative?: 'two-sided' | 'less' | 'greater' },
): SignFlipTest {
  const n = differences.length;
  const { seed, replicates = 10_000, alternative = 'two-sided' } = options;
  if (n === 0) throw new InputError('empty', 'signFlipTest: needs at least one difference, got none');
  if (clusterOf.length !== n)
    throw new InputError(
      'shape',
      `signFlipTest: ${n} differences need ${n} clusters, got ${clusterOf.length}`,
    );
  if (!(Number.isInteger(replicates) && replicates >= 100))
    throw new InputError(
      'replicates',
      `permutation replicates must be a whole number of at least 100, got ${replicates}`,
    );
  const { nClusters, items, starts } = groupByCluster(clusterOf);
  const sums = new Float64Array(nClusters);
  for (let c = 0; c < nClusters; c++)
    for (let k = starts[c]!; k < starts[c + 1]!; k++) {
      const difference = differences[items[k]!]!;
      if (!Number.isFinite(difference))
        throw new InputError('not-finite', `signFlipTest: difference ${items[k]} is ${difference}`);
      sums[c]! += difference;
    }

  let observed = 0;
  let size = 0;
  for (const sum of sums) {
    observed += sum;
    size += Math.abs(sum);
  }
  // Sums that are equal in exact arithmetic must count as equal, whatever the order of rounding.
  const slack = size * 1e-12;
  const isExtreme = (total: number) => {
    switch (alternative) {
      case 'two-sided':
        return Math.abs(total) >= Math.abs(observed) - slack;
      case 'less':
        return total <= observed + slack;
      case 'greater':
        return total >= observed - slack;
      default:
        return alternative satisfies never;
    }
  };

  const exact = nClusters <= EXACT_CLUSTERS;
  let extreme = 0;
  if (exact) {
    for (let signs = 0; signs < 2 ** nClusters; signs++) {
      let total = 0;
      for (let c = 0; c < nClusters; c++) total += (signs >> c) & 1 ? -sums[c]! : sums[c]!;
      if (isExtreme(total)) extreme++;
    }
  } else {
    const random = randomStream(seed, 'sign-flip');
    for (let r = 0; r < replicates; r++) {
      let total = 0;
      for (let c = 0; c < nClusters; c++) total += random.uniform() < 0.5 ? -sums[c]! : sums[c]!;
      if (isExtreme(total)) extreme++;
    }
  }
  const pValue = exact ? extreme / 2 ** nClusters : (1 + extreme) / (1 + replicates);
  return { meanDifference: observed / n, pValue, clusters: nClusters, exact };
}

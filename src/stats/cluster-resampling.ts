import { InputError } from '../errors.js';
import type { RandomStream } from './random.js';

/** Items grouped by cluster, in one array: those of cluster c are `items[starts[c]] .. items[starts[c + 1]]`. */
export interface Clusters {
  nItems: number;
  nClusters: number;
  items: Int32Array;
  starts: Int32Array;
}

/**
 * Groups items by the cluster they belong to.
 *
 * @param clusterOf - shape (n), n >= 1; the cluster of each item, as any number or word.
 * @returns clusters in the order of their first item, items in ascending order inside.
 * @throws InputError `empty`.
 */
export function groupByCluster(clusterOf: ArrayLike<number | string>): Clusters {
  const nItems = clusterOf.length;
  if (nItems === 0) throw new InputError('empty', 'groupByCluster: needs at least one item, got none');
  const numberOf = new Map<number | string, number>();
  const cluster = new Int32Array(nItems);
  for (let i = 0; i < nItems; i++) {
    const name = clusterOf[i]!;
    if (!numberOf.has(name)) numberOf.set(name, numberOf.size);
    cluster[i] = numberOf.get(name)!;
  }
  const nClusters = numberOf.size;
  const starts = new Int32Array(nClusters + 1);
  for (const c of cluster) starts[c + 1]!++;
  for (let c = 0; c < nClusters; c++) starts[c + 1]! += starts[c]!;
  const items = new Int32Array(nItems);
  const next = starts.slice(0, nClusters);
  for (let i = 0; i < nItems; i++) items[next[cluster[i]!]!++] = i;
  return { nItems, nClusters, items, starts };
}

/**
 * Draws as many clusters as there are, with replacement, and from each drawn cluster its items.
 *
 * @param inner - `resample`: as many of the cluster's items as it has, with replacement;
 *   `all`: the cluster's items as they are.
 * @param into - where the drawn item indices go; at least nClusters times the largest cluster long.
 * @returns how many were drawn: it varies where the clusters differ in size.
 */
export function drawClusters(
  clusters: Clusters,
  inner: 'resample' | 'all',
  random: RandomStream,
  into: Int32Array,
): number {
  const { nClusters, items, starts } = clusters;
  let drawn = 0;
  for (let k = 0; k < nClusters; k++) {
    const c = random.integer(0, nClusters);
    const from = starts[c]!;
    const to = starts[c + 1]!;
    if (inner === 'resample')
      for (let i = from; i < to; i++) into[drawn++] = items[random.integer(from, to)]!;
    else for (let i = from; i < to; i++) into[drawn++] = items[i]!;
  }
  return drawn;
}

/** The size of the largest cluster. */
export function largestCluster({ nClusters, starts }: Clusters): number {
  let largest = 0;
  for (let c = 0; c < nClusters; c++) largest = Math.max(largest, starts[c + 1]! - starts[c]!);
  return largest;
}

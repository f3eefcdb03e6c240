import { clusterBootstrap } from '../stats/bootstrap.js';
import { holmAdjusted } from '../stats/holm.js';
import { signFlipTest } from '../stats/permutation.js';

/** One walk scored by both recipes at the same passes. */
export interface PairedWalk {
  walk: string;
  walker: string;
  group: string;
  carry: string;
  passes: number;
  /** Mean error over the shared passes, m. */
  a_m: number;
  b_m: number;
}

export interface ComparedGroup {
  by: string;
  value: string;
  walkers: number;
  walks: number;
  a_m: number;
  b_m: number;
  /** Mean over walks of b - a, with its 95 % interval (NaN with fewer than two walkers), m. */
  difference_m: number;
  low_m: number;
  high_m: number;
  /** The same as a part of a, percent. */
  difference_pct: number;
  /** Walks in which b is better, and worse. */
  wins: number;
  losses: number;
  /** Two-sided sign-flip test, walkers flipped whole; and corrected for the groups compared (Holm). */
  p: number;
  p_adjusted: number;
}

const SEED = 20260102;

/**
 * Two recipes on the same walks, over all walks and by group and carry.
 *
 * The difference is of each walk's mean error over the passes that both score; walks count equally. Intervals draw
 * walkers, then their walks.
 */
export function compareWalks(walks: readonly PairedWalk[]): ComparedGroup[] {
  const sets: { by: string; value: string; rows: PairedWalk[] }[] = [
    { by: 'all', value: 'all', rows: [...walks] },
  ];
  for (const by of ['group', 'carry'] as const) {
    const values = [...new Set(walks.map((walk) => walk[by]))].filter((value) => value !== '').sort();
    if (values.length > 1)
      for (const value of values) sets.push({ by, value, rows: walks.filter((walk) => walk[by] === value) });
  }
  const groups = sets.map(({ by, value, rows }) => ({ by, value, ...compareSet(rows) }));
  // All walks are one question; the groups of each kind are several.
  for (const by of ['all', 'group', 'carry']) {
    const own = groups.filter((group) => group.by === by);
    const adjusted = holmAdjusted(own.map(({ p }) => p));
    for (const [i, group] of own.entries()) group.p_adjusted = adjusted[i]!;
  }
  return groups;
}

function compareSet(rows: readonly PairedWalk[]): Omit<ComparedGroup, 'by' | 'value'> {
  const mean = (of: (row: PairedWalk) => number) => rows.reduce((sum, row) => sum + of(row), 0) / rows.length;
  const differences = Float64Array.from(rows, ({ a_m, b_m }) => b_m - a_m);
  const walkers = rows.map(({ walker }) => walker);
  const nWalkers = new Set(walkers).size;
  const [interval] =
    nWalkers < 2
      ? [null]
      : clusterBootstrap(
          walkers,
          1,
          (indices, out) => {
            let sum = 0;
            for (const i of indices) sum += differences[i]!;
            out[0] = sum / indices.length;
          },
          { seed: SEED },
        );
  const difference = mean(({ a_m, b_m }) => b_m - a_m);
  const a_m = mean((row) => row.a_m);
  return {
    walkers: nWalkers,
    walks: rows.length,
    a_m,
    b_m: mean((row) => row.b_m),
    difference_m: difference,
    low_m: interval?.low ?? Number.NaN,
    high_m: interval?.high ?? Number.NaN,
    difference_pct: (100 * difference) / a_m,
    wins: differences.filter((d) => d < 0).length,
    losses: differences.filter((d) => d > 0).length,
    p: signFlipTest(differences, walkers, { seed: SEED }).pValue,
    p_adjusted: Number.NaN,
  };
}

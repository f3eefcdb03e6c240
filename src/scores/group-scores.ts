import { clusterBootstrap } from '../stats/bootstrap.js';
import { median } from '../stats/quantile.js';
import { GROUP_STATISTICS, groupScoresTable, intervalColumn } from '../tables/score-schemas.js';
import type { AnyColumns } from '../tables/spec.js';

/** Any fixed number does: the same walks then give the same intervals. */
const SEED = 20260101;

/** A group's walks as rows of walk-scores. */
interface Group {
  by: string;
  value: string;
  rows: number[];
}

/**
 * Walk scores taken together: over all walks, by group, and by carry.
 *
 * A group's value is the median over its walks of each walk's statistic, so that no walk counts more for
 * having more checkpoints. Intervals: 95 %, cluster bootstrap over walkers (BCa, 2000 replicates); NaN with
 * fewer than two walkers, and hardly to be trusted with fewer than ten.
 *
 * @param scores - the columns of walk-scores.
 */
export function groupScores(scores: AnyColumns): AnyColumns {
  const walkers = scores.walker as readonly string[];
  const groups: Group[] = [
    { by: 'all', value: 'all', rows: [...walkers.keys()] },
    ...groupsBy('group', scores.group as readonly string[]),
    ...groupsBy('carry', scores.carry as readonly string[]),
  ];
  const columns: Record<string, number[]> = {};
  for (const name of Object.keys(groupScoresTable.columns)) columns[name] = [];
  for (const { rows } of groups)
    for (const statistic of GROUP_STATISTICS) {
      const values = scores[statistic] as Float64Array;
      const known = rows.filter((row) => Number.isFinite(values[row]!));
      const [value, low, high] = medianWithInterval(
        Float64Array.from(known, (row) => values[row]!),
        known.map((row) => walkers[row]!),
      );
      columns[statistic]!.push(value);
      columns[intervalColumn(statistic, 'low')]!.push(low);
      columns[intervalColumn(statistic, 'high')]!.push(high);
    }
  const out: AnyColumns = {};
  for (const [name, values] of Object.entries(columns)) out[name] = Float64Array.from(values);
  out.by = groups.map(({ by }) => by);
  out.value = groups.map(({ value }) => value);
  out.walkers = Int32Array.from(groups, ({ rows }) => new Set(rows.map((row) => walkers[row])).size);
  out.walks = Int32Array.from(groups, ({ rows }) => rows.length);
  return out;
}

function groupsBy(by: string, values: readonly string[]): Group[] {
  const names = [...new Set(values)].filter((name) => name !== '').sort();
  return names.map((value) => ({
    by,
    value,
    rows: [...values.keys()].filter((row) => values[row] === value),
  }));
}

function medianWithInterval(values: Float64Array, walkers: readonly string[]): [number, number, number] {
  if (values.length === 0) return [Number.NaN, Number.NaN, Number.NaN];
  if (new Set(walkers).size < 2) return [median(values), Number.NaN, Number.NaN];
  const [interval] = clusterBootstrap(
    walkers,
    1,
    (indices, out) => {
      out[0] = median(Float64Array.from(indices, (i) => values[i]!));
    },
    { seed: SEED },
  );
  return [interval!.estimate, interval!.low, interval!.high];
}

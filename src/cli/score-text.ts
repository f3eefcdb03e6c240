import type { Results } from '../pipeline/read-results.js';
import type { AnyColumns } from '../tables/spec.js';
import { fixed, printable, type TextColumn, textTable } from './text-table.js';

/** The scores of a results folder for people: groups with intervals, then every walk. */
export function scoreText(results: Results, what: 'groups' | 'all'): string {
  const { groupScores, walkScores, stepScores, record } = results;
  const parts = [
    `${printable(record.campaign.name)}, recipe ${record.recipe}: horizontal error at the scored passes, median over walks [95 % interval]\n`,
    groupTable(groupScores),
  ];
  if (what === 'all') {
    parts.push('\nWalks\n', walkTable(walkScores));
    if (stepScores) parts.push('\nSteps against the labelled ones\n', stepTable(stepScores));
  }
  return parts.join('');
}

function texts(columns: AnyColumns, name: string): readonly string[] {
  return columns[name] as readonly string[];
}

function numbers(columns: AnyColumns, name: string): readonly number[] {
  return [...(columns[name] as Float64Array)];
}

function textColumn(head: string, cells: readonly string[]): TextColumn {
  return { head, cells: cells.map(printable), isNumber: false };
}

function numberColumn(head: string, values: readonly number[], digits: number): TextColumn {
  return { head, cells: values.map((value) => fixed(value, digits)), isNumber: true };
}

function groupTable(columns: AnyColumns): string {
  const withInterval = (head: string, statistic: string, unit: string): TextColumn => {
    const low = numbers(columns, `${statistic}_low_${unit}`);
    const high = numbers(columns, `${statistic}_high_${unit}`);
    const cells = numbers(columns, `${statistic}_${unit}`).map((value, i) =>
      Number.isFinite(low[i])
        ? `${fixed(value, 2)} [${fixed(low[i]!, 2)}, ${fixed(high[i]!, 2)}]`
        : fixed(value, 2),
    );
    return { head: `${head} ${unit === 'pct' ? '%' : unit}`, cells, isNumber: true };
  };
  return textTable([
    textColumn('by', texts(columns, 'by')),
    textColumn('value', texts(columns, 'value')),
    numberColumn('walkers', numbers(columns, 'walkers'), 0),
    numberColumn('walks', numbers(columns, 'walks'), 0),
    withInterval('mean', 'mean', 'm'),
    withInterval('p75', 'p75', 'm'),
    withInterval('p95', 'p95', 'm'),
    withInterval('end', 'end_error', 'pct'),
    withInterval('step count', 'step_count_error', 'pct'),
  ]);
}

function walkTable(columns: AnyColumns): string {
  const number = (head: string, name: string, digits: number) =>
    numberColumn(head, numbers(columns, name), digits);
  return textTable([
    textColumn('walk', texts(columns, 'walk')),
    textColumn('walker', texts(columns, 'walker')),
    textColumn('group', texts(columns, 'group')),
    textColumn('carry', texts(columns, 'carry')),
    number('scored', 'scored', 0),
    number('mean m', 'mean_m', 2),
    number('median m', 'median_m', 2),
    number('p75 m', 'p75_m', 2),
    number('p95 m', 'p95_m', 2),
    number('max m', 'max_m', 2),
    number('end m', 'end_error_m', 2),
    number('end %', 'end_error_pct', 2),
    number('travelled m', 'travelled_m', 1),
    number('steps', 'steps', 0),
    number('count %', 'step_count_error_pct', 2),
  ]);
}

function stepTable(columns: AnyColumns): string {
  const number = (head: string, name: string, digits: number) =>
    numberColumn(head, numbers(columns, name), digits);
  return textTable([
    textColumn('walk', texts(columns, 'walk')),
    number('found', 'true_positives', 0),
    number('false', 'false_positives', 0),
    number('missed', 'misses', 0),
    number('precision', 'precision', 4),
    number('recall', 'recall', 4),
    number('F1', 'f1', 4),
    number('count %', 'count_error_pct', 2),
    number('lag s', 'lag_s', 3),
    number('timing s', 'timing_rmse_s', 3),
  ]);
}

import type { Walk, Walker } from '../campaign/types.js';
import type { Checkpoints, Steps } from '../tables/schemas.js';
import { walkScoresTable } from '../tables/score-schemas.js';
import { type AnyColumns, defineTable, type TableSpec, utf8 } from '../tables/spec.js';
import { errorStatistics } from './error-statistics.js';
import type { StepAgreement } from './step-agreement.js';

/** What scoring needs of one walk. */
export interface ScoredWalk {
  walk: Walk;
  walker: Walker;
  steps: Steps;
  /** Null where the walk could not be scored. */
  checkpoints: Checkpoints | null;
  /** Against labelled steps; null where there are none. */
  agreement: StepAgreement | null;
}

/** One row a walk, in the order given, with the campaign's own columns of walks.csv and walkers.csv at the end. */
export function walkScores(walks: readonly ScoredWalk[]): { spec: TableSpec; columns: AnyColumns } {
  const rows = walks.map(({ walk, walker, steps, checkpoints, agreement }) => ({
    walk: walk.walk,
    walker: walk.walker,
    group: walker.group,
    carry: walk.carry ?? '',
    ...errorStatistics(checkpoints),
    steps: steps.step.length,
    step_count_error_pct: countErrorPct(walk, steps, agreement),
  }));
  const columns: AnyColumns = {};
  for (const [name, { type }] of Object.entries(walkScoresTable.columns)) {
    const values = rows.map((row) => row[name as keyof (typeof rows)[number]]);
    if (type === 'utf8') columns[name] = values as string[];
    else
      columns[name] =
        type === 'i32' ? Int32Array.from(values as number[]) : Float64Array.from(values as number[]);
  }
  const own = ownColumns(walks);
  const ownSpecs = Object.fromEntries(own.map(({ name, about }) => [name, utf8(about)]));
  for (const { name, values } of own) columns[name] = values;
  return { spec: defineTable('walk-scores', { ...walkScoresTable.columns, ...ownSpecs }), columns };
}

function countErrorPct(walk: Walk, steps: Steps, agreement: StepAgreement | null): number {
  if (walk.steps !== null && walk.steps > 0) return (100 * (steps.step.length - walk.steps)) / walk.steps;
  return agreement ? agreement.count_error_pct : Number.NaN;
}

/** Columns that only this campaign has; a name that is taken gets `walk_` or `walker_` before it. */
function ownColumns(walks: readonly ScoredWalk[]): { name: string; about: string; values: string[] }[] {
  const taken = new Set(Object.keys(walkScoresTable.columns));
  const out: { name: string; about: string; values: string[] }[] = [];
  const add = (
    prefix: string,
    file: string,
    rowOf: (walk: ScoredWalk) => Readonly<Record<string, string>>,
  ) => {
    const names = new Set(walks.flatMap((walk) => Object.keys(rowOf(walk))));
    for (const own of names) {
      let name = own;
      while (taken.has(name)) name = `${prefix}_${name}`;
      taken.add(name);
      out.push({ name, about: `${own} of ${file}`, values: walks.map((walk) => rowOf(walk)[own] ?? '') });
    }
  };
  add('walk', 'walks.csv', ({ walk }) => walk.extra);
  add('walker', 'walkers.csv', ({ walker }) => walker.extra);
  return out;
}

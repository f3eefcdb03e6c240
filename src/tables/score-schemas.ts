import { type ColumnSpec, type Columns, defineTable, f64, i32, utf8 } from './spec.js';

/** Errors of one walk over its scored passes; the campaign's own columns follow. */
export const walkScoresTable = defineTable('walk-scores', {
  walk: utf8('name of the walk'),
  walker: utf8('who walked'),
  group: utf8("the walker's user group"),
  carry: utf8('how the phone was carried; empty where the campaign does not say'),
  scored: i32('scored passes'),
  mean_m: f64('m', 'mean of the horizontal error over the scored passes'),
  median_m: f64('m', 'median of it'),
  rmse_m: f64('m', 'root mean square of it'),
  p75_m: f64('m', '75th percentile of it, type 7 (linear between order statistics)'),
  p90_m: f64('m', '90th percentile, type 7'),
  p95_m: f64('m', '95th percentile, type 7'),
  max_m: f64('m', 'largest error'),
  end_error_m: f64('m', 'error at the last scored pass'),
  end_error_pct: f64(
    'pct',
    'error at the last scored pass, as a percentage of the true distance travelled to it',
  ),
  travelled_m: f64('m', 'true distance to the last scored pass, checkpoint to checkpoint'),
  steps: i32('detected steps'),
  step_count_error_pct: f64(
    'pct',
    "100 (detected - true) / true; true from walks.csv's steps, else from the labelled steps and then within their span",
  ),
});

/** The statistics of {@link walkScoresTable} that groups are compared by. */
export const GROUP_STATISTICS = [
  'mean_m',
  'median_m',
  'rmse_m',
  'p75_m',
  'p90_m',
  'p95_m',
  'max_m',
  'end_error_m',
  'end_error_pct',
  'step_count_error_pct',
] as const;

export type GroupStatistic = (typeof GROUP_STATISTICS)[number];

/** A statistic's interval column: its name with `low` or `high` before the unit. */
export function intervalColumn(statistic: GroupStatistic, end: 'low' | 'high'): string {
  return statistic.replace(/_(m|pct)$/, `_${end}_$1`);
}

/** Walks taken together by one column: the median over walks of each statistic, with a 95 % interval. */
export const groupScoresTable = defineTable('group-scores', {
  by: utf8('column grouped by; all for every walk'),
  value: utf8('its value'),
  walkers: i32('walkers in it'),
  walks: i32('walks in it'),
  ...Object.fromEntries(GROUP_STATISTICS.flatMap(statisticColumns)),
} as Record<string, ColumnSpec>);

function statisticColumns(statistic: GroupStatistic): [string, ColumnSpec][] {
  const { unit = '' } = walkScoresTable.columns[statistic];
  return [
    [statistic, f64(unit, `median over walks of ${statistic}`)],
    [
      intervalColumn(statistic, 'low'),
      f64(unit, 'lower end of its 95 % interval, walkers drawn with replacement'),
    ],
    [intervalColumn(statistic, 'high'), f64(unit, 'upper end; both NaN with fewer than two walkers')],
  ];
}

/** Detected against labelled steps. */
export const stepScoresTable = defineTable('step-scores', {
  walk: utf8('name of the walk'),
  true_positives: i32('detected steps paired with a labelled one'),
  false_positives: i32('detected steps without one, inside the labelled span'),
  misses: i32('labelled steps without a detected one'),
  precision: f64('', 'paired share of the detected'),
  recall: f64('', 'paired share of the labelled'),
  f1: f64('', 'harmonic mean of precision and recall'),
  count_error_pct: f64('pct', '100 (detected - labelled) / labelled inside the labelled span'),
  lag_s: f64('s', 'median time of the detected steps after the labelled ones, taken off before pairing'),
  timing_rmse_s: f64('s', 'root mean square of the paired time differences after the lag is taken off'),
});

export type WalkScores = Columns<typeof walkScoresTable>;
export type StepScores = Columns<typeof stepScoresTable>;

import { join } from 'node:path';
import type { Recipe } from '../campaign/recipe.js';
import { secondsSinceStart } from '../campaign/seconds-since-start.js';
import type { Campaign, TimeUnit, Walk } from '../campaign/types.js';
import { groupScores } from '../scores/group-scores.js';
import { stepAgreement } from '../scores/step-agreement.js';
import { type ScoredWalk, walkScores } from '../scores/walk-scores.js';
import type { AnyStage } from '../stages/stage.js';
import { buildTable } from '../tables/build.js';
import { hashOfValue, madeTheSame, methodMetadata, provenanceMetadata } from '../tables/provenance.js';
import { columnsOf, readStoredIfSound, type StoredTable } from '../tables/read.js';
import { removeTable } from '../tables/remove.js';
import { checkpointsTable, stepsTable } from '../tables/schemas.js';
import { groupScoresTable, stepScoresTable } from '../tables/score-schemas.js';
import type { AnyColumns, TableSpec } from '../tables/spec.js';
import { writeTable } from '../tables/write.js';
import { tablePath } from './on-hand.js';
import { STAGES } from './stages.js';

/** Raise when the same tables may give other scores. */
const SCORES_VERSION = 1;

/**
 * Scores what stands in a results folder and writes `walk-scores`, `group-scores` and, where steps are
 * labelled, `step-scores`; walks in the campaign's order, whoever ran them when.
 *
 * Only tables of this recipe and version count: those of walks that were not run now may be of another run.
 *
 * @param current - walks that were run just now, whose tables need no look at what made them.
 */
export function scoreResults(
  campaign: Campaign,
  recipe: Recipe,
  resultsDir: string,
  current: ReadonlySet<string>,
): void {
  const tableOf = (walk: Walk, name: string) =>
    current.has(walk.walk)
      ? readStoredIfSound(tablePath(resultsDir, walk.walk, name))
      : tableOfRecipe(recipe, resultsDir, walk, name);
  const inputs: Record<string, string> = {};
  const walks: ScoredWalk[] = [];
  for (const walk of campaign.walks) {
    const steps = tableOf(walk, 'steps');
    if (!steps) continue;
    const checkpoints = tableOf(walk, 'checkpoints');
    const walker = campaign.walkers.find((candidate) => candidate.walker === walk.walker)!;
    inputs[`${walk.walk}/steps`] = steps.sha256;
    if (checkpoints) inputs[`${walk.walk}/checkpoints`] = checkpoints.sha256;
    const { line: _, ...row } = walk;
    inputs[`${walk.walk}/campaign`] = hashOfValue({ row, walker });
    const stepColumns = columnsOf(steps.table, stepsTable, steps.path);
    walks.push({
      walk,
      walker,
      steps: stepColumns,
      checkpoints: checkpoints ? columnsOf(checkpoints.table, checkpointsTable, checkpoints.path) : null,
      agreement: agreementOf(campaign, resultsDir, walk, stepColumns.t_s, inputs),
    });
  }
  const write = (spec: TableSpec, columns: () => AnyColumns) => {
    const path = join(resultsDir, `${spec.name}.arrow`);
    const metadata = provenanceMetadata({
      stage: spec.name,
      stageVersion: SCORES_VERSION,
      method: 'scores',
      settings: {
        quantiles: 'type 7',
        interval: '95 % BCa, cluster bootstrap over walkers, 2000 replicates',
      },
      inputs,
    });
    const stored = readStoredIfSound(path);
    if (!stored || !madeTheSame(stored.metadata, metadata))
      writeTable(path, buildTable(spec, columns(), metadata));
  };
  const scores = walkScores(walks);
  write(scores.spec, () => scores.columns);
  write(groupScoresTable, () => groupScores(scores.columns));
  const labelled = walks.filter((walk) => walk.agreement !== null);
  if (labelled.length > 0) write(stepScoresTable, () => stepScoreColumns(labelled));
  else removeTable(join(resultsDir, 'step-scores.arrow'));
}

/** A walk's table, unless it or a table it may come from was made by another recipe or version. */
function tableOfRecipe(recipe: Recipe, resultsDir: string, walk: Walk, name: string): StoredTable | null {
  const last = STAGES.findIndex((stage) => stage.name === name);
  for (const stage of STAGES.slice(0, last)) {
    const before = readStoredIfSound(tablePath(resultsDir, walk.walk, stage.name));
    if (before && !isOfRecipe(recipe, stage, before)) return null;
  }
  const stored = readStoredIfSound(tablePath(resultsDir, walk.walk, name));
  return stored && isOfRecipe(recipe, STAGES[last]!, stored) ? stored : null;
}

function isOfRecipe(recipe: Recipe, stage: AnyStage, stored: StoredTable): boolean {
  const { method, settings } = recipe.stages[stage.name]!;
  const stageVersion = stage.methods[method]!.version;
  return madeTheSame(stored.metadata, methodMetadata({ stage: stage.name, stageVersion, method, settings }));
}

function agreementOf(
  campaign: Campaign,
  resultsDir: string,
  walk: Walk,
  detected: Float64Array,
  inputs: Record<string, string>,
) {
  const labels = campaign.stepTruth?.filter((instant) => instant.walk === walk.walk) ?? [];
  if (labels.length === 0) return null;
  const readings = readStoredIfSound(tablePath(resultsDir, walk.walk, 'readings-accel'));
  if (!readings) return null;
  const t0 = { value: readings.metadata.t0 ?? '', unit: (readings.metadata.t0_unit ?? 's') as TimeUnit };
  const labelled = Float64Array.from(labels, ({ time }) =>
    secondsSinceStart(time, campaign.truthTime, t0),
  ).sort();
  inputs[`${walk.walk}/step-truth`] = hashOfValue([...labelled]);
  return stepAgreement(detected, labelled);
}

function stepScoreColumns(walks: readonly ScoredWalk[]): AnyColumns {
  const columns: AnyColumns = { walk: walks.map(({ walk }) => walk.walk) };
  for (const [name, { type }] of Object.entries(stepScoresTable.columns)) {
    if (name === 'walk') continue;
    const values = walks.map(
      ({ agreement }) => agreement![name as keyof NonNullable<ScoredWalk['agreement']>],
    );
    columns[name] = type === 'i32' ? Int32Array.from(values) : Float64Array.from(values);
  }
  return columns;
}

import type { WalkContext } from '../campaign/context.js';
import { walkContext } from '../campaign/walk-context.js';
import { LeftOut } from '../stages/left-out.js';
import type { AnyStage } from '../stages/stage.js';
import { removeTable } from '../tables/remove.js';
import type { Findings } from '../tables/schemas.js';
import { importReadings, READINGS_TABLES } from './import-readings.js';
import { type OnHand, tablePath } from './on-hand.js';
import { problemOf, type WalkJob, type WalkOutcome } from './outcome.js';
import { keptTable, makeTable, stageTask, taskMetadata } from './run-stage.js';
import { STAGES } from './stages.js';

/** Why a sensor's readings are not there. */
const NO_READINGS: Readonly<Record<string, string>> = {
  'readings-accel': 'the log has no accelerometer readings',
  'readings-gyro': 'the log has no gyroscope readings',
  'readings-mag': 'the log has no magnetometer readings',
  'readings-baro': 'the log has no barometer readings',
};

/**
 * Takes one walk through its stages, writing each one's table.
 *
 * Never throws: what goes wrong stands in the outcome, so that other walks go on. A table of the walk
 * that no longer follows from log, recipe and campaign is removed.
 */
export async function runWalk(job: WalkJob): Promise<WalkOutcome> {
  const outcome: WalkOutcome = { walk: job.walk, made: [], kept: [], leftOut: [], problem: null, fails: [] };
  const pathOf = (table: string) => tablePath(job.resultsDir, job.walk, table);
  let onHand: Map<string, OnHand>;
  let context: WalkContext;
  try {
    const walk = job.campaign.walks[0]!;
    const imported = await importReadings(job.campaign, walk, job.resultsDir, job.again);
    onHand = imported.tables;
    outcome.made.push(...imported.made);
    outcome.kept.push(...imported.kept);
    context = walkContext(job.campaign, walk, imported.span);
  } catch (error) {
    outcome.problem = problemOf(error, 'readings');
    for (const spec of Object.values(READINGS_TABLES)) removeTable(pathOf(spec.name));
    for (const stage of STAGES) removeTable(pathOf(stage.name));
    return outcome;
  }
  const leftOut = new Map(Object.entries(NO_READINGS));
  const last = job.upto === null ? STAGES.length - 1 : STAGES.findIndex((stage) => stage.name === job.upto);
  for (const [i, stage] of STAGES.entries()) {
    try {
      if (outcome.problem) throw new LeftOut(`${outcome.problem.stage} failed`);
      runOne(stage, i <= last, { job, context, onHand, leftOut, outcome });
    } catch (error) {
      removeTable(pathOf(stage.name));
      if (!(error instanceof LeftOut)) outcome.problem = problemOf(error, stage.name);
      else if (i <= last && !outcome.problem)
        outcome.leftOut.push({ stage: stage.name, reason: error.message });
      leftOut.set(stage.name, error instanceof LeftOut ? error.message : `${stage.name} failed`);
    }
  }
  const findings = onHand.get('findings')?.columns() as Findings | undefined;
  findings?.severity.forEach((severity, i) => {
    if (severity === 'fail') outcome.fails.push(findings.message[i]!);
  });
  if (!onHand.has('readings-accel') && !outcome.problem)
    outcome.problem = {
      kind: 'input',
      stage: 'readings',
      message: `${NO_READINGS['readings-accel']}: no step can be found; record them, or mend the layout`,
      details: '',
    };
  return outcome;
}

interface Walking {
  job: WalkJob;
  context: WalkContext;
  onHand: Map<string, OnHand>;
  leftOut: ReadonlyMap<string, string>;
  outcome: WalkOutcome;
}

/** Keeps or makes one stage's table; past the last stage asked for, a table that no longer holds is removed. */
function runOne(stage: AnyStage, wanted: boolean, walking: Walking): void {
  const { job, context, onHand, leftOut, outcome } = walking;
  const path = tablePath(job.resultsDir, job.walk, stage.name);
  const task = stageTask(stage, job.recipe.stages[stage.name]!, onHand, leftOut, context, path);
  const metadata = taskMetadata(task);
  const kept = job.again && wanted ? null : keptTable(task, metadata);
  if (kept) {
    onHand.set(stage.name, kept);
    if (wanted) outcome.kept.push(stage.name);
  } else if (wanted) {
    onHand.set(stage.name, makeTable(task, metadata));
    outcome.made.push(stage.name);
  } else removeTable(path);
}

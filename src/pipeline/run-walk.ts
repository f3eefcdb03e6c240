import { existsSync } from 'node:fs';
import type { WalkContext } from '../campaign/context.js';
import { walkContext } from '../campaign/walk-context.js';
import { LeftOut } from '../stages/left-out.js';
import type { AnyStage } from '../stages/stage.js';
import { removeTable } from '../tables/remove.js';
import type { Findings } from '../tables/schemas.js';
import { importReadings, keptReadings, READINGS_TABLES } from './import-readings.js';
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
  return (await walkThrough(job, false))!;
}

/**
 * {@link runWalk} for a walk of which every table stands already as it would be made; null, and nothing done, where
 * any is not.
 */
export async function keptWalk(job: WalkJob): Promise<WalkOutcome | null> {
  return job.again ? null : await walkThrough(job, true);
}

/** Runs a walk, or only looks whether there is anything to run. */
async function walkThrough(job: WalkJob, lookOnly: boolean): Promise<WalkOutcome | null> {
  const outcome: WalkOutcome = { walk: job.walk, made: [], kept: [], leftOut: [], problem: null, fails: [] };
  const pathOf = (table: string) => tablePath(job.resultsDir, job.walk, table);
  let onHand: Map<string, OnHand>;
  let context: WalkContext;
  try {
    const walk = job.campaign.walks[0]!;
    const imported = lookOnly
      ? await keptReadings(job.campaign, walk, job.resultsDir)
      : await importReadings(job.campaign, walk, job.resultsDir, job.again);
    if (!imported) return null;
    onHand = imported.tables;
    outcome.made.push(...imported.made);
    outcome.kept.push(...imported.kept);
    context = walkContext(job.campaign, walk, imported.span);
  } catch (error) {
    if (lookOnly) return null;
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
      if (!runOne(stage, i <= last, { job, context, onHand, leftOut, outcome, lookOnly })) return null;
    } catch (error) {
      if (lookOnly && !(error instanceof LeftOut && !existsSync(pathOf(stage.name)))) return null;
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
  lookOnly: boolean;
}

/**
 * Keeps or makes one stage's table; past the last stage asked for, a table that no longer holds is removed.
 *
 * @returns false where there is something to do and it was only to be looked.
 */
function runOne(stage: AnyStage, wanted: boolean, walking: Walking): boolean {
  const { job, context, onHand, leftOut, outcome, lookOnly } = walking;
  const path = tablePath(job.resultsDir, job.walk, stage.name);
  const task = stageTask(stage, job.recipe.stages[stage.name]!, onHand, leftOut, context, path);
  const metadata = taskMetadata(task);
  const kept = job.again && wanted ? null : keptTable(task, metadata);
  if (kept) {
    onHand.set(stage.name, kept);
    if (wanted) outcome.kept.push(stage.name);
  } else if (lookOnly) return !wanted && !existsSync(path);
  else if (wanted) {
    onHand.set(stage.name, makeTable(task, metadata));
    outcome.made.push(stage.name);
  } else removeTable(path);
  return true;
}

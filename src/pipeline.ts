import { availableParallelism } from 'node:os';
import { join, relative, resolve } from 'node:path';
import { findRecipe } from './campaign/find-recipe.js';
import { didYouMean, listNames } from './campaign/nearest-name.js';
import { readCampaign } from './campaign/read-campaign.js';
import { defaultRecipe, type Recipe, readRecipe, renderRecipe } from './campaign/recipe.js';
import { type RunRecord, readRunRecord, type WalkRecord, writeRunRecord } from './campaign/run-record.js';
import type { Campaign } from './campaign/types.js';
import { InputError } from './errors.js';
import { type WalkOutcome, walkJob } from './pipeline/outcome.js';
import { runWalks } from './pipeline/run-walks.js';
import { scoreResults } from './pipeline/score-results.js';
import { STAGE_NAMES, STAGES } from './pipeline/stages.js';
import { removeTable } from './tables/remove.js';
import { writeText } from './tables/write.js';
import { VERSION } from './version.js';

export interface RunOptions {
  /** A recipe file, or the name of one in the campaign's `recipes` folder; default: every stage's own default. */
  recipe?: string | undefined;
  /** Results folder; default `<campaign>/results/<recipe>`. */
  out?: string | undefined;
  /** Walks to run; default all. */
  walks?: readonly string[] | undefined;
  /** Last stage to run; default all. */
  upto?: string | undefined;
  /** Walks at a time; default one a core. */
  jobs?: number | undefined;
  /** Run stages anew even where nothing has changed. */
  again?: boolean | undefined;
  /** Told of each walk as it ends. */
  onWalk?: ((outcome: WalkOutcome, done: number, total: number) => void) | undefined;
}

export interface RunResult {
  campaign: Campaign;
  recipe: Recipe;
  resultsDir: string;
  /** In the campaign's order. */
  outcomes: WalkOutcome[];
}

/**
 * Takes a campaign's walks through the stages of a recipe, writes every table, and scores them.
 *
 * The whole plan is checked before anything runs. A walk that goes wrong is told in its outcome; the
 * others are not touched by it.
 *
 * @throws InputError, InputErrors where the campaign, the recipe or an option cannot be used, or the
 *   results folder cannot be written.
 */
export async function runCampaign(campaignDir: string, options: RunOptions = {}): Promise<RunResult> {
  const campaign = readCampaign(campaignDir);
  const recipe = recipeOf(campaign, options.recipe);
  const chosen = chosenWalks(campaign, options.walks ?? []);
  const upto = checkedStage(options.upto);
  const jobs = checkedJobs(options.jobs);
  const resultsDir = resolve(options.out ?? join(campaign.dir, 'results', recipe.name));
  writeRecipe(resultsDir, recipe);
  const settings = { recipe, resultsDir, upto, again: options.again ?? false };
  let done = 0;
  const outcomes = await runWalks(
    chosen.map((walk) => walkJob(campaign, walk, settings)),
    jobs,
    (outcome) => options.onWalk?.(outcome, ++done, chosen.length),
  );
  for (const outcome of outcomes) tellFault(resultsDir, outcome);
  scoreResults(campaign, recipe, resultsDir, new Set(chosen));
  writeRunRecord(resultsDir, recordOf(campaign, recipe, resultsDir, outcomes));
  return { campaign, recipe, resultsDir, outcomes };
}

/** The recipe that an option names, or the default one. */
export function recipeOf(campaign: Campaign, nameOrPath: string | undefined): Recipe {
  return nameOrPath === undefined
    ? defaultRecipe(STAGES)
    : readRecipe(findRecipe(campaign.dir, nameOrPath), STAGES);
}

/** Walks by name in the campaign's order; all of them where none is named. */
export function chosenWalks(campaign: Campaign, named: readonly string[]): string[] {
  const all = campaign.walks.map(({ walk }) => walk);
  for (const name of named)
    if (!all.includes(name))
      throw new InputError(
        'no-walk',
        `--walk ${name}: not in walks.csv, which has ${listNames(all)}.${didYouMean(name, all)}`,
      );
  return named.length === 0 ? all : all.filter((walk) => named.includes(walk));
}

function checkedStage(name: string | undefined): string | null {
  if (name === undefined) return null;
  if (STAGE_NAMES.includes(name)) return name;
  throw new InputError(
    'no-stage',
    `--upto ${name}: no such stage; must be one of ${STAGE_NAMES.join(', ')}.${didYouMean(name, STAGE_NAMES)}`,
  );
}

function checkedJobs(jobs: number | undefined): number {
  if (jobs === undefined) return availableParallelism();
  if (Number.isInteger(jobs) && jobs >= 1) return jobs;
  throw new InputError('bad-jobs', `--jobs must be a whole number from 1, got ${jobs}`);
}

/** The recipe as it is run, all settings in; written first, so that a folder that cannot be written stops the run here. */
function writeRecipe(resultsDir: string, recipe: Recipe): void {
  try {
    writeText(join(resultsDir, 'recipe.yaml'), renderRecipe(recipe));
  } catch (error) {
    const { code } = error as NodeJS.ErrnoException;
    if (code === undefined) throw error;
    throw new InputError(
      'cannot-write',
      `${resultsDir}: results cannot be written here (${code}); name another folder with --out`,
      { cause: error },
    );
  }
}

/** Where the details of a fault of ours in a walk are written. */
export function faultFile(resultsDir: string, walk: string): string {
  return join(resultsDir, walk, 'fault.txt');
}

/** Writes down what only we can mend; a walk without a fault keeps no such file. */
function tellFault(resultsDir: string, { walk, problem }: WalkOutcome): void {
  const file = faultFile(resultsDir, walk);
  if (problem?.kind === 'fault')
    writeText(
      file,
      `treadline ${VERSION}, node ${process.version}\n${walk}: ${problem.stage}\n${problem.details}\n`,
    );
  else removeTable(file);
}

/** The folder's record with this run's walks in it; others stay as they were under the same recipe name. */
function recordOf(
  campaign: Campaign,
  recipe: Recipe,
  resultsDir: string,
  outcomes: readonly WalkOutcome[],
): RunRecord {
  const before = readRunRecord(resultsDir)?.walks ?? {};
  const now = new Map(
    outcomes.map(({ walk, leftOut, problem }): [string, WalkRecord] => [
      walk,
      {
        left_out: Object.fromEntries(leftOut.map(({ stage, reason }) => [stage, reason])),
        problem: problem?.message ?? null,
      },
    ]),
  );
  const walks: Record<string, WalkRecord> = {};
  for (const { walk } of campaign.walks) {
    const record = now.get(walk) ?? before[walk];
    if (record) walks[walk] = record;
  }
  return {
    campaign: { dir: relative(resultsDir, campaign.dir), name: campaign.name },
    recipe: recipe.name,
    walks,
  };
}

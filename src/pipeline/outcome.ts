import type { Recipe } from '../campaign/recipe.js';
import type { Campaign } from '../campaign/types.js';
import { InputError, messageOf } from '../errors.js';

/** One walk to run: plain data, so that it can be sent to a worker thread. */
export interface WalkJob {
  /** The campaign with only this walk's rows in it. */
  campaign: Campaign;
  walk: string;
  recipe: Recipe;
  resultsDir: string;
  /** Last stage to run; null: all. */
  upto: string | null;
  /** Run stages anew even where nothing has changed. */
  again: boolean;
}

/** What became of one walk. */
export interface WalkOutcome {
  walk: string;
  /** Tables written by this run, and those found up to date. */
  made: string[];
  kept: string[];
  /** Stages that had nothing to work on. */
  leftOut: { stage: string; reason: string }[];
  /** Why the walk could not be processed to its end; null where it was. */
  problem: WalkProblem | null;
  /** Messages of its `fail` findings. */
  fails: string[];
}

export interface WalkProblem {
  /** `input`: a mistake in what the user gave; `fault`: ours. */
  kind: 'input' | 'fault';
  /** The stage that failed; `readings` for the log itself. */
  stage: string;
  message: string;
  /** The stack, for the file that a fault's details go to. */
  details: string;
}

/** Sorts a thrown thing into the user's mistakes (also a disk that is full or locked) and our faults. */
export function problemOf(error: unknown, stage: string): WalkProblem {
  const isSystem = error instanceof Error && 'syscall' in error;
  return {
    kind: error instanceof InputError || isSystem ? 'input' : 'fault',
    stage,
    message: messageOf(error),
    details: error instanceof Error ? (error.stack ?? error.message) : String(error),
  };
}

/** A walk's job: the campaign narrowed to what concerns the walk. */
export function walkJob(
  campaign: Campaign,
  walk: string,
  options: Pick<WalkJob, 'recipe' | 'resultsDir' | 'upto' | 'again'>,
): WalkJob {
  const ofWalk = <T extends { walk: string }>(rows: readonly T[] | null) =>
    rows?.filter((row) => row.walk === walk) ?? null;
  return {
    campaign: {
      ...campaign,
      walks: campaign.walks.filter((row) => row.walk === walk),
      passes: ofWalk(campaign.passes),
      stepTruth: ofWalk(campaign.stepTruth),
    },
    walk,
    ...options,
  };
}

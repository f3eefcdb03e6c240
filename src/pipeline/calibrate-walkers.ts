import { join } from 'node:path';
import { fitStepConstants, type MeasuredWalk, type StepConstants } from '../calibration/step-constants.js';
import { writeCalibrationPart } from '../campaign/write-calibration.js';
import { type RunOptions, runCampaign } from '../pipeline.js';
import { readColumns } from '../tables/read.js';
import { stepsTable } from '../tables/schemas.js';

export interface WalkersFit extends StepConstants {
  /** Files written, one a walker. */
  paths: string[];
  /** The walks that it rests on, with the constant that each would have by itself. */
  walks: { walk: string; walker: string; distance_m: number; constant: number }[];
}

/**
 * Fits each walker's constant of the `weinberg` model from walks whose length walks.csv gives (`distance_m`), and
 * writes `calibrations/walker-<walker>.yaml`, which `strides` uses from then on.
 *
 * @throws InputError as {@link runCampaign} and {@link fitStepConstants}.
 */
export async function calibrateWalkers(
  campaignDir: string,
  options: Pick<RunOptions, 'recipe' | 'walks' | 'jobs' | 'onWalk'> = {},
): Promise<WalkersFit> {
  const { campaign, resultsDir, outcomes } = await runCampaign(campaignDir, {
    ...options,
    out: join(campaignDir, 'results', 'calibration'),
    upto: 'steps',
  });
  const measured: (MeasuredWalk & { walk: string })[] = [];
  for (const { walk, problem } of outcomes) {
    const row = campaign.walks.find((candidate) => candidate.walk === walk)!;
    if (problem || row.distanceM === null) continue;
    const { strength_mps2 } = readColumns(join(resultsDir, walk, 'steps.arrow'), stepsTable);
    const unit_m = strength_mps2.reduce((sum, strength) => sum + Math.max(0, strength) ** 0.25, 0);
    const { group } = campaign.walkers.find(({ walker }) => walker === row.walker)!;
    measured.push({ walk, walker: row.walker, group, distance_m: row.distanceM, unit_m });
  }
  const fit = fitStepConstants(measured, campaign.walkers);
  const paths = [...fit.walkers].map(([walker, { value, sd, from, walks }]) =>
    writeCalibrationPart(
      campaign.dir,
      'walker',
      walker,
      'step_constants',
      { weinberg: { value, sd, from } },
      { walks, between_walkers: fit.betweenWalkers, between_walks: fit.betweenWalks },
    ),
  );
  const walks = measured.map(({ walk, walker, distance_m, unit_m }) => ({
    walk,
    walker,
    distance_m,
    constant: distance_m / unit_m,
  }));
  return { ...fit, paths, walks };
}

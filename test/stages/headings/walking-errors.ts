import { join } from 'node:path';
import { readPathTruth } from '../../../src/campaign/path-truth.js';
import { runCampaign } from '../../../src/pipeline.js';
import { simulateCampaign } from '../../../src/simulate/simulate-campaign.js';
import { wrapToPi } from '../../../src/stats/circular.js';
import { readColumns } from '../../../src/tables/read.js';
import { headingsTable, stepsTable } from '../../../src/tables/schemas.js';
import { planOf } from '../../simulate/plan-file.js';
import { temporaryFolder } from '../../temporary-folder.js';

/** Walking-direction errors of one simulated walk's steps. */
export interface WalkingErrors {
  walk: string;
  carry: string;
  /** Size of the error, degrees. */
  errorsDeg: number[];
  /** Errors over their standard deviations. */
  ratios: number[];
  sources: string[];
}

/** Runs a plan's walks with a recipe's text, or the defaults, and holds each step's heading against the true course. */
export async function walkingErrors(planText: string, recipe?: string): Promise<WalkingErrors[]> {
  const dir = temporaryFolder();
  await simulateCampaign(planOf(planText), dir);
  const { campaign, resultsDir, outcomes } = await runCampaign(dir, { upto: 'headings', jobs: 1, recipe });
  const out: WalkingErrors[] = [];
  for (const { walk, carry } of campaign.walks) {
    const problem = outcomes.find((outcome) => outcome.walk === walk)?.problem;
    if (problem) throw new Error(`${walk}: ${problem.message}`);
    const steps = readColumns(join(resultsDir, walk, 'steps.arrow'), stepsTable);
    const headings = readColumns(join(resultsDir, walk, 'headings.arrow'), headingsTable);
    const truth = await readPathTruth(campaign.pathTruth.get(walk)!);
    const errors: WalkingErrors = { walk, carry: carry!, errorsDeg: [], ratios: [], sources: [] };
    for (let k = 0; k < steps.t_s.length; k++) {
      const [east, north] = displacement(truth, steps.start_s[k]!, steps.end_s[k]!);
      // Less than a quarter of a step is no walking: the sway before the first and after the last.
      if (Math.hypot(east, north) < 0.15) continue;
      const error = Math.abs(wrapToPi(headings.heading_rad[k]! - Math.atan2(east, north)));
      errors.errorsDeg.push((error * 180) / Math.PI);
      errors.ratios.push(error / headings.sd_rad[k]!);
      errors.sources.push(headings.source[k]!);
    }
    out.push(errors);
  }
  return out;
}

function displacement(
  truth: { t_s: Float64Array; east_m: Float64Array; north_m: Float64Array },
  from: number,
  to: number,
): [number, number] {
  const at = (column: Float64Array, t: number) => {
    let i = truth.t_s.findIndex((time) => time > t);
    if (i < 0) i = truth.t_s.length;
    const low = Math.max(0, i - 1);
    const high = Math.min(truth.t_s.length - 1, i);
    const width = truth.t_s[high]! - truth.t_s[low]!;
    const share = width > 0 ? (t - truth.t_s[low]!) / width : 0;
    return column[low]! + share * (column[high]! - column[low]!);
  };
  return [at(truth.east_m, to) - at(truth.east_m, from), at(truth.north_m, to) - at(truth.north_m, from)];
}

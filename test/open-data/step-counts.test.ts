import { join } from 'node:path';
import { describe, expect, test } from 'vitest';
import { runCampaign } from '../../src/pipeline.js';
import { mean } from '../../src/stats/summary.js';
import { readColumns } from '../../src/tables/read.js';
import { stepScoresTable, walkScoresTable } from '../../src/tables/score-schemas.js';
import { temporaryFolder } from '../temporary-folder.js';
import { openCampaign } from './open-campaign.js';

/** Runs the default recipe up to the steps and reads its scores. */
async function stepScores(campaign: string) {
  const out = temporaryFolder();
  const { outcomes } = await runCampaign(campaign, { out, upto: 'steps', jobs: 1 });
  return {
    outcomes,
    scores: readColumns(join(out, 'step-scores.arrow'), stepScoresTable),
    walks: readColumns(join(out, 'walk-scores.arrow'), walkScoresTable),
  };
}

// Source: the Oxford step counter recordings, foot switches (Salvi, Velardo, Brynes & Tarassenko, IEEE EMBC 2018).
const counted = openCampaign('counted-steps');
describe.skipIf(!counted)('counted steps, eight ways of carrying, accelerometer only', () => {
  test('counts and instants', async () => {
    const { outcomes, scores, walks } = await stepScores(counted!);
    expect(outcomes.filter(({ problem }) => problem)).toEqual([]);
    expect(walks.walk).toHaveLength(31);
    // Asked: 2.3 %, what a script of general-purpose filters gets being 2.24; 1.1 when this was written.
    expect(mean(walks.step_count_error_pct.map(Math.abs))).toBeLessThan(1.3);
    // Asked: 0.987; that script gets 0.982; 0.991 when this was written.
    expect(mean(scores.f1)).toBeGreaterThan(0.987);
  });
});

// Source: the WeAllWalk recordings, shoe-worn sensors (Flores & Manduchi, ASSETS 2016).
const pockets = openCampaign('pocket-groups');
describe.skipIf(!pockets)('three user groups, phone in a pocket, 25 Hz', () => {
  test('counts and instants within the labelled span', async () => {
    const { scores, walks } = await stepScores(pockets!);
    expect(scores.walk).toHaveLength(38);
    // Asked: 1.5 % over all, 2.0 % in every group; a script of general-purpose filters gets 2.55 and 3.5 %.
    expect(mean(scores.count_error_pct.map(Math.abs))).toBeLessThan(1.6);
    for (const group of ['sighted', 'long-cane', 'guide-dog']) {
      const errors = scores.count_error_pct.filter((_, i) => walks.group[i] === group);
      expect(mean(errors.map(Math.abs)), group).toBeLessThan(2);
    }
    // The clocks of two long-cane recordings drift apart by more than the window: their F1 is below 0.86 whoever detects.
    expect(mean(scores.f1)).toBeGreaterThan(0.965);
  });
});

import { fileURLToPath } from 'node:url';
import { expect, test } from 'vitest';
import { readCampaign } from '../../src/campaign/read-campaign.js';
import { readPlan } from '../../src/simulate/read-plan.js';
import { simulateCampaign } from '../../src/simulate/simulate-campaign.js';
import { emptyFolder } from './plan-file.js';

test('the demo plan makes a campaign that reads', async () => {
  const plan = readPlan(fileURLToPath(new URL('../../data-demo/plan.yaml', import.meta.url)));
  const dir = emptyFolder();
  const summary = await simulateCampaign(plan, dir);
  expect(summary).toMatchObject({ walkers: 6, walks: 12, checkpoints: 10 });
  const campaign = readCampaign(dir);
  expect(campaign.walks).toHaveLength(12);
  expect(new Set(campaign.walkers.map(({ group }) => group)).size).toBe(2);
  expect(campaign.passes!.length).toBeGreaterThan(80);
  for (const { distanceM } of campaign.walks) expect(distanceM).toBeGreaterThan(80);
});

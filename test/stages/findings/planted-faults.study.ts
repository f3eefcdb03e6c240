import { writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { expect, test } from 'vitest';
import { readCampaign } from '../../../src/campaign/read-campaign.js';
import { readLog } from '../../../src/campaign/read-log.js';
import { walkContext } from '../../../src/campaign/walk-context.js';
import { layoutOf, readingsInMemory } from '../../../src/pipeline/import-readings.js';
import { readPlan } from '../../../src/simulate/read-plan.js';
import { simulateCampaign } from '../../../src/simulate/simulate-campaign.js';
import type { FindingsInputs } from '../../../src/stages/findings/index.js';
import { temporaryFolder } from '../../temporary-folder.js';
import { alarms, copyOf, FAULTS, type Log } from './faults.js';

const PLAN = `name: many logs (invented)
seed: 31
grid: { origin: { lat_deg: 47, lon_deg: 8, height_m: 400 }, date: 2026-06-01 }
places: { A: [0, 0], B: [18, 0], C: [18, 12], D: [2, 16] }
groups:
  young: { age: [20, 35] }
  old: { age: [70, 82] }
  aid: { age: [65, 85], gait: aid }
  child: { age: [7, 12], gait: child }
  shuffling: { age: [65, 85], gait: shuffling }
walkers: [{ walker: a, group: young }, { walker: b, group: old }, { walker: c, group: aid }, { walker: d, group: child }, { walker: e, group: shuffling }]
devices:
  good: { class: good, rate_hz: 100, gzip: false }
  typical: { class: typical, shape: tagged, rate_hz: { accel: 100, gyro: 100, mag: 50 }, gzip: false }
routes: { way: { points: [A, B, C, D, A, B], initial_still_s: 3 } }
walks:
  - { walker: all, route: way, carry: [hand, swing, pocket, bag, chest], device: [good, typical], repeat: 2 }
`;

test('100 clean logs, and every fault planted in carried-in-the-hand ones', async () => {
  const folder = temporaryFolder();
  writeFileSync(join(folder, 'plan.yaml'), PLAN);
  const dir = join(folder, 'campaign');
  await simulateCampaign(readPlan(join(folder, 'plan.yaml')), dir);
  const campaign = readCampaign(dir);
  const logs: (Log & { carry: string | null })[] = [];
  for (const walk of campaign.walks) {
    const { tables, span } = readingsInMemory(await readLog(dir, walk, layoutOf(campaign, walk)));
    const inputs = Object.fromEntries([...tables].map(([name, table]) => [name, table.columns()]));
    logs.push({
      inputs: inputs as unknown as FindingsInputs,
      context: walkContext(campaign, walk, span),
      carry: walk.carry,
    });
  }
  const raised = logs.map(alarms);
  const alarmed = raised.filter((found) => found.length > 0);
  console.log(`clean: ${logs.length}, with an alarm: ${alarmed.length}`, alarmed.flat());
  let planted = 0;
  let found = 0;
  const held = logs.filter(({ carry }) => carry === 'hand');
  for (const [what, alarm, plant, walk = 0] of FAULTS) {
    // Faults of the axes want a phone that turns; all others any phone.
    const hosts = walk === 0 ? held : logs.filter(({ carry }) => carry === 'swing');
    let here = 0;
    for (const host of hosts.slice(0, 6)) {
      const log = copyOf(host);
      plant(log);
      planted++;
      if (alarms(log).some((raised) => new RegExp(`^${alarm}$`).test(raised))) here++;
      else console.log(what, alarms(log));
    }
    found += here;
    if (here < 6) console.log(`${what}: ${here} of 6`);
  }
  console.log(`planted: ${planted}, found: ${found}`);
  expect(logs).toHaveLength(100);
  expect(alarmed.length).toBeLessThanOrEqual(2);
  expect(found / planted).toBeGreaterThanOrEqual(0.98);
});

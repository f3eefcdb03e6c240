import { mkdtempSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { readCampaign } from '../../src/campaign/read-campaign.js';
import { readPlan } from '../../src/simulate/read-plan.js';
import { simulateCampaign } from '../../src/simulate/simulate-campaign.js';

/** A simulated walk of an hour at 100 Hz, accelerometer, gyroscope and magnetometer, as a campaign of one walk. */
const PLAN = `name: one hour (invented)
seed: 1
grid: { origin: { lat_deg: 52.1, lon_deg: 9.4, height_m: 95 }, date: 2026-03-14 }
groups: { g: { age: [30, 39] } }
walkers: [{ walker: a, group: g }]
devices: { phone: { class: typical, rate_hz: 100, gzip: false } }
routes: { long: { random: { legs: 330, leg_m: [10, 20], within: [0, 0, 120, 120] }, checkpoints: { every_m: 100 } } }
walks: [{ walker: a, route: long, carry: hand }]
`;

/** Makes it in a temporary folder. */
export async function hourCampaign() {
  const folder = mkdtempSync(join(tmpdir(), 'treadline-bench-'));
  writeFileSync(join(folder, 'plan.yaml'), PLAN);
  const dir = join(folder, 'campaign');
  const summary = await simulateCampaign(readPlan(join(folder, 'plan.yaml')), dir);
  return { folder, campaign: readCampaign(dir), readings: 3 * summary.rows, durationS: summary.durationS };
}

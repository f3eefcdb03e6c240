import { writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { readPlan } from '../src/simulate/read-plan.js';
import { simulateCampaign } from '../src/simulate/simulate-campaign.js';
import { temporaryFolder } from './temporary-folder.js';

/** Three short walks of two invented walkers: seconds of work, every table. */
const PLAN = `name: small trial (invented)
seed: 5
grid: { origin: { lat_deg: 52.1, lon_deg: 9.4, height_m: 95 }, date: 2026-03-14 }
places: { A: [0, 0], B: [14, 0], C: [14, 9] }
groups: { young: { age: [20, 29] }, old: { age: [70, 79] } }
walkers: [{ walker: kim, group: young }, { walker: lou, group: old }]
devices: { phone: { class: good, rate_hz: 50, gzip: false } }
routes: { way: { points: [A, B, C], initial_still_s: 2 } }
walks:
  - { walker: [kim, lou], route: way, carry: hand }
  - { walker: kim, route: way, carry: chest }
`;

/** Makes the small campaign in a folder of its own. */
export async function smallCampaign(edit: (plan: string) => string = (plan) => plan): Promise<string> {
  const folder = temporaryFolder();
  const plan = join(folder, 'plan.yaml');
  writeFileSync(plan, edit(PLAN));
  const dir = join(folder, 'campaign');
  await simulateCampaign(readPlan(plan), dir);
  return dir;
}

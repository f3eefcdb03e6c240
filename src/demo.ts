import { existsSync, readdirSync } from 'node:fs';
import { join } from 'node:path';
import { fileURLToPath } from 'node:url';
import { readCampaign } from './campaign/read-campaign.js';
import { InputError } from './errors.js';
import { type RunResult, runCampaign } from './pipeline.js';
import { readPlan } from './simulate/read-plan.js';
import { type SimulationSummary, simulateCampaign } from './simulate/simulate-campaign.js';

/** The demo's plan, in the package. */
export const DEMO_PLAN = fileURLToPath(new URL('../data-demo/plan.yaml', import.meta.url));

/**
 * Makes the demo campaign in a folder and runs the default recipe on it.
 *
 * @throws InputError `not-a-demo` where the folder holds something else: nothing of a user's is written over.
 */
export async function makeDemo(
  dir: string,
  onWalk: (walk: string, done: number, total: number) => void = () => {},
): Promise<{ simulated: SimulationSummary; run: RunResult }> {
  const plan = readPlan(DEMO_PLAN);
  if (existsSync(dir) && readdirSync(dir).length > 0 && campaignName(dir) !== plan.name)
    throw new InputError(
      'not-a-demo',
      `${dir}: holds something other than the demo; name a new or an empty folder`,
    );
  const simulated = await simulateCampaign(plan, dir);
  const run = await runCampaign(dir, {
    onWalk: ({ walk }, done, total) => onWalk(walk, done, total),
  });
  return { simulated, run };
}

/** Null where the folder is no readable campaign. */
function campaignName(dir: string): string | null {
  if (!existsSync(join(dir, 'campaign.yaml'))) return null;
  try {
    return readCampaign(dir).name;
  } catch (error) {
    if (error instanceof InputError) return null;
    throw error;
  }
}

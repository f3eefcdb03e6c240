import { existsSync, readdirSync } from 'node:fs';
import { join, parse } from 'node:path';
import { writeCampaignYaml, writeCsv } from '../campaign/write-campaign.js';
import { InputError } from '../errors.js';
import { writeText } from '../tables/write.js';
import { castOf, simulateWalks } from './cast.js';
import { passRows, type Row, walkColumns, walkRow, writeSurvey, writeWalkers } from './folder-tables.js';
import { layoutOf, writeLog } from './log-file.js';
import type { SimulationPlan } from './read-plan.js';
import { stepRows, writeTruth } from './truth-files.js';

/** What was made. */
export interface SimulationSummary {
  dir: string;
  walkers: number;
  walks: number;
  checkpoints: number;
  steps: number;
  /** Rows in all logs. */
  rows: number;
  distanceM: number;
  durationS: number;
}

/**
 * Makes a campaign with exact truth.
 *
 * Every walk, walker, device and sensor draws from a random stream of its own, so that adding one
 * leaves the others' bytes as they were. Truth times count from the walk's first reading, on the
 * phone's own clock, its drift included.
 *
 * @param dir - the campaign folder; files of the same names are replaced.
 * @throws InputError where the plan's routes or walks do not go together; `other-walks` where the folder holds truth
 *   of walks that the plan does not have: it would be taken for this campaign's.
 */
export async function simulateCampaign(plan: SimulationPlan, dir: string): Promise<SimulationSummary> {
  const cast = castOf(plan);
  refuseOtherWalks(
    dir,
    cast.walks.map(({ walk }) => walk),
  );
  const summary = {
    dir,
    walkers: cast.walkers.size,
    walks: cast.walks.length,
    steps: 0,
    rows: 0,
    distanceM: 0,
    durationS: 0,
  };
  const [stepTruth, passes, walks]: [Row[], Row[], Row[]] = [[], [], []];
  const columns = walkColumns(plan);
  for (const walk of simulateWalks(cast)) {
    const { route, model } = walk;
    const log = `logs/${walk.plan.walk}.csv${walk.device.plan.gzip ? '.gz' : ''}`;
    summary.rows += writeLog(join(dir, log), plan.seed, walk);
    writeTruth(dir, walk, cast.setting.place, plan.truth.rate_hz);
    const steps = stepRows(walk);
    stepTruth.push(...steps);
    passes.push(...passRows(plan, walk));
    walks.push(walkRow(walk, log, steps.length, columns));
    summary.steps += steps.length;
    summary.distanceM += route.still ? 0 : route.curve.lengthM;
    summary.durationS += model.timeline.durationS;
    // Lets a caller's timers and signals through between walks.
    await new Promise((resolve) => setImmediate(resolve));
  }
  const checkpoints = writeSurvey(plan, dir, [...cast.routes.values()]);
  writeCsv(join(dir, 'walks.csv'), columns, walks);
  writeCsv(join(dir, 'step-truth.csv'), ['walk', 't_s', 'foot', 'length_m', 'heading_deg'], stepTruth);
  if (checkpoints > 0)
    writeCsv(join(dir, 'passes.csv'), ['walk', 'checkpoint', 't_s', 'sigma_s', 'role', 'true_t_s'], passes);
  writeWalkers(dir, cast.walkers.values());
  if (plan.floorPlan) writeText(join(dir, 'floor-plan.geojson'), plan.floorPlan.text);
  writeCampaignYaml(dir, {
    name: plan.name,
    grid: plan.grid,
    truth_time: 'relative',
    layouts: Object.fromEntries([...cast.devices].map(([name, device]) => [name, layoutOf(device)])),
  } as Parameters<typeof writeCampaignYaml>[1]);
  return { ...summary, checkpoints };
}

/** Truth files of other walks would make the campaign unreadable, and they are not ours to remove. */
function refuseOtherWalks(dir: string, walks: readonly string[]): void {
  for (const folder of ['attitude-truth', 'path-truth']) {
    const files = existsSync(join(dir, folder)) ? readdirSync(join(dir, folder)) : [];
    const other = files.find((file) => !file.startsWith('.') && !walks.includes(parse(file).name));
    if (other !== undefined)
      throw new InputError(
        'other-walks',
        `${join(dir, folder, other)}: is of a walk that this plan does not have; name a new folder`,
      );
  }
}

import { join } from 'node:path';
import type { Grid } from '../campaign/types.js';
import { writeCampaignYaml, writeCsv } from '../campaign/write-campaign.js';
import { randomStream } from '../stats/random.js';
import { writeText } from '../tables/write.js';
import { expandWalks } from './expand-walks.js';
import { layoutOf, writeLog } from './log-file.js';
import { placeModel } from './magnetic-map.js';
import type { SimulationPlan } from './read-plan.js';
import { makeRoute, PointNames, type Route, type RouteCheckpoint } from './routes.js';
import { deviceModel } from './sensor-errors.js';
import { type SimulatedWalk, simulateWalk, type WalkSetting } from './simulate-walk.js';
import { passInstant, stepRows, truthTime, writeTruth } from './truth-files.js';
import { drawWalker } from './walker-model.js';

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
 * @throws InputError where the plan's routes or walks do not go together.
 */
export async function simulateCampaign(plan: SimulationPlan, dir: string): Promise<SimulationSummary> {
  const walks = expandWalks(plan);
  const grid = gridOf(plan);
  const setting: WalkSetting = {
    seed: plan.seed,
    place: placeModel(grid, plan.magnetic),
    heightM: grid.origin?.heightM ?? 0,
  };
  const walkers = new Map(
    plan.walkers.map((walker) => [walker.walker, drawWalker(plan.seed, walker, plan.groups[walker.group]!)]),
  );
  const devices = new Map(
    Object.entries(plan.devices).map(([name, device]) => [name, deviceModel(name, device)]),
  );
  const names = new PointNames(plan.places);
  const routes = new Map<string, Route>();
  for (const { route, reverse } of walks) {
    const key = `${route} ${reverse}`;
    if (!routes.has(key)) routes.set(key, makeRoute(plan, route, reverse, names));
  }
  const summary = {
    dir,
    walkers: walkers.size,
    walks: walks.length,
    checkpoints: 0,
    steps: 0,
    rows: 0,
    distanceM: 0,
    durationS: 0,
  };
  const stepTruth: (string | number)[][] = [];
  const passes: (string | number)[][] = [];
  const walkRows: (string | number)[][] = [];
  const columns = walkColumns(plan);
  for (const each of walks) {
    const route = routes.get(`${each.route} ${each.reverse}`)!;
    const walk = simulateWalk(setting, each, walkers.get(each.walker)!, devices.get(each.device)!, route);
    const log = `logs/${each.walk}.csv${walk.device.plan.gzip ? '.gz' : ''}`;
    summary.rows += writeLog(join(dir, log), plan.seed, walk);
    writeTruth(dir, walk, setting.place, plan.truth.rate_hz);
    const steps = stepRows(walk);
    stepTruth.push(...steps);
    passes.push(...passRows(plan, walk));
    walkRows.push(walkRow(walk, log, steps.length, columns));
    summary.steps += steps.length;
    summary.distanceM += route.still ? 0 : route.curve.lengthM;
    summary.durationS += walk.model.timeline.durationS;
    // Lets a caller's timers and signals through between walks.
    await new Promise((resolve) => setImmediate(resolve));
  }
  const checkpoints = writeSurvey(plan, dir, [...routes.values()]);
  writeCsv(join(dir, 'walks.csv'), columns, walkRows);
  writeCsv(join(dir, 'step-truth.csv'), ['walk', 't_s', 'foot', 'length_m', 'heading_deg'], stepTruth);
  if (checkpoints > 0)
    writeCsv(join(dir, 'passes.csv'), ['walk', 'checkpoint', 't_s', 'sigma_s', 'role', 'true_t_s'], passes);
  writeCsv(
    join(dir, 'walkers.csv'),
    ['walker', 'group', 'height_m', 'leg_m', 'mass_kg', 'sex', 'age', 'cadence_hz', 'step_length_m'],
    [...walkers.values()].map((walker) => [
      walker.walker,
      walker.group,
      walker.heightM.toFixed(3),
      walker.legM.toFixed(3),
      walker.massKg.toFixed(1),
      walker.sex,
      walker.age,
      walker.cadenceHz.toFixed(4),
      walker.stepLengthM.toFixed(4),
    ]),
  );
  if (plan.floorPlan) writeText(join(dir, 'floor-plan.geojson'), plan.floorPlan.text);
  writeCampaignYaml(dir, {
    name: plan.name,
    grid: plan.grid,
    truth_time: 'relative',
    layouts: Object.fromEntries([...devices].map(([name, device]) => [name, layoutOf(device)])),
  } as Parameters<typeof writeCampaignYaml>[1]);
  return { ...summary, checkpoints };
}

function gridOf({ grid }: SimulationPlan): Grid {
  if (grid === 'local') return { origin: null, rotationDeg: 0, date: null, declinationDeg: null };
  const { origin } = grid;
  return {
    origin: origin ? { latDeg: origin.lat_deg, lonDeg: origin.lon_deg, heightM: origin.height_m } : null,
    rotationDeg: grid.rotation_deg,
    date: grid.date ?? null,
    declinationDeg: grid.declination_deg ?? null,
  };
}

const WALK_COLUMNS = [
  'walk',
  'walker',
  'log',
  'device',
  'carry',
  'layout',
  'level',
  'start',
  'start_heading_deg',
  'distance_m',
  'steps',
  'route',
];

function walkColumns(plan: SimulationPlan): string[] {
  return plan.walks.some(({ changes }) => changes.length > 0)
    ? [...WALK_COLUMNS, 'carry_changes']
    : WALK_COLUMNS;
}

function walkRow(
  walk: SimulatedWalk,
  log: string,
  steps: number,
  columns: readonly string[],
): (string | number)[] {
  const { plan, route } = walk;
  const at = new Float64Array(5);
  route.curve.at(0, at);
  const row: (string | number)[] = [
    plan.walk,
    plan.walker,
    log,
    plan.device,
    plan.carry,
    plan.device,
    route.plan.level ?? '',
    route.checkpoints[0]?.checkpoint ?? '',
    ((((at[2]! * 180) / Math.PI) % 360) + 360) % 360,
    (route.still ? 0 : route.curve.lengthM).toFixed(4),
    steps,
    plan.route,
  ];
  if (columns.length > WALK_COLUMNS.length)
    row.push(plan.changes.map(({ at_m, carry }) => `${carry} at ${at_m} m`).join('; '));
  return row;
}

function passRows(plan: SimulationPlan, walk: SimulatedWalk): (string | number)[][] {
  const { sigma_s, anchors } = plan.passes;
  const random = randomStream(plan.seed, 'walk', walk.plan.walk, 'passes');
  const { checkpoints } = walk.route;
  return checkpoints.map(({ checkpoint, alongM }, i) => {
    const trueS = truthTime(walk, passInstant(walk, alongM));
    const isAnchor = (anchors !== 'none' && i === 0) || (anchors === 'ends' && i === checkpoints.length - 1);
    return [
      walk.plan.walk,
      checkpoint,
      (trueS + sigma_s * random.normal()).toFixed(4),
      sigma_s,
      isAnchor ? 'anchor' : 'scored',
      trueS.toFixed(6),
    ];
  });
}

function writeSurvey(plan: SimulationPlan, dir: string, routes: readonly Route[]): number {
  const points = new Map<string, RouteCheckpoint & { level: string; upM: number }>();
  for (const { plan: route, checkpoints } of routes)
    for (const point of checkpoints)
      if (!points.has(point.checkpoint))
        points.set(point.checkpoint, { ...point, level: route.level ?? '', upM: route.up_m });
  if (points.size === 0) return 0;
  const { sigma_m } = plan.survey;
  writeCsv(
    join(dir, 'survey.csv'),
    ['checkpoint', 'east_m', 'north_m', 'up_m', 'level', 'sigma_m', 'true_east_m', 'true_north_m'],
    [...points.values()].map(({ checkpoint, eastM, northM, upM, level }) => {
      const random = randomStream(plan.seed, 'survey', checkpoint);
      return [
        checkpoint,
        (eastM + sigma_m * random.normal()).toFixed(4),
        (northM + sigma_m * random.normal()).toFixed(4),
        upM,
        level,
        sigma_m,
        eastM.toFixed(6),
        northM.toFixed(6),
      ];
    }),
  );
  return points.size;
}

import { join } from 'node:path';
import { writeCsv } from '../campaign/write-campaign.js';
import { randomStream } from '../stats/random.js';
import type { SimulationPlan } from './read-plan.js';
import type { Route, RouteCheckpoint } from './routes.js';
import type { SimulatedWalk } from './simulate-walk.js';
import { passInstant, truthTime } from './truth-files.js';
import type { WalkerModel } from './walker-model.js';

/** A row of a campaign table. */
export type Row = (string | number)[];

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

/** The columns of walks.csv: with the changes of carry where there are any. */
export function walkColumns(plan: SimulationPlan): string[] {
  return plan.walks.some(({ changes }) => changes.length > 0)
    ? [...WALK_COLUMNS, 'carry_changes']
    : WALK_COLUMNS;
}

/** A walk's row of walks.csv. */
export function walkRow(walk: SimulatedWalk, log: string, steps: number, columns: readonly string[]): Row {
  const { plan, route } = walk;
  const at = new Float64Array(5);
  route.curve.at(0, at);
  const row: Row = [
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

/** A walk's rows of passes.csv: taps with their error, and the true instants. */
export function passRows(plan: SimulationPlan, walk: SimulatedWalk): Row[] {
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

/** Writes survey.csv, each checkpoint once; nothing where there is none. Returns how many. */
export function writeSurvey(plan: SimulationPlan, dir: string, routes: readonly Route[]): number {
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

/** Writes walkers.csv, with what was drawn in columns of their own. */
export function writeWalkers(dir: string, walkers: Iterable<WalkerModel>): void {
  writeCsv(
    join(dir, 'walkers.csv'),
    ['walker', 'group', 'height_m', 'leg_m', 'mass_kg', 'sex', 'age', 'cadence_hz', 'step_length_m'],
    Array.from(walkers, (walker) => [
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
}

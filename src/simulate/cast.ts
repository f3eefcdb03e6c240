import type { Grid } from '../campaign/types.js';
import { expandWalks, type WalkPlan } from './expand-walks.js';
import { placeModel } from './magnetic-map.js';
import type { SimulationPlan } from './read-plan.js';
import { makeRoute, PointNames, type Route } from './routes.js';
import { type DeviceModel, deviceModel } from './sensor-errors.js';
import { type SimulatedWalk, simulateWalk, type WalkSetting } from './simulate-walk.js';
import { drawWalker, type WalkerModel } from './walker-model.js';

/** All that takes part in a plan's walks, drawn and made. */
export interface Cast {
  setting: WalkSetting;
  walks: readonly WalkPlan[];
  walkers: ReadonlyMap<string, WalkerModel>;
  devices: ReadonlyMap<string, DeviceModel>;
  /** By {@link routeKey}. */
  routes: ReadonlyMap<string, Route>;
}

/** A route walked in reverse is a route of its own. */
export function routeKey({ route, reverse }: WalkPlan): string {
  return `${route} ${reverse}`;
}

/**
 * Draws a plan's walkers and devices and makes its routes.
 *
 * @throws InputError where the plan's routes or walks do not go together.
 */
export function castOf(plan: SimulationPlan): Cast {
  const grid = gridOf(plan);
  const walks = expandWalks(plan);
  const names = new PointNames(plan.places);
  const routes = new Map<string, Route>();
  for (const walk of walks)
    if (!routes.has(routeKey(walk)))
      routes.set(routeKey(walk), makeRoute(plan, walk.route, walk.reverse, names));
  return {
    setting: {
      seed: plan.seed,
      place: placeModel(grid, plan.magnetic),
      heightM: grid.origin?.heightM ?? 0,
    },
    walks,
    walkers: new Map(
      plan.walkers.map((walker) => [
        walker.walker,
        drawWalker(plan.seed, walker, plan.groups[walker.group]!),
      ]),
    ),
    devices: new Map(Object.entries(plan.devices).map(([name, device]) => [name, deviceModel(name, device)])),
    routes,
  };
}

/** Simulates the walks one after the other. */
export function* simulateWalks({ setting, walks, walkers, devices, routes }: Cast): Generator<SimulatedWalk> {
  for (const walk of walks)
    yield simulateWalk(
      setting,
      walk,
      walkers.get(walk.walker)!,
      devices.get(walk.device)!,
      routes.get(routeKey(walk))!,
    );
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

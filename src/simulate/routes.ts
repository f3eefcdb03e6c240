import { InputError } from '../errors.js';
import { randomStream } from '../stats/random.js';
import { readCorridors, wander } from './corridors.js';
import type { RoutePlan } from './plan-schema.js';
import type { SimulationPlan } from './read-plan.js';
import { RouteCurve, type RoutePoint } from './route-curve.js';

/** A surveyed point of a route and where along it the walker passes. */
export interface RouteCheckpoint {
  checkpoint: string;
  eastM: number;
  northM: number;
  alongM: number;
}

/** A route as walked. */
export interface Route {
  plan: RoutePlan;
  curve: RouteCurve;
  /** Nothing to walk: the walker stands. */
  still: boolean;
  checkpoints: readonly RouteCheckpoint[];
  /** Names of places, by where along the curve each of the route's vertices lies. */
  places: ReadonlyMap<string, number>;
}

/** Two consecutive points nearer than this cannot be told from one by their corners, m. */
const SHORTEST_LEG_M = 1;

/**
 * Names for points: a place's name, else C01, C02, ... in the order of asking, one name a point.
 */
export class PointNames {
  readonly #known: (RoutePoint & { name: string })[];
  #count = 0;

  constructor(places: Readonly<Record<string, readonly [number, number]>>) {
    this.#known = Object.entries(places).map(([name, [eastM, northM]]) => ({ name, eastM, northM }));
  }

  nameOf({ eastM, northM }: RoutePoint): string {
    const known = this.#known.find((at) => Math.hypot(at.eastM - eastM, at.northM - northM) < 1e-6);
    if (known) return known.name;
    let name: string;
    do name = `C${String(++this.#count).padStart(2, '0')}`;
    while (this.#known.some((at) => at.name === name));
    this.#known.push({ name, eastM, northM });
    return name;
  }
}

/**
 * A route of the plan, forward or reversed.
 *
 * Checkpoints lie exactly on the walked curve: corners pass through their vertices.
 *
 * @throws InputError `route` where legs are too short to walk, or a pause's place is not on the route.
 */
export function makeRoute(plan: SimulationPlan, key: string, reverse: boolean, names: PointNames): Route {
  const route = plan.routes[key]!;
  const points = pointsOf(plan, key, route);
  if (reverse) points.reverse();
  const first = points[0]!;
  const still = points.length === 1;
  if (still) points.push({ eastM: first.eastM, northM: first.northM + SHORTEST_LEG_M });
  for (const [i, point] of points.entries()) {
    const before = points[i - 1];
    const lengthM = before
      ? Math.hypot(point.eastM - before.eastM, point.northM - before.northM)
      : SHORTEST_LEG_M;
    if (lengthM < SHORTEST_LEG_M)
      throw new InputError(
        'route',
        `${plan.file}: routes.${key}: leg ${i} is ${lengthM.toFixed(2)} m long; a leg must be at least ${SHORTEST_LEG_M} m`,
      );
  }
  const curve = new RouteCurve(points);
  const along = still ? [0] : curve.vertexM;
  const checkpoints: RouteCheckpoint[] = [];
  const at = new Float64Array(5);
  const add = (alongM: number) => {
    curve.at(alongM, at);
    const point = { eastM: tidy(at[0]!), northM: tidy(at[1]!) };
    checkpoints.push({ checkpoint: names.nameOf(point), ...point, alongM });
  };
  if (route.checkpoints === 'vertices') for (const alongM of along) add(alongM);
  else if (route.checkpoints !== 'none') {
    const total = still ? 0 : curve.lengthM;
    const nParts = Math.max(1, Math.round(total / route.checkpoints.every_m));
    for (let i = 0; i <= (still ? 0 : nParts); i++) add((total * i) / nParts);
  }
  const places = new Map<string, number>();
  for (const [name, [eastM, northM]] of Object.entries(plan.places))
    for (const [i, point] of points.entries())
      if (!places.has(name) && Math.hypot(point.eastM - eastM, point.northM - northM) < 1e-6)
        places.set(name, along[i] ?? 0);
  for (const { at: place } of route.pauses)
    if (place !== undefined && !places.has(place))
      throw new InputError(
        'route',
        `${plan.file}: routes.${key}.pauses: "${place}" is not a point of the route`,
      );
  return { plan: route, curve, still, checkpoints, places };
}

/** Rounds off the last digits, so that one vertex has one position whatever way a route reaches it. */
function tidy(value: number): number {
  return Math.round(value * 1e9) / 1e9;
}

function pointsOf(plan: SimulationPlan, key: string, route: RoutePlan): RoutePoint[] {
  const random = randomStream(plan.seed, 'route', key);
  if (route.points)
    return route.points.map((point) => {
      const [eastM, northM] = typeof point === 'string' ? plan.places[point]! : point;
      return { eastM, northM };
    });
  if (route.corridors) {
    const corridors = readCorridors(plan.floorPlan?.text ?? '', plan.floorPlan?.name ?? '', route.level);
    const place = route.corridors.from === undefined ? null : plan.places[route.corridors.from]!;
    const start =
      place &&
      corridors.junctions.findIndex((at) => Math.hypot(at.eastM - place[0], at.northM - place[1]) < 0.3);
    if (start === -1)
      throw new InputError(
        'route',
        `${plan.file}: routes.${key}.corridors.from: "${route.corridors.from}" is not a vertex of a corridor`,
      );
    return [...wander(corridors, route.corridors.length_m, start, random)];
  }
  const { legs, leg_m, within } = route.random!;
  const [west, south, east, north] = within ?? [-1e6, -1e6, 1e6, 1e6];
  const inside = ({ eastM, northM }: RoutePoint) =>
    eastM >= Math.min(west, east) &&
    eastM <= Math.max(west, east) &&
    northM >= Math.min(south, north) &&
    northM <= Math.max(south, north);
  const points: RoutePoint[] = [
    within ? { eastM: (west + east) / 2, northM: (south + north) / 2 } : { eastM: 0, northM: 0 },
  ];
  for (let leg = 0; leg < legs; leg++) {
    const from = points.at(-1)!;
    let to = from;
    for (let attempt = 0; to === from; attempt++) {
      if (attempt === 1000)
        throw new InputError(
          'route',
          `${plan.file}: routes.${key}.random: no leg of ${leg_m.join(' to ')} m fits within; widen it`,
        );
      const lengthM = leg_m[0] + (leg_m[1] - leg_m[0]) * random.uniform();
      const headingRad = 2 * Math.PI * random.uniform();
      const next = {
        eastM: tidy(from.eastM + lengthM * Math.sin(headingRad)),
        northM: tidy(from.northM + lengthM * Math.cos(headingRad)),
      };
      if (inside(next)) to = next;
    }
    points.push(to);
  }
  return points;
}

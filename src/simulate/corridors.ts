import { InputError } from '../errors.js';
import type { RandomStream } from '../stats/random.js';
import type { RoutePoint } from './route-curve.js';

interface Feature {
  properties?: Record<string, unknown> | null;
  geometry?: { type?: string; coordinates?: unknown } | null;
}

/** Corridors as a graph: junctions, and for each the junctions that a corridor leads to. */
export interface Corridors {
  junctions: readonly RoutePoint[];
  ways: readonly (readonly number[])[];
}

/** Vertices nearer than this are one junction, m: drawn by hand, ends seldom meet exactly. */
const SAME_M = 0.3;

/**
 * The corridors of a floor plan: its LineString features, joined where their vertices meet.
 *
 * @param text - GeoJSON with coordinates in the grid (east, north).
 * @param level - only features of this `level`; undefined: all.
 * @throws InputError `floor-plan` where it is not GeoJSON or has no corridor.
 */
export function readCorridors(text: string, file: string, level: string | undefined): Corridors {
  const refuse = (reason: string) => new InputError('floor-plan', `${file}: ${reason}`);
  let features: Feature[];
  try {
    features = (JSON.parse(text) as { features: Feature[] }).features;
    if (!Array.isArray(features)) throw new Error('no features');
  } catch (error) {
    throw refuse(`is not a GeoJSON FeatureCollection (${(error as Error).message})`);
  }
  const junctions: RoutePoint[] = [];
  const ways: Set<number>[] = [];
  const junctionAt = (eastM: number, northM: number): number => {
    const known = junctions.findIndex((at) => Math.hypot(at.eastM - eastM, at.northM - northM) < SAME_M);
    if (known !== -1) return known;
    ways.push(new Set());
    return junctions.push({ eastM, northM }) - 1;
  };
  for (const [index, { properties, geometry }] of features.entries()) {
    if (geometry?.type !== 'LineString') continue;
    if (level !== undefined && properties?.level !== undefined && String(properties.level) !== level)
      continue;
    let before = -1;
    for (const at of geometry.coordinates as unknown[]) {
      const [east, north] = Array.isArray(at) ? (at as unknown[]) : [];
      if (typeof east !== 'number' || typeof north !== 'number')
        throw refuse(`features.${index}: a coordinate must be [east, north], got ${JSON.stringify(at)}`);
      const here = junctionAt(east, north);
      if (before !== -1 && before !== here) {
        ways[before]!.add(here);
        ways[here]!.add(before);
      }
      before = here;
    }
  }
  if (junctions.length < 2)
    throw refuse(
      `has no corridor${level === undefined ? '' : ` on level ${level}`}; draw corridors as LineString features`,
    );
  return { junctions, ways: ways.map((set) => [...set]) };
}

/**
 * A random way along corridors, at least `lengthM` long; turning back only where there is no other way.
 *
 * @param start - the junction to begin at; null: drawn.
 */
export function wander(
  corridors: Corridors,
  lengthM: number,
  start: number | null,
  random: RandomStream,
): RoutePoint[] {
  const { junctions, ways } = corridors;
  let here = start ?? random.integer(0, junctions.length);
  let before = -1;
  const points = [junctions[here]!];
  for (let walkedM = 0; walkedM < lengthM; ) {
    const onward = ways[here]!.filter((next) => next !== before);
    const choice = onward.length > 0 ? onward : ways[here]!;
    const next = choice[random.integer(0, choice.length)]!;
    walkedM += Math.hypot(
      junctions[next]!.eastM - junctions[here]!.eastM,
      junctions[next]!.northM - junctions[here]!.northM,
    );
    points.push(junctions[next]!);
    before = here;
    here = next;
  }
  return points;
}

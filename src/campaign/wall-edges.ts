import { InputError, messageOf } from '../errors.js';

/** Edges of a floor plan's geometries, four numbers each: east and north of both ends, m in the grid. */
export type WallEdges = Float64Array;

interface Feature {
  properties?: { level?: unknown } | null;
  geometry?: unknown;
}

/**
 * The edges of a floor plan by level: wherever two points follow each other in a geometry, of whatever type.
 *
 * A feature without a level belongs to all of them; a coordinate that is no pair of numbers ends its line.
 *
 * @param text - GeoJSON FeatureCollection with coordinates in the grid (east, north), m.
 * @returns by level, and under `""` those of all levels together.
 * @throws InputError `floor-plan` where the text is not a FeatureCollection.
 */
export function wallEdges(text: string, file: string): Map<string, WallEdges> {
  let features: Feature[];
  try {
    features = (JSON.parse(text) as { features: Feature[] }).features;
    if (!Array.isArray(features)) throw new Error('no features');
  } catch (error) {
    throw new InputError('floor-plan', `${file}: is not a GeoJSON FeatureCollection (${messageOf(error)})`);
  }
  const all: number[] = [];
  const common: number[] = [];
  const byLevel = new Map<string, number[]>();
  for (const feature of features) {
    const edges: number[] = [];
    addGeometry(feature?.geometry, edges);
    const level = feature?.properties?.level ?? null;
    const own = level === null ? common : (byLevel.get(String(level)) ?? []);
    if (level !== null) byLevel.set(String(level), own);
    for (const value of edges) {
      own.push(value);
      all.push(value);
    }
  }
  const out = new Map([['', Float64Array.from(all)]]);
  for (const [level, own] of byLevel) out.set(level, Float64Array.from([...own, ...common]));
  return out;
}

function addGeometry(geometry: unknown, edges: number[]): void {
  if (typeof geometry !== 'object' || geometry === null) return;
  const { coordinates, geometries } = geometry as { coordinates?: unknown; geometries?: unknown };
  if (Array.isArray(geometries)) for (const part of geometries) addGeometry(part, edges);
  addLines(coordinates, edges);
}

function addLines(coordinates: unknown, edges: number[]): void {
  if (!Array.isArray(coordinates)) return;
  let before: readonly [number, number] | null = null;
  for (const each of coordinates) {
    const here = pointOf(each);
    if (here && before) edges.push(...before, ...here);
    if (!here) addLines(each, edges);
    before = here;
  }
}

function pointOf(value: unknown): readonly [number, number] | null {
  if (!Array.isArray(value)) return null;
  const [east, north] = value as unknown[];
  return Number.isFinite(east) && Number.isFinite(north) ? [east as number, north as number] : null;
}

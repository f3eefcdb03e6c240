import { readFileSync } from 'node:fs';
import { expect, test } from 'vitest';
import { readCorridors, wander } from '../../src/simulate/corridors.js';
import { randomStream } from '../../src/stats/random.js';

const DEMO = readFileSync(new URL('../../data-demo/floor-plan.geojson', import.meta.url), 'utf8');

test('the demo building: ten junctions', () => {
  const { junctions, ways } = readCorridors(DEMO, 'floor-plan.geojson', '0');
  // Counted on the drawing.
  expect(junctions).toHaveLength(10);
  expect(ways.reduce((sum, way) => sum + way.length, 0) / 2).toBe(12);
});

test('a way keeps to corridors, is long enough and turns back at dead ends only', () => {
  const corridors = readCorridors(DEMO, 'floor-plan.geojson', undefined);
  const { junctions, ways } = corridors;
  for (let seed = 0; seed < 20; seed++) {
    const points = wander(corridors, 200, null, randomStream(seed, 'way'));
    const at = points.map((point) => junctions.indexOf(point as (typeof junctions)[number]));
    let lengthM = 0;
    for (let i = 1; i < at.length; i++) {
      expect(ways[at[i - 1]!]).toContain(at[i]);
      if (i > 1 && at[i] === at[i - 2]) expect(ways[at[i - 1]!]).toHaveLength(1);
      lengthM += Math.hypot(
        points[i]!.eastM - points[i - 1]!.eastM,
        points[i]!.northM - points[i - 1]!.northM,
      );
    }
    expect(lengthM).toBeGreaterThanOrEqual(200);
  }
});

test('refusals', () => {
  expect(() => readCorridors('{', 'f.geojson', undefined)).toThrow(
    /^f\.geojson: is not a GeoJSON FeatureCollection/,
  );
  expect(() => readCorridors('{"features": []}', 'f.geojson', '2')).toThrow(
    'f.geojson: has no corridor on level 2; draw corridors as LineString features',
  );
  const bad = '{"features": [{"geometry": {"type": "LineString", "coordinates": [[0, "x"]]}}]}';
  expect(() => readCorridors(bad, 'f.geojson', undefined)).toThrow(
    'f.geojson: features.0: a coordinate must be [east, north], got [0,"x"]',
  );
});

import { describe, expect, test } from 'vitest';
import { readCampaign } from '../../src/campaign/read-campaign.js';
import { walkContext } from '../../src/campaign/walk-context.js';
import { wallEdges } from '../../src/campaign/wall-edges.js';
import { folderWith, messageFrom } from './folder.js';

const feature = (level: unknown, geometry: unknown) => ({
  type: 'Feature',
  properties: level === undefined ? null : { level },
  geometry,
});
const plan = (...features: unknown[]) => JSON.stringify({ type: 'FeatureCollection', features });

describe('wallEdges', () => {
  test('edges of every geometry, by level; those without a level belong to all', () => {
    const edges = wallEdges(
      plan(
        feature('0', { type: 'LineString', coordinates: [[0, 0], [1, 0], [1, 2]] }), // biome-ignore format: one line
        feature(1, {
          type: 'MultiPolygon',
          coordinates: [
            [
              [
                [5, 5],
                [6, 5],
                [5, 5],
              ],
            ],
          ],
        }),
        feature(undefined, {
          type: 'GeometryCollection',
          geometries: [
            {
              type: 'LineString',
              coordinates: [
                [8, 8],
                [9, 9, 3],
              ],
            },
          ],
        }),
        feature('0', { type: 'Point', coordinates: [3, 3] }),
        feature('0', null),
      ),
      'p',
    );
    expect(Object.fromEntries([...edges].map(([level, values]) => [level, [...values]]))).toEqual({
      '': [0, 0, 1, 0, 1, 0, 1, 2, 5, 5, 6, 5, 6, 5, 5, 5, 8, 8, 9, 9],
      '0': [0, 0, 1, 0, 1, 0, 1, 2, 8, 8, 9, 9],
      '1': [5, 5, 6, 5, 6, 5, 5, 5, 8, 8, 9, 9],
    });
  });

  test('a coordinate that is no pair of numbers ends its line', () => {
    const line = feature('0', { type: 'LineString', coordinates: [[0, 0], [1, 0], null, [5, 5], [5, 6]] });
    expect([...wallEdges(plan(line), 'p').get('0')!]).toEqual([0, 0, 1, 0, 5, 5, 5, 6]);
  });
});

const CAMPAIGN = {
  'campaign.yaml':
    'name: c\ngrid: local\nlayouts:\n  r:\n    shape: wide\n    time: { column: t, unit: s }\n    accel: { columns: [x, y, z], unit: mps2 }\n',
  'walkers.csv': 'walker,group\nw,g\n',
  'survey.csv': 'checkpoint,east_m,north_m\nfar,200,0\nhere,0,0\n',
};
const SPAN = { t0: { value: '0', unit: 's' as const }, end_s: 10 };

describe('the floor in the context of a walk', () => {
  const dir = folderWith({
    ...CAMPAIGN,
    'walks.csv': 'walk,walker,log,level,start\na,w,l.csv,0,here\nb,w,l.csv,0,far\nc,w,l.csv,7,\n',
    'floor-plan.geojson': plan(
      feature('0', {
        type: 'LineString',
        coordinates: [
          [-5, 0],
          [5, 0],
        ],
      }),
      feature('0', {
        type: 'LineString',
        coordinates: [
          [195, -5],
          [205, 5],
        ],
      }),
    ),
  });
  const campaign = readCampaign(dir);
  const share = (i: number) => walkContext(campaign, campaign.walks[i]!, SPAN).floor!.wall_share;

  test('walls around the start count', () => {
    // Two hundred metres away at a reach of 30 m is exp(-6.7): a thousandth.
    expect(share(0)[0]).toBeGreaterThan(0.99);
    expect(share(1)[45]).toBeGreaterThan(0.99);
  });

  test('without a start, and on a level that the plan does not have, all of them alike', () => {
    expect(share(2)[0]! / share(2)[45]!).toBeCloseTo(10 / Math.hypot(10, 10), 12);
  });

  test('no plan, no floor', () => {
    const bare = readCampaign(folderWith({ ...CAMPAIGN, 'walks.csv': 'walk,walker,log\na,w,l.csv\n' }));
    expect('floor' in walkContext(bare, bare.walks[0]!, SPAN)).toBe(false);
  });

  test('a plan that is not GeoJSON is a problem of the campaign', async () => {
    const broken = folderWith({
      ...CAMPAIGN,
      'walks.csv': 'walk,walker,log\na,w,l.csv\n',
      'floor-plan.geojson': '{"type": "Topology"}',
    });
    expect(await messageFrom(() => readCampaign(broken))).toBe(
      'floor-plan.geojson: is not a GeoJSON FeatureCollection (no features)',
    );
  });
});

import { writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { expect, test } from 'vitest';
import { castOf } from '../../src/simulate/cast.js';
import { readPlan } from '../../src/simulate/read-plan.js';
import { emptyFolder, planNamed, planOf } from './plan-file.js';

const GOOD = `name: plan
seed: 1
grid: local
places: { A: [0, 0], B: [10, 0] }
groups: { g: { age: [30, 39] } }
walkers: [{ walker: a, group: g }]
devices: { phone: {} }
routes: { way: { points: [A, B] } }
walks: [{ walker: a, route: way }]
`;

/** The messages of a plan, its folder left out. */
function problemsOf(text: string): string[] {
  const path = join(emptyFolder(), 'PLAN.yaml');
  writeFileSync(path, text);
  try {
    castOf(readPlan(path));
  } catch (error) {
    return (error as Error).message.replaceAll(path, 'PLAN.yaml').split('\n');
  }
  return [];
}

test('a good plan has no problems and its defaults', () => {
  expect(problemsOf(GOOD)).toEqual([]);
  const plan = planOf(GOOD);
  expect(plan.devices.phone).toMatchObject({ class: 'typical', shape: 'wide', rate_hz: 100, gzip: true });
  expect(plan.walks[0]).toMatchObject({ carry: 'hand', repeat: 1, reverse: false });
});

test('all problems at once, each with its line, column, key, value and what is allowed', () => {
  const bad = GOOD.replace('age: [30, 39]', 'age: [30, 39], gait: limping')
    .replace('phone: {}', 'phone: { rate_hz: 0, clas: good }')
    .replace('walker: a, route: way }', 'walker: a, route: way, carry: hnad, repeat: 1.5 }');
  expect(problemsOf(bad)).toEqual([
    'PLAN.yaml:5:37 groups.g.gait: got "limping"; allowed: normal, child, aid, shuffling, impaired',
    expect.stringMatching(/^PLAN\.yaml:7:30 devices\.phone\.rate_hz: .*>0, got 0$/),
    expect.stringMatching(
      /^PLAN\.yaml:7:33 devices\.phone\.clas: unknown key; allowed: class, .* Did you mean "class"\?$/,
    ),
    'PLAN.yaml:9:41 walks.0.carry: must be one or several of hand, swing, pocket, front-pocket, back-pocket, bag, chest, waist, got "hnad"',
    expect.stringMatching(/^PLAN\.yaml:9:55 walks\.0\.repeat: .*int.*, got 1\.5$/),
  ]);
});

test('names that the plan does not have, with the near ones', () => {
  const bad = GOOD.replace('group: g }', 'group: h }')
    .replace('points: [A, B]', 'points: [A, C]')
    .replace('{ walker: a, route: way }', '{ walker: b, route: wya }');
  expect(problemsOf(bad)).toEqual([
    'PLAN.yaml:6:31 walkers.0.group: "h" is not in groups; there are g.',
    'PLAN.yaml:8:30 routes.way.points.1: "C" is not in places; there are A, B.',
    'PLAN.yaml:9:19 walks.0.walker: "b" is not in walkers; there are a.',
    'PLAN.yaml:9:29 walks.0.route: "wya" is not in routes; there are way. Did you mean "way"?',
  ]);
});

test('routes that cannot be walked', () => {
  expect(problemsOf(GOOD.replace('B: [10, 0]', 'B: [0.4, 0]'))).toEqual([
    'PLAN.yaml: routes.way: leg 1 is 0.40 m long; a leg must be at least 1 m',
  ]);
  expect(
    problemsOf(GOOD.replace('points: [A, B]', 'points: [A, B], random: { legs: 2, leg_m: [2, 3] }')),
  ).toEqual([
    expect.stringMatching(/^PLAN\.yaml:8:16 routes\.way: must have exactly one of points, corridors, random/),
  ]);
  expect(problemsOf(GOOD.replace('points: [A, B]', 'corridors: { length_m: 20 }'))).toEqual([
    'PLAN.yaml:8:29 routes.way.corridors: needs floor_plan: the GeoJSON whose LineString features are the corridors',
  ]);
  expect(
    problemsOf(GOOD.replace('points: [A, B]', 'points: [A, [5, 5]], pauses: [{ at: B, seconds: 3 }]')),
  ).toEqual(['PLAN.yaml: routes.way.pauses: "B" is not a point of the route']);
});

test('a wide log has one rate', () => {
  expect(problemsOf(GOOD.replace('phone: {}', 'phone: { rate_hz: { accel: 100, mag: 50 } }'))).toEqual([
    'PLAN.yaml:7:30 devices.phone.rate_hz: a wide log has one rate for all sensors; give one, or shape: tagged',
  ]);
});

test('two walks of one name', () => {
  const twice = GOOD.replace('walks: [', 'walks: [{ walk: w02, walker: a, route: way }, ');
  expect(problemsOf(twice)).toEqual(['PLAN.yaml: walks: two walks would be called "w02"; name them apart']);
});

test('entries are crossed: walkers, routes, carries, devices, repeats', () => {
  const { walks } = castOf(planNamed('carries'));
  expect(walks.map(({ walk, carry }) => `${walk} ${carry}`)).toEqual([
    'w01 hand',
    'w02 swing',
    'w03 pocket',
    'w04 front-pocket',
    'w05 back-pocket',
    'w06 bag',
    'w07 chest',
    'w08 waist',
    'change hand',
  ]);
});

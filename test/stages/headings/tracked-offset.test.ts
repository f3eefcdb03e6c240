import { writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { describe, expect, test } from 'vitest';
import { headingsStage } from '../../../src/stages/headings/index.js';
import { median } from '../../../src/stats/quantile.js';
import { temporaryFolder } from '../../temporary-folder.js';
import { walkContext } from '../walk-context.js';
import { type WalkingErrors, walkingErrors } from './walking-errors.js';

const plan = (walks: string) => `
name: walking direction
seed: 5
grid: { origin: { lat_deg: 50, lon_deg: 8, height_m: 100 }, date: 2025-06-01 }
groups: { adults: { age: [20, 60] }, aid: { age: [65, 80], gait: aid } }
walkers: [{ walker: a, group: adults }, { walker: b, group: aid }]
devices: { phone: { class: good, rate_hz: 50 } }
routes: { r: { points: [[0, 0], [0, 20], [15, 20], [15, 0], [8, -6], [-10, -6]] } }
walks:
${walks}
`;

function recipe(text: string): string {
  const path = join(temporaryFolder(), 'recipe.yaml');
  writeFileSync(path, `name: tried\nheadings: ${text}\n`);
  return path;
}

const medianOf = (walks: readonly WalkingErrors[]) => median(walks.flatMap(({ errorsDeg }) => errorsDeg));

describe('tracked-offset on simulated walks', () => {
  // Largest median errors that are asked for, degrees, by carry.
  const ASKED = { hand: 3, chest: 3, waist: 3, pocket: 8, 'back-pocket': 8, bag: 8, swing: 12 };
  const walks = walkingErrors(
    plan(`  - { walker: all, route: r, carry: [${Object.keys(ASKED).join(', ')}] }`),
  );

  for (const [carry, most] of Object.entries(ASKED))
    test(`${carry}: the median error is at most ${most} degrees`, async () => {
      const own = (await walks).filter((walk) => walk.carry === carry);
      expect(own).toHaveLength(2);
      expect(medianOf(own)).toBeLessThan(most);
    });

  test('says where the direction came from', async () => {
    for (const { carry, sources } of await walks)
      expect(new Set(sources), carry).toEqual(new Set([carry === 'hand' ? 'device-axis' : 'motion']));
  });

  test('pocket, bag and swing without a start heading and without a magnetometer error: motion alone finds it', async () => {
    const alone = await walkingErrors(
      plan('  - { walker: all, route: r, carry: [pocket, back-pocket, bag, swing] }').replace(
        'phone: { class: good, rate_hz: 50 }',
        'phone: { class: ideal, rate_hz: 50 }',
      ),
      // A start heading that counts for nothing.
      recipe('{ method: tracked-offset, start_sd_deg: 500 }'),
    );
    for (const { carry, errorsDeg } of alone) expect(median(errorsDeg), carry).toBeLessThan(8);
  });

  test('the phone goes from hand to pocket and back: the course is found again', async () => {
    const changed = await walkingErrors(
      plan(
        '  - { walk: c, walker: a, route: r, carry: hand, changes: [{ at_m: 25, carry: pocket }, { at_m: 55, carry: hand }] }',
      ),
    );
    expect(medianOf(changed)).toBeLessThan(5);
    expect(new Set(changed[0]!.sources)).toEqual(new Set(['device-axis', 'motion']));
  });
});

describe('walls of the floor plan', () => {
  /** A quiet walk held flat on which the device points 12 degrees off the walls, and the yaw is good to 10. */
  function walkBeside(wallDegree: number | null, settings: object, start: boolean) {
    const n = 60;
    const t_s = Float64Array.from({ length: n }, (_, k) => 0.5 + 0.5 * k);
    const rows = Float64Array.from({ length: 1600 }, (_, i) => i / 50);
    const fill = (value: number) => new Float64Array(rows.length).fill(value);
    const corner = (t: number) => (t < 15 ? 0 : 90);
    const half = rows.map((t) => ((-(12 + corner(t)) * Math.PI) / 180) * 0.5);
    const attitude = {
      t_s: rows,
      qw: half.map(Math.cos),
      qx: fill(0),
      qy: fill(0),
      qz: half.map(Math.sin),
      bgx_radps: fill(0),
      bgy_radps: fill(0),
      bgz_radps: fill(0),
      mag_trust: fill(0),
      tilt_sd_rad: fill(0),
      yaw_sd_rad: fill((10 * Math.PI) / 180),
    };
    const motion = {
      t_s: rows,
      ax_mps2: fill(0),
      ay_mps2: fill(0),
      az_mps2: fill(9.81),
      gap: rows.map(() => 0),
    };
    const steps = {
      step: Int32Array.from({ length: n }, (_, k) => k + 1),
      t_s,
      start_s: t_s.map((t) => t - 0.25),
      end_s: t_s.map((t) => t + 0.25),
      strength_mps2: new Float64Array(n).fill(3),
      confidence: new Float64Array(n).fill(1),
      bout: new Int32Array(n).fill(1),
    };
    const method = headingsStage.methods['tracked-offset']!;
    const headings = method.run(
      { steps, motion, attitude } as unknown as Parameters<typeof method.run>[0],
      method.settings.parse(settings),
      walkContext({
        ...(wallDegree === null
          ? {}
          : { floor: { wall_share: Array.from({ length: 90 }, (_, i) => (i === wallDegree ? 1 : 0)) } }),
        start: start
          ? {
              checkpoint: 's',
              east_m: 0,
              north_m: 0,
              sigma_m: 0.1,
              t_s: null,
              sigma_s: 0,
              heading_rad: (12 * Math.PI) / 180,
            }
          : null,
      }),
    );
    return {
      headingDeg: (headings.heading_rad[10]! * 180) / Math.PI,
      sdDeg: (headings.sd_rad[10]! * 180) / Math.PI,
    };
  }

  test('draw a doubtful yaw to the corridor, and make it surer', () => {
    const without = walkBeside(null, {}, false);
    const beside = walkBeside(0, {}, false);
    expect(without.headingDeg).toBeCloseTo(12, 1);
    expect(Math.abs(beside.headingDeg)).toBeLessThan(5);
    expect(beside.sdDeg).toBeLessThan(0.7 * without.sdDeg);
  });

  test('count for nothing where the recipe says so', () => {
    expect(walkBeside(0, { dominant_directions: 'none' }, false).headingDeg).toBeCloseTo(12, 1);
  });

  test('do not overrule a start heading that is half a right angle off: the belief falls back to it', () => {
    const off = walkBeside(57, {}, true);
    expect(off.headingDeg).toBeCloseTo(12, 0);
  });
});

test('no steps, no headings', () => {
  const none = new Float64Array(0);
  const steps = {
    step: new Int32Array(0),
    t_s: none,
    start_s: none,
    end_s: none,
    strength_mps2: none,
    confidence: none,
    bout: new Int32Array(0),
  };
  const method = headingsStage.methods['tracked-offset']!;
  const one = Float64Array.of(0, 0);
  const attitude = {
    t_s: Float64Array.of(0, 1),
    qw: Float64Array.of(1, 1),
    qx: one,
    qy: one,
    qz: one,
    bgx_radps: one,
    bgy_radps: one,
    bgz_radps: one,
    mag_trust: one,
    tilt_sd_rad: one,
    yaw_sd_rad: one,
  };
  const motion = { t_s: attitude.t_s, ax_mps2: one, ay_mps2: one, az_mps2: one, gap: [false, false] };
  const headings = method.run(
    { steps, motion, attitude } as unknown as Parameters<typeof method.run>[0],
    method.settings.parse({}),
    walkContext(),
  );
  expect(headings.heading_rad).toHaveLength(0);
  expect(headings.source).toHaveLength(0);
});

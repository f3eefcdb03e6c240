import { existsSync, readFileSync } from 'node:fs';
import { join } from 'node:path';
import { describe, expect, test } from 'vitest';
import { readAttitudeTruth } from '../../src/campaign/attitude-truth.js';
import { readCampaign } from '../../src/campaign/read-campaign.js';
import { readLog } from '../../src/campaign/read-log.js';
import { castOf, simulateWalks } from '../../src/simulate/cast.js';
import { intoDevice, motionAt } from '../../src/simulate/device-motion.js';
import { fieldAt } from '../../src/simulate/magnetic-map.js';
import { simulateCampaign } from '../../src/simulate/simulate-campaign.js';
import { emptyFolder, planNamed } from './plan-file.js';

async function made(name: string) {
  const plan = planNamed(name);
  const dir = emptyFolder();
  await simulateCampaign(plan, dir);
  const campaign = readCampaign(dir);
  const walk = campaign.walks[0]!;
  const readings = await readLog(dir, walk, campaign.layouts[walk.layout]!);
  const cast = castOf(plan);
  return { plan, dir, campaign, walk, readings, cast, simulated: [...simulateWalks(cast)][0]! };
}

/** Columns of a written CSV, as numbers where they are. */
function columns(dir: string, file: string): Record<string, string[]> {
  const [head, ...rows] = readFileSync(join(dir, file), 'utf8')
    .trim()
    .split('\n')
    .map((line) => line.split(','));
  return Object.fromEntries(head!.map((name, i) => [name, rows.map((row) => row[i]!)]));
}

describe('a rough log: fast clock, several rates, rows lost, doubled and out of place', () => {
  test('truth is timed from the first reading, on the phone clock', async () => {
    const { dir, campaign, readings, simulated } = await made('rough');
    expect(campaign.truthTime).toBe('relative');
    const truth = columns(dir, 'truth-sensors/w01.csv');
    const attitude = await readAttitudeTruth(campaign.attitudeTruth.get('w01')!);
    const at = new Map(truth.t_s!.map((t, row) => [Math.round(Number(t) * 1e6), row]));
    const gyro = readings.gyro!;
    let met = 0;
    for (let i = 0; i < gyro.t_s.length; i++) {
      // Each gyroscope reading has a truth row at its instant: stamps are rounded to 1 ns.
      const row = at.get(Math.round(gyro.t_s[i]! * 1e6));
      expect(row, `reading at ${gyro.t_s[i]}`).toBeDefined();
      expect(Math.abs(Number(truth.t_s![row!]) - gyro.t_s[i]!)).toBeLessThan(2e-9);
      met++;
      // The motion at that instant is the motion of that row.
      const trueS = trueInstant(simulated, gyro.t_s[i]!);
      const motion = motionAt(simulated.model, Float64Array.of(trueS));
      // Nine decimals are written.
      expect(Math.abs(motion.attitude[0][0]! - attitude.qw[row!]!)).toBeLessThan(2e-8);
    }
    expect(met).toBeGreaterThan(1000);
  });

  test('readings are what the motion at their stamps makes', async () => {
    const { readings, simulated, cast } = await made('rough');
    const { accel, mag } = readings;
    const times = mag!.t_s.map((t) => trueInstant(simulated, t));
    const motion = motionAt(simulated.model, times);
    const field = intoDevice(motion.attitude, fieldAt(cast.setting.place, motion.position));
    for (let i = 0; i < times.length; i++) {
      // A stamp off by 1 ns while the phone turns at 5 rad/s moves 50 uT by 3e-7; nine decimals are written.
      expect(Math.abs(field[0][i]! - mag!.x_uT[i]!)).toBeLessThan(1e-6);
      expect(Math.abs(field[2][i]! - mag!.z_uT[i]!)).toBeLessThan(1e-6);
    }
    expect(accel!.t_s[0]).toBeGreaterThanOrEqual(0);
    const first = Math.min(accel!.t_s[0]!, readings.gyro!.t_s[0]!, mag!.t_s[0]!, readings.baro!.t_s[0]!);
    expect(first).toBe(0);
  });

  test('rows are lost, doubled and out of place about as often as asked', async () => {
    const { readings, simulated } = await made('rough');
    const { counts } = readings;
    const rows = Object.values(counts).reduce((sum, { rows: n }) => sum + n, 0);
    const doubled = Object.values(counts).reduce((sum, { duplicateTimes }) => sum + duplicateTimes, 0);
    const all = simulated.streams.reduce((sum, { stampedS }) => sum + stampedS.length, 0);
    // 2 % of n rows, give or take three times sqrt(0.02 n): binomial.
    expect(Math.abs(doubled - 0.02 * rows)).toBeLessThan(3 * Math.sqrt(0.02 * rows));
    expect(Object.values(counts).some(({ outOfOrder }) => outOfOrder > 0)).toBe(true);
    expect(rows - doubled).toBeLessThan(all);
  });

  test('the lift raises the walker and lowers the pressure', async () => {
    const { dir, readings } = await made('rough');
    const up = columns(dir, 'path-truth/w01.csv').up_m!.map(Number);
    expect(up.at(-1)! - up[0]!).toBeCloseTo(3, 6);
    // 0.12 hPa a metre near 500 m: standard atmosphere; 5 % for the walker's own rise and fall of 2 cm and more.
    const pressure = readings.baro!.p_hPa;
    expect((pressure.at(-1)! - pressure[0]!) / -0.113 / 3).toBeCloseTo(1, 1);
  });
});

test('perfect log: steps, passes and path agree to the written digits', async () => {
  const { dir, campaign, readings, simulated } = await made('perfect');
  const path = columns(dir, 'path-truth/w01.csv');
  const times = path.t_s!.map(Number);
  const rowAt = (t: number) => times.findIndex((time) => time > t);
  for (const pass of campaign.passes!) {
    const point = campaign.survey!.get(pass.checkpoint)!;
    const row = Math.max(1, rowAt(Number(pass.time)));
    const part = (Number(pass.time) - times[row - 1]!) / (times[row]! - times[row - 1]!);
    const between = (column: string[]) => Number(column[row - 1]) * (1 - part) + Number(column[row]) * part;
    const miss = Math.hypot(between(path.east_m!) - point.eastM, between(path.north_m!) - point.northM);
    // Linear between rows 40 ms apart: a 1.5 m/s walker in a bend of 0.4 m is off by v² h² / 8 r = 1 mm.
    expect(miss, pass.checkpoint).toBeLessThan(0.0015);
  }
  const walk = campaign.walks[0]!;
  expect(campaign.stepTruth).toHaveLength(walk.steps!);
  expect(walk.steps).toBe(simulated.model.timeline.bouts.flatMap(({ contacts }) => contacts).length);
  // Two bouts end with a sway of 5 % of half a step each, which no step holds.
  const lengths = columns(dir, 'step-truth.csv').length_m!.map(Number);
  expect(Math.abs(lengths.reduce((sum, length) => sum + length, 0) - walk.distanceM!)).toBeLessThan(0.1);
  // At rest before the first step: gravity alone, whatever the attitude. Standard gravity, by definition; the hand
  // wanders by a degree in 2.5 s, which adds centimetres a second squared.
  const { x_mps2, y_mps2, z_mps2 } = readings.accel!;
  expect(Math.abs(Math.hypot(x_mps2[50]!, y_mps2[50]!, z_mps2[50]!) - 9.80665)).toBeLessThan(0.05);
  expect(existsSync(join(dir, 'logs/w01.csv'))).toBe(true);
});

/** True time of a reading's time since the first reading. */
function trueInstant(walk: Awaited<ReturnType<typeof made>>['simulated'], t: number): number {
  const zero = walk.clock.sinceStamp(0, walk.firstStamp);
  return (t - zero) / (1 + walk.device.clock_ppm * 1e-6);
}

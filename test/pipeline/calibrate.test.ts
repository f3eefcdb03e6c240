import { readFileSync } from 'node:fs';
import { join } from 'node:path';
import { expect, test } from 'vitest';
import { calibrateDelay, calibrateDevice } from '../../src/pipeline/calibrate-device.js';
import { calibrateWalkers } from '../../src/pipeline/calibrate-walkers.js';
import { noiseOfLog } from '../../src/pipeline/noise-of-log.js';
import { runCampaign } from '../../src/pipeline.js';
import { mean } from '../../src/stats/summary.js';
import { readColumns } from '../../src/tables/read.js';
import { motionTable, stridesTable } from '../../src/tables/schemas.js';
import { smallCampaign } from '../small-campaign.js';

const BIAS = [0.02, -0.01, 0.03];

test('a gyroscope calibrated at rest: the zero that was simulated, and motion uses it from then on', async () => {
  const dir = await smallCampaign((plan) =>
    plan
      .replace(
        'class: good, rate_hz: 50',
        `class: good, rate_hz: 100, gyro: { bias: [${BIAS.join(', ')}], turn_on_sd: 0, per_degC_sd: 0 }`,
      )
      .replace('way: { points: [A, B, C], initial_still_s: 2 }', 'way: { points: [A], initial_still_s: 60 }')
      .replaceAll(/carry: \w+ /g, 'carry: waist, wander: 0 '),
  );
  const fit = await calibrateDevice(dir, 'gyro', { walks: ['w01', 'w02'] });
  // Instability and random walk of a good part over two minutes: some tenths of a milliradian per second.
  for (let a = 0; a < 3; a++) expect(Math.abs(fit.calibration.bias[a]! - BIAS[a]!)).toBeLessThan(5e-4);
  await runCampaign(dir, { jobs: 1, upto: 'motion', walks: ['w03'] });
  const motion = readColumns(join(dir, 'results', 'default', 'w03', 'motion.arrow'), motionTable);
  for (const rate of [motion.gx_radps!, motion.gy_radps!, motion.gz_radps!])
    expect(Math.abs(mean(rate))).toBeLessThan(1e-3);
  expect(readFileSync(fit.path, 'utf8')).toContain('still seconds');
});

test('noise of a simulated part is found within four standard errors', async () => {
  const dir = await smallCampaign((plan) =>
    plan
      .replace(
        'class: good, rate_hz: 50',
        'class: ideal, rate_hz: 100, gyro: { noise_density: 2.0e-4 }, accel: { noise_density: 1.5e-3 }',
      )
      .replace('way: { points: [A, B, C], initial_still_s: 2 }', 'way: { points: [A], initial_still_s: 300 }')
      .replaceAll(/carry: \w+ /g, 'carry: waist, wander: 0 '),
  );
  for (const { sensor, fit } of await noiseOfLog(dir, 'w01')) {
    const { value, standardError } = fit!.angleRandomWalk;
    expect(Math.abs(value - (sensor === 'gyro' ? 2e-4 : 1.5e-3))).toBeLessThan(4 * standardError);
  }
});

test('a walker’s constant from walks of known length; strides use it', async () => {
  const dir = await smallCampaign();
  const before = await runCampaign(dir, { jobs: 1, upto: 'strides' });
  const lengthOf = (walk: string) =>
    readColumns(join(before.resultsDir, walk, 'strides.arrow'), stridesTable).length_m.reduce(
      (sum, x) => sum + x,
      0,
    );
  const truth = before.campaign.walks[0]!.distanceM!;
  const uncalibrated = Math.abs(lengthOf('w01') / truth - 1);
  const { walkers } = await calibrateWalkers(dir, { jobs: 1 });
  expect([...walkers.keys()]).toEqual(['kim', 'lou']);
  await runCampaign(dir, { jobs: 1, upto: 'strides' });
  const calibrated = Math.abs(lengthOf('w01') / truth - 1);
  expect(calibrated).toBeLessThan(uncalibrated);
  expect(calibrated).toBeLessThan(0.08);
});

test('a magnetometer that is 80 ms late', async () => {
  const dir = await smallCampaign((plan) =>
    plan
      .replace(
        'class: good, rate_hz: 50',
        'class: good, shape: tagged, rate_hz: { accel: 100, gyro: 100, mag: 50 }, mag: { delay_s: 0.08 }',
      )
      .replace('points: [A, B, C]', 'points: [A, B, C, B, A, B, C]'),
  );
  const { delay_s } = await calibrateDelay(dir, { walks: [] });
  // A magnetometer of 50 Hz is read every 20 ms.
  expect(Math.abs(delay_s + 0.08)).toBeLessThan(0.01);
});

test('logs that cannot tell are refused', async () => {
  const dir = await smallCampaign();
  await expect(calibrateDevice(dir, 'gyro', { walks: ['w01'] })).rejects.toThrow(
    /needs at least 5 still seconds, found \d/,
  );
  await expect(calibrateDevice(dir, 'accel', { walks: ['w01'] })).rejects.toThrow(
    /needs at least 9 directions/,
  );
  await expect(calibrateDevice(dir, 'mag', { walks: ['w01'] })).rejects.toThrow(
    /do not tell all parameters apart/,
  );
  await expect(noiseOfLog(dir, 'w01')).rejects.toThrow(/must be at least 60|the device moved/);
});

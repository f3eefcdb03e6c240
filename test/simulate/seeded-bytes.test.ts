import { readdirSync, readFileSync, statSync } from 'node:fs';
import { join } from 'node:path';
import { expect, test } from 'vitest';
import { simulateCampaign } from '../../src/simulate/simulate-campaign.js';
import { emptyFolder, planOf } from './plan-file.js';

const PLAN = `
name: bytes
seed: 5
grid: local
groups: { g: { age: [30, 39] } }
walkers: [{ walker: a, group: g }, { walker: b, group: g }]
devices: { good: { class: good }, poor: { class: poor, shape: tagged, rate_hz: { accel: 50, gyro: 50 } } }
routes: { way: { points: [[0, 0], [9, 0], [9, 5]] } }
walks:
  - { walk: first, walker: a, route: way, device: good }
  - { walk: second, walker: b, route: way, device: poor, carry: swing }
`;

/** Every file of a folder with its bytes. */
function bytesOf(dir: string): Map<string, string> {
  const files = readdirSync(dir, { recursive: true }) as string[];
  return new Map(
    files
      .filter((file) => statSync(join(dir, file)).isFile())
      .sort()
      .map((file) => [file, readFileSync(join(dir, file)).toString('base64')]),
  );
}

async function made(text: string): Promise<Map<string, string>> {
  const dir = emptyFolder();
  await simulateCampaign(planOf(text), dir);
  return bytesOf(dir);
}

test('the same plan gives the same bytes', async () => {
  expect(await made(PLAN)).toEqual(await made(PLAN));
});

test('another seed gives other readings', async () => {
  const other = await made(PLAN.replace('seed: 5', 'seed: 6'));
  expect(other.get('logs/first.csv.gz')).not.toBe((await made(PLAN)).get('logs/first.csv.gz'));
});

test('a walk, a walker, a device or a checkpoint more leaves the other walks as they were', async () => {
  const before = await made(PLAN);
  const after = await made(
    PLAN.replace('walkers: [', 'walkers: [{ walker: c, group: g }, ')
      .replace('devices: {', 'devices: { third: {},')
      .replace('routes: {', 'routes: { other: { points: [[0, 0], [0, 20]] },')
      .replace('walks:\n', 'walks:\n  - { walk: zeroth, walker: c, route: other, device: third }\n'),
  );
  for (const walk of ['first', 'second'])
    for (const file of [
      `logs/${walk}.csv.gz`,
      `path-truth/${walk}.csv`,
      `attitude-truth/${walk}.csv`,
      `truth-sensors/${walk}.csv`,
    ])
      expect(after.get(file), file).toBe(before.get(file));
  const passesOf = (files: Map<string, string>) =>
    Buffer.from(files.get('passes.csv')!, 'base64')
      .toString()
      .split('\n')
      .filter((line) => line.startsWith('second'));
  // Columns: walk, checkpoint, t_s, ...; the checkpoints' running numbers may move on.
  const withoutName = (line: string) => line.split(',').toSpliced(1, 1);
  expect(passesOf(after).map(withoutName)).toEqual(passesOf(before).map(withoutName));
});

import { createHash } from 'node:crypto';
import { readFileSync } from 'node:fs';
import { join } from 'node:path';
import { gunzipSync } from 'node:zlib';
import { expect, test } from 'vitest';
import { readCampaign } from '../../src/campaign/read-campaign.js';
import { readLog } from '../../src/campaign/read-log.js';
import { writeCampaignYaml, writeCsv, writeNumberCsv } from '../../src/campaign/write-campaign.js';
import { folderWith } from './folder.js';

test('a campaign written is the campaign read', async () => {
  const dir = folderWith({});
  writeCampaignYaml(dir, {
    name: 'written: "quoted", no',
    grid: { origin: { lat_deg: 48.5, lon_deg: 2.25, height_m: 30 }, rotation_deg: 12, date: '2025-03-31' },
    truth_time: 'relative',
    layouts: {
      sim: {
        shape: 'tagged',
        time: { column: 't_ns', unit: 'ns' },
        tag: 'sensor',
        accel: { tag: 'acc', columns: ['x', 'y', 'z'], unit: 'mps2' },
        gyro: { tag: 'gyr', columns: ['x', 'y', 'z'], unit: 'radps' },
      },
    },
  });
  writeCsv(join(dir, 'walkers.csv'), ['walker', 'group', 'note'], [['w1', 'adult', 'says "hi", often']]);
  writeCsv(
    join(dir, 'walks.csv.gz'),
    ['walk', 'walker', 'log', 'distance_m'],
    [['a1', 'w1', 'logs/a1.csv.gz', 0.1 + 0.2]],
  );
  const start = 1700000000005000000n;
  const columns = [
    BigInt64Array.of(start, start, start + 20_000_001n),
    ['acc', 'gyr', 'acc'],
    Float64Array.of(1, -0.00001, 2.25),
    Float64Array.of(-0.00004, 0.5, Number.NaN),
    Float64Array.of(9.80665, 0, 1),
  ];
  const header = ['t_ns', 'sensor', 'x', 'y', 'z'];
  writeNumberCsv(join(dir, 'logs/a1.csv.gz'), header, columns, [0, 0, 4, 4, 5]);
  const campaign = readCampaign(dir);
  expect(campaign.name).toBe('written: "quoted", no');
  expect(campaign.grid).toEqual({
    origin: { latDeg: 48.5, lonDeg: 2.25, heightM: 30 },
    rotationDeg: 12,
    date: '2025-03-31',
    declinationDeg: null,
  });
  expect(campaign.walkers[0]?.extra.note).toBe('says "hi", often');
  expect(campaign.walks[0]?.distanceM).toBe(0.1 + 0.2);
  const log = await readLog(dir, campaign.walks[0]!, campaign.layouts.sim!);
  expect(log.t0.value).toBe(String(start));
  expect(log.accel).toEqual({
    t_s: Float64Array.of(0),
    x_mps2: Float64Array.of(1),
    y_mps2: Float64Array.of(0),
    z_mps2: Float64Array.of(9.80665),
  });
  expect(log.counts.accel?.missing).toBe(1);
  expect(
    gunzipSync(readFileSync(join(dir, 'logs/a1.csv.gz')))
      .toString()
      .split('\n')[2],
  ).toBe('1700000000005000000,gyr,0.0000,0.5000,0.00000');
});

test('the same content gives the same bytes, gzip header included, and its digest', () => {
  const dir = folderWith({});
  const write = (name: string) =>
    writeNumberCsv(join(dir, name), ['t', 'x'], [Float64Array.of(0, 1), Float64Array.of(2, 3)], [1, 2]);
  const digest = write('a.csv.gz');
  expect(write('b.csv.gz')).toBe(digest);
  const bytes = readFileSync(join(dir, 'a.csv.gz'));
  expect(createHash('sha256').update(bytes).digest('hex')).toBe(digest);
  // RFC 1952, section 2.3: bytes 4 to 7 are the time of modification (0: none), byte 9 the system (255: unknown).
  expect([...bytes.subarray(4, 8), bytes[9]]).toEqual([0, 0, 0, 0, 255]);
});

test('more rows than one chunk, and none', () => {
  const dir = folderWith({});
  const n = 10_000;
  const t = Float64Array.from({ length: n }, (_, i) => i);
  writeNumberCsv(join(dir, 'a.csv'), ['t'], [t], [0]);
  const lines = readFileSync(join(dir, 'a.csv'), 'utf8').split('\n');
  expect(lines).toEqual(['t', ...Array.from(t, String), '']);
  writeNumberCsv(join(dir, 'b.csv'), ['t'], [new Float64Array(0)], [0]);
  expect(readFileSync(join(dir, 'b.csv'), 'utf8')).toBe('t\n');
});

test('what cannot be written right is refused', () => {
  const dir = folderWith({});
  const path = join(dir, 'a.csv');
  expect(() => writeCsv(path, ['a', 'b'], [[1]])).toThrow(`${path}: a row has 1 cells, the header has 2`);
  expect(() => writeCsv(path, ['a'], [[Number.POSITIVE_INFINITY]])).toThrow(
    'a CSV cell must be a finite number',
  );
  expect(() => writeNumberCsv(path, ['a', 'b'], [Float64Array.of(1), Float64Array.of(1, 2)], [0, 0])).toThrow(
    `${path}: 2 names for columns of 1,2 rows`,
  );
  expect(() => writeCampaignYaml(dir, { name: '', layouts: {} })).toThrow();
});

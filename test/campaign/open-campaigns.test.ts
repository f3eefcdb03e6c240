import { existsSync, readFileSync } from 'node:fs';
import { join, resolve } from 'node:path';
import { gunzipSync } from 'node:zlib';
import { expect, test } from 'vitest';
import { readAttitudeTruth } from '../../src/campaign/attitude-truth.js';
import { readCampaign } from '../../src/campaign/read-campaign.js';
import { readLog } from '../../src/campaign/read-log.js';
import { secondsSinceStart } from '../../src/campaign/seconds-since-start.js';

const folder = process.env.TREADLINE_OPEN_DATA ?? resolve(import.meta.dirname, '../../../shared/campaigns');
const present = existsSync(join(folder, 'halls'));
if (!present)
  console.log(`skipped: no open recordings at ${folder} (TREADLINE_OPEN_DATA names another place)`);

// Walks, sensors and rates as the recordings' own description gives them. It gives rates in round numbers
// ("100 to 405 Hz"), so a twentieth is allowed on them. How long a log lasts is not taken from there
// ("about 150 s") but from the log's own lines, read in the plainest way, with no tolerance at all.
const CAMPAIGNS = [
  { name: 'halls', walks: 48, sensors: ['accel', 'gyro', 'mag'], lowHz: 50, highHz: 50, ticksPerS: 1e3 },
  { name: 'counted-steps', walks: 31, sensors: ['accel'], lowHz: 100, highHz: 405, ticksPerS: 1e9 },
  {
    name: 'optical-attitude',
    walks: 10,
    sensors: ['accel', 'gyro', 'mag'],
    lowHz: 286,
    highHz: 286,
    ticksPerS: null,
  },
  { name: 'pocket-groups', walks: 38, sensors: ['accel', 'gyro'], lowHz: 25, highHz: 25, ticksPerS: null },
];

/** The accelerometer's rows, split at commas: time, then x, y, z; a tagged log's tag is taken out. */
function plainRows(path: string): string[][] {
  const [header, ...lines] = gunzipSync(readFileSync(path)).toString().trimEnd().split('\n');
  const rows = lines.map((line) => line.split(','));
  if (header!.split(',')[1] !== 'sensor') return rows;
  return rows.filter((cells) => cells[1] === 'acc').map(([time, , ...axes]) => [time!, ...axes]);
}

test.skipIf(!present).each(CAMPAIGNS)(
  '$name: every log is read whole, at the rate it is said to have',
  async (said) => {
    const campaign = readCampaign(join(folder, said.name));
    expect(campaign.walks).toHaveLength(said.walks);
    for (const walk of campaign.walks) {
      const log = await readLog(campaign.dir, walk, campaign.layouts[walk.layout]!);
      expect(Object.keys(log.counts), walk.walk).toEqual(said.sensors);
      const rows = plainRows(join(campaign.dir, walk.log));
      const { t_s, z_mps2 } = log.accel!;
      expect(t_s.length, walk.walk).toBe(rows.length);
      const [first, last] = [rows[0]!, rows.at(-1)!];
      // Whole ticks are subtracted as whole numbers; the logs in seconds begin at 0.
      const ticks = said.ticksPerS === null ? null : Number(BigInt(last[0]!) - BigInt(first[0]!));
      if (ticks === null) expect(Number(first[0]), walk.walk).toBe(0);
      const durationS = ticks === null ? Number(last[0]) : ticks / said.ticksPerS!;
      expect(t_s.at(-1), walk.walk).toBe(durationS);
      expect([z_mps2[0], z_mps2.at(-1)], walk.walk).toEqual([Number(first[3]), Number(last[3])]);
      const rateHz = (t_s.length - 1) / durationS;
      expect(rateHz, walk.walk).toBeGreaterThan(said.lowHz * 0.95);
      expect(rateHz, walk.walk).toBeLessThan(said.highHz * 1.05);
    }
  },
);

test.skipIf(!present)(
  'halls: passes lie within the logs, to the second that the first tap may come early',
  async () => {
    const campaign = readCampaign(join(folder, 'halls'));
    for (const walk of campaign.walks.slice(0, 12)) {
      const log = await readLog(campaign.dir, walk, campaign.layouts.phone!);
      for (const pass of campaign.passes!.filter((each) => each.walk === walk.walk)) {
        const t_s = secondsSinceStart(pass.time, campaign.truthTime, log.t0);
        expect(t_s).toBeGreaterThan(-1);
        expect(t_s).toBeLessThan(log.accel!.t_s.at(-1)! + 1);
      }
    }
  },
);

test.skipIf(!present)('optical-attitude: the truth is every fifth sample of the log', async () => {
  const campaign = readCampaign(join(folder, 'optical-attitude'));
  const log = await readLog(campaign.dir, campaign.walks[0]!, campaign.layouts.wide!);
  const truth = await readAttitudeTruth(campaign.attitudeTruth.get(campaign.walks[0]!.walk)!, {
    truthTime: campaign.truthTime,
    t0: log.t0,
  });
  const samples = new Set(log.accel!.t_s);
  // Times of both files are written with six decimals, so they agree to the last bit.
  expect(truth.t_s.every((t) => samples.has(t))).toBe(true);
});

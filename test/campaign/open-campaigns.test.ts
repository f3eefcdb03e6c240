import { existsSync } from 'node:fs';
import { join, resolve } from 'node:path';
import { expect, test } from 'vitest';
import { readAttitudeTruth } from '../../src/campaign/attitude-truth.js';
import { readCampaign } from '../../src/campaign/read-campaign.js';
import { readLog } from '../../src/campaign/read-log.js';
import { secondsSinceStart } from '../../src/campaign/seconds-since-start.js';

const folder = process.env.TREADLINE_OPEN_DATA ?? resolve(import.meta.dirname, '../../../shared/campaigns');
const present = existsSync(join(folder, 'halls'));
if (!present)
  console.log(`skipped: no open recordings at ${folder} (TREADLINE_OPEN_DATA names another place)`);

// Walks, sensors, rates and durations as the recordings' own description gives them, in round numbers:
// a twentieth is allowed on rates, a tenth on durations (a third of "about 150 s"). pocket-groups gives lengths: 75 to 300 m at walking pace.
const CAMPAIGNS = [
  {
    name: 'halls',
    walks: 48,
    sensors: ['accel', 'gyro', 'mag'],
    lowHz: 47.5,
    highHz: 52.5,
    lowS: 36,
    highS: 132,
  },
  { name: 'counted-steps', walks: 31, sensors: ['accel'], lowHz: 95, highHz: 425, lowS: 100, highS: 200 },
  {
    name: 'optical-attitude',
    walks: 10,
    sensors: ['accel', 'gyro', 'mag'],
    lowHz: 272,
    highHz: 300,
    lowS: 144,
    highS: 231,
  },
  {
    name: 'pocket-groups',
    walks: 38,
    sensors: ['accel', 'gyro'],
    lowHz: 23.75,
    highHz: 26.25,
    lowS: 40,
    highS: 900,
  },
];

test.skipIf(!present).each(CAMPAIGNS)(
  '$name: every log reads, with the sensors and rate it is said to have',
  async (said) => {
    const campaign = readCampaign(join(folder, said.name));
    expect(campaign.walks).toHaveLength(said.walks);
    for (const walk of campaign.walks) {
      const log = await readLog(campaign.dir, walk, campaign.layouts[walk.layout]!);
      expect(Object.keys(log.counts), walk.walk).toEqual(said.sensors);
      const t_s = log.accel!.t_s;
      const durationS = t_s.at(-1)!;
      expect(durationS, walk.walk).toBeGreaterThan(said.lowS);
      expect(durationS, walk.walk).toBeLessThan(said.highS);
      const rateHz = (t_s.length - 1) / durationS;
      expect(rateHz, walk.walk).toBeGreaterThan(said.lowHz);
      expect(rateHz, walk.walk).toBeLessThan(said.highHz);
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

import { beforeAll, describe, expect, test } from 'vitest';
import { readCampaign } from '../../../src/campaign/read-campaign.js';
import { readLog } from '../../../src/campaign/read-log.js';
import { walkContext } from '../../../src/campaign/walk-context.js';
import { layoutOf, readingsInMemory } from '../../../src/pipeline/import-readings.js';
import type { FindingsInputs } from '../../../src/stages/findings/index.js';
import { smallCampaign } from '../../small-campaign.js';
import { alarms, copyOf, FAULTS, type Log } from './faults.js';

let clean: Log[];
beforeAll(async () => {
  const dir = await smallCampaign((plan) =>
    plan
      .replace('class: good, rate_hz: 50', 'class: typical, rate_hz: 100')
      .replace('points: [A, B, C]', 'points: [A, B, C, B, A, B, C]')
      .replace(
        '{ walker: kim, route: way, carry: chest }',
        '{ walker: kim, route: way, carry: [chest, swing, pocket, bag] }',
      ),
  );
  const campaign = readCampaign(dir);
  clean = await Promise.all(
    campaign.walks.map(async (walk) => {
      const { tables, span } = readingsInMemory(await readLog(dir, walk, layoutOf(campaign, walk)));
      const inputs = Object.fromEntries([...tables].map(([name, table]) => [name, table.columns()]));
      return { inputs: inputs as unknown as FindingsInputs, context: walkContext(campaign, walk, span) };
    }),
  );
});

test('six clean walks, five carries: no warning', () => {
  expect(clean.map(alarms)).toEqual([[], [], [], [], [], []]);
});

describe('planted faults', () => {
  test.each(FAULTS)('%s: %s', (_what, alarm, plant, walk = 0) => {
    const log = copyOf(clean[walk]!);
    plant(log);
    expect(alarms(log)).toContainEqual(expect.stringMatching(`^${alarm}$`));
  });
});

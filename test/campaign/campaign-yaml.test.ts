import { expect, test } from 'vitest';
import { z } from 'zod';
import { campaignSchema, readCampaignYaml } from '../../src/campaign/campaign-yaml.js';
import { Problems } from '../../src/campaign/problems.js';
import { messageFrom } from './folder.js';

const layout = (text: string) => `name: x\nlayouts:\n  a: ${text}\n`;
const WIDE = '{ shape: wide, time: { column: t, unit: s }, accel: { columns: [x, y, z], unit: g } }';

function read(text: string) {
  const problems = new Problems();
  const yaml = readCampaignYaml(text, problems);
  problems.throwIfAny('campaign');
  return yaml!;
}

test('a tagged, turned, headerless layout', () => {
  const { a } = read(`
name: x
layouts:
  a:
    shape: tagged
    time: { column: 1, unit: ms }
    tag: 2
    accel: { tag: 1, columns: [3, 4, 5], unit: g, sign: gravity-directed }
    gyro: { tag: gyr, columns: [3, 4, 5], unit: degps }
    axes: [-y, x, z]
    delimiter: tab
    decimal: ","
    header: false
`).layouts;
  expect(a).toMatchObject({ tag: 2, delimiter: '\t', decimal: ',', header: false });
  expect(a!.sensors.accel).toMatchObject({
    tag: '1',
    columns: [3, 4, 5],
    unit: 'g',
    sign: 'gravity-directed',
  });
  expect(a!.axes).toEqual([
    { axis: 1, sign: -1 },
    { axis: 0, sign: 1 },
    { axis: 2, sign: 1 },
  ]);
});

test.each([
  [
    'grid: { origin: { lat_deg: 50 } }',
    'campaign.yaml:1:17 grid.origin.lon_deg: is missing; it must be given',
  ],
  ['grid: { date: 2019-02-30 }', 'campaign.yaml:1:15 grid.date: must be a date like 2025-03-31'],
  [
    'grid: { rotaton_deg: 3 }',
    'campaign.yaml:1:9 grid.rotaton_deg: unknown key; allowed: origin, rotation_deg, date, declination_deg. Did you mean "rotation_deg"?',
  ],
  [
    'grid: locale',
    'campaign.yaml:1:7 grid: must be local, or a mapping with origin, rotation_deg, date, declination_deg, got "locale"',
  ],
  ['grid: { rotation_deg: east }', 'campaign.yaml:1:23 grid.rotation_deg: expected number, got "east"'],
  ['truth_time: rel', 'campaign.yaml:1:13 truth_time: got "rel"; allowed: log, relative'],
])('the head of the file: %s', async (head, message) => {
  expect(await messageFrom(() => read(`${head}\n${layout(WIDE)}`))).toBe(message);
});

test.each([
  [
    WIDE.replace('wide', 'broad'),
    'campaign.yaml:3:15 layouts.a.shape: got "broad"; allowed: wide, tagged, split',
  ],
  [
    WIDE.replace('unit: s', 'unit: sec'),
    'campaign.yaml:3:46 layouts.a.time.unit: got "sec"; allowed: s, ms, us, ns',
  ],
  [
    WIDE.replace('[x, y, z]', '[x, y]'),
    'campaign.yaml:3:69 layouts.a.accel.columns: must name 3 columns: x, y, z, got ["x","y"]',
  ],
  [
    WIDE.replace('[x, y, z]', '[x, y, y]'),
    'campaign.yaml:3:69 layouts.a.accel.columns: names a column twice: [x, y, y]',
  ],
  [
    WIDE.replace('[x, y, z]', '[0, 1, 2]'),
    'campaign.yaml:3:70 layouts.a.accel.columns.0: must be a column name, or a column number from 1, got 0',
  ],
  [WIDE.replace(/, accel.*/, ' }'), 'campaign.yaml:3:6 layouts.a.accel: is missing; it must be given'],
  [
    WIDE.replace('wide', 'tagged'),
    "campaign.yaml:3:6 layouts.a.tag: is missing; a tagged layout must name the column that says which sensor\ncampaign.yaml:3:60 layouts.a.accel.tag: is missing; a tagged layout must say which rows are this sensor's",
  ],
  [
    WIDE.replace('wide', 'split'),
    "campaign.yaml:3:59 layouts.a.accel.file: is missing; a split layout must name each sensor's file",
  ],
  [
    WIDE.replace('wide,', 'wide, tag: s,'),
    'campaign.yaml:3:26 layouts.a.tag: only a tagged layout has a tag column, this one is wide',
  ],
  [
    WIDE.replace(' } }', ', file: a.csv } }'),
    'campaign.yaml:3:95 layouts.a.accel.file: only a split layout has a file per sensor, this one is wide',
  ],
  [
    WIDE.replace(' } }', ' }, axes: [x, y, -y] }'),
    'campaign.yaml:3:97 layouts.a.axes: must name each of x, y, z once, got [x, y, -y]',
  ],
  [
    WIDE.replace(' } }', ' }, header: false }'),
    'campaign.yaml:3:99 layouts.a.header: column "t" is given by name, which needs a header line; give numbers from 1, or header: true',
  ],
  [
    WIDE.replace(' } }', ' }, delimiter: ",", decimal: "," }'),
    'campaign.yaml:3:116 layouts.a.decimal: the comma cannot be both delimiter and decimal sign',
  ],
  [
    WIDE.replace(' } }', ' }, gyr: 1 }'),
    'campaign.yaml:3:91 layouts.a.gyr: unknown key; allowed: shape, time, tag, accel, gyro, mag, baro, axes, delimiter, decimal, header. Did you mean "gyro"?',
  ],
])('a layout: %s', async (text, message) => {
  expect(await messageFrom(() => read(layout(text)))).toBe(message);
});

test('no layouts, doubled keys, broken YAML and an empty file', () => {
  expect(() => read('name: x\nlayouts: {}')).toThrow(
    'campaign.yaml:2:10 layouts: must describe at least one log layout',
  );
  expect(() => read('name: x\nname: y')).toThrow('campaign.yaml:2:1 Map keys must be unique');
  expect(() => read('name: [x')).toThrow('campaign.yaml:1:9 ');
  expect(() => read('')).toThrow('campaign.yaml:1:1 the file: expected object, got null');
});

test('aliases that multiply are refused before they fill the memory', () => {
  const levels = Array.from(
    { length: 12 },
    (_, i) => `l${i + 1}: &l${i + 1} [${Array(9).fill(`*l${i}`).join(', ')}]`,
  );
  const bomb = `l0: &l0 [x]\n${levels.join('\n')}\n`;
  const begin = performance.now();
  expect(() => read(bomb)).toThrow(
    'campaign.yaml:1:1 its aliases cannot be expanded (Excessive alias count indicates a resource exhaustion attack); write the values out',
  );
  // Expanding 9^12 nodes would take hours; refusing takes milliseconds, also on a busy machine.
  expect(performance.now() - begin).toBeLessThan(5000);
});

test('the schema can be given out as JSON Schema', () => {
  const json = z.toJSONSchema(campaignSchema, { io: 'input' }) as {
    properties: Record<string, unknown>;
    required: string[];
  };
  expect(Object.keys(json.properties)).toEqual(['name', 'grid', 'truth_time', 'layouts']);
  expect(json.required).toEqual(['name', 'layouts']);
});

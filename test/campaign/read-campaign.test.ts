import { mkdirSync, symlinkSync } from 'node:fs';
import { join } from 'node:path';
import { gzipSync } from 'node:zlib';
import { expect, test } from 'vitest';
import { readCampaign } from '../../src/campaign/read-campaign.js';
import { gridFromGeodetic } from '../../src/geometry/enu.js';
import { folderWith, messageFrom } from './folder.js';

const YAML = `name: two corridors
grid: local
layouts:
  recorder-a:
    shape: wide
    time: { column: t, unit: ns }
    accel: { columns: [ax, ay, az], unit: mps2 }
`;
const WALKERS = 'walker,group\nw1,adult\nw2,cane\n';
const WALKS = 'walk,walker,log\na1,w1,logs/a1.csv\na2,w2,logs/a2.csv\n';
const LEAST = { 'campaign.yaml': YAML, 'walkers.csv': WALKERS, 'walks.csv': WALKS };

/** The problems of the least campaign with some files put in, one a line. */
async function problemsOf(files: Record<string, string | Uint8Array>): Promise<string[]> {
  const dir = folderWith({ ...LEAST, ...files });
  return (await messageFrom(() => readCampaign(dir))).split('\n');
}

test('the least campaign: defaults filled in, logs not needed', () => {
  const dir = folderWith(LEAST);
  const campaign = readCampaign(dir);
  expect(campaign).toMatchObject({
    dir,
    name: 'two corridors',
    grid: { origin: null, rotationDeg: 0, date: null, declinationDeg: null },
    truthTime: 'log',
    survey: null,
    passes: null,
    stepTruth: null,
    floorPlan: null,
  });
  expect(campaign.layouts['recorder-a']).toEqual({
    name: 'recorder-a',
    shape: 'wide',
    time: { column: 't', unit: 'ns' },
    tag: null,
    sensors: {
      accel: {
        columns: ['ax', 'ay', 'az'],
        unit: 'mps2',
        sign: 'specific-force',
        tag: null,
        file: null,
        time: null,
      },
    },
    axes: [
      { axis: 0, sign: 1 },
      { axis: 1, sign: 1 },
      { axis: 2, sign: 1 },
    ],
    delimiter: null,
    decimal: null,
    header: null,
  });
  expect(campaign.walkers[1]).toEqual({
    walker: 'w2',
    group: 'cane',
    heightM: null,
    legM: null,
    massKg: null,
    extra: {},
  });
  expect(campaign.walks[1]).toEqual({
    walk: 'a2',
    walker: 'w2',
    log: 'logs/a2.csv',
    device: null,
    carry: null,
    layout: 'recorder-a',
    level: null,
    start: null,
    startHeadingDeg: null,
    distanceM: null,
    steps: null,
    extra: {},
    line: 3,
  });
});

test('a full campaign, gzipped tables included', () => {
  const dir = folderWith({
    'campaign.yaml': YAML.replace('grid: local', 'grid: { declination_deg: -1.5 }\ntruth_time: relative'),
    'walkers.csv.gz': gzipSync('walker,group,height_m,leg_m,mass_kg,shoes\nw1,adult,1.75,0.9,70,soft\n'),
    'walks.csv':
      'walk,walker,log,device,carry,layout,level,start,start_heading_deg,distance_m,steps,weather\n' +
      'a1,w1,logs/a1.csv,p,hand,recorder-a,G,c1,90,120.5,180,"wet, cold"\n',
    'survey.csv': 'checkpoint,east_m,north_m,up_m,level,sigma_m,note\nc1,0,0,1,G,0.02,door\nc2,10,-2.5,,,,\n',
    'passes.csv': 'walk,checkpoint,t_s,sigma_s,role\na1,c1,0.5,0.1,anchor\na1,c2,9.75,,\na1,c1,20,,\n',
    'step-truth.csv.gz': gzipSync('walk,t_s,foot\na1,1.25,L\na1,1.25,L\n'),
    'attitude-truth/a1.csv': '',
    'attitude-truth/README': '',
    'path-truth/a1.csv.gz': '',
    'floor-plan.geojson.gz': gzipSync('{"type": "FeatureCollection", "features": []}'),
    'calibrations/device-p.yaml': '',
    'calibrations/walker-w1.yaml': '',
  });
  const campaign = readCampaign(dir);
  expect(campaign.grid.declinationDeg).toBe(-1.5);
  expect(campaign.truthTime).toBe('relative');
  expect(campaign.walkers[0]).toMatchObject({
    heightM: 1.75,
    legM: 0.9,
    massKg: 70,
    extra: { shoes: 'soft' },
  });
  expect(campaign.walks[0]).toMatchObject({
    start: 'c1',
    startHeadingDeg: 90,
    distanceM: 120.5,
    steps: 180,
    extra: { weather: 'wet, cold' },
  });
  expect(campaign.survey?.get('c1')).toEqual({
    checkpoint: 'c1',
    eastM: 0,
    northM: 0,
    upM: 1,
    level: 'G',
    sigmaM: 0.02,
  });
  expect(campaign.survey?.get('c2')).toMatchObject({ upM: null, level: null, sigmaM: 0.1 });
  expect(campaign.passes).toEqual([
    { walk: 'a1', checkpoint: 'c1', time: '0.5', sigmaS: 0.1, role: 'anchor', line: 2 },
    { walk: 'a1', checkpoint: 'c2', time: '9.75', sigmaS: 0.25, role: 'scored', line: 3 },
    { walk: 'a1', checkpoint: 'c1', time: '20', sigmaS: 0.25, role: 'scored', line: 4 },
  ]);
  expect(campaign.stepTruth).toHaveLength(2);
  expect([...campaign.attitudeTruth]).toEqual([['a1', join(dir, 'attitude-truth/a1.csv')]]);
  expect([...campaign.pathTruth]).toEqual([['a1', join(dir, 'path-truth/a1.csv.gz')]]);
  expect(campaign.floorPlan).toBe(join(dir, 'floor-plan.geojson.gz'));
  expect([...campaign.deviceCalibrations]).toEqual([['p', join(dir, 'calibrations/device-p.yaml')]]);
  expect([...campaign.walkerCalibrations]).toEqual([['w1', join(dir, 'calibrations/walker-w1.yaml')]]);
});

test("a survey in latitude and longitude is put into the grid; the height defaults to the origin's", () => {
  const grid = { origin: { latDeg: 48.8583, lonDeg: 2.2944, heightM: 35 }, rotationDeg: 30 };
  const dir = folderWith({
    ...LEAST,
    'campaign.yaml': YAML.replace(
      'grid: local',
      'grid: { origin: { lat_deg: 48.8583, lon_deg: 2.2944, height_m: 35 }, rotation_deg: 30 }',
    ),
    'survey.csv': 'checkpoint,lat_deg,lon_deg,height_m\nc1,48.8603,2.2974,\nc2,48.8603,2.2974,40\n',
  });
  const survey = readCampaign(dir).survey!;
  const c1 = gridFromGeodetic(48.8603, 2.2974, 35, grid);
  expect(survey.get('c1')).toMatchObject({ eastM: c1.eastM, northM: c1.northM, upM: null });
  // Five metres higher along almost the same vertical; tolerance: the verticals differ by 5e-5 rad.
  expect(survey.get('c2')!.upM! - c1.upM).toBeCloseTo(5, 6);
});

test('without a survey the passes stay, so that all but the score can run', () => {
  const dir = folderWith({ ...LEAST, 'passes.csv': 'walk,checkpoint,t_s\na1,c1,3\n' });
  expect(readCampaign(dir).passes).toHaveLength(1);
});

test('no folder, no campaign.yaml, no tables', async () => {
  const dir = folderWith({ 'x.csv': '' });
  const none = join(dir, 'none');
  expect(await messageFrom(() => readCampaign(none))).toBe(
    `${none}: there is no such folder; name a campaign folder`,
  );
  expect(await messageFrom(() => readCampaign(dir))).toBe(
    `${dir}: no campaign.yaml; a campaign folder holds campaign.yaml, walkers.csv, walks.csv and the logs`,
  );
  expect(await messageFrom(() => readCampaign(folderWith({ 'campaign.yaml': YAML })))).toBe(
    [
      'walkers.csv: missing; a campaign folder holds campaign.yaml, walkers.csv, walks.csv and the logs',
      'walks.csv: missing; a campaign folder holds campaign.yaml, walkers.csv, walks.csv and the logs',
    ].join('\n'),
  );
});

test('all problems of all files at once, each with its place', async () => {
  const problems = await problemsOf({
    'campaign.yaml': YAML.replace('unit: mps2', 'unit: G').replace('grid:', 'gird:'),
    'walkers.csv': 'walker,group,height_m\nw1,adult,175\nw1,,1.7\n',
    'walks.csv': 'walk,walker,log,layout\na1,W1,logs/a1.csv,recorder-a\n,w1,/logs/x.csv,\n',
    'survey.csv': 'checkpoint,east_m,north_m\nc1,0,zero\nc1,1,1\n',
    'passes.csv': 'walk,checkpoint,t_s,role\na1,c2,1,scored\na9,c1,noon,ancor\n',
  });
  expect(problems).toEqual([
    'campaign.yaml:7:43 layouts.recorder-a.accel.unit: got "G"; allowed: mps2, g. Did you mean "g"?',
    'campaign.yaml:2:1 gird: unknown key; allowed: name, grid, truth_time, layouts. Did you mean "grid"?',
    'survey.csv:2 north_m: must be a number (m), got "zero"',
    'survey.csv:3 checkpoint: "c1" is surveyed in line 2 already; keep one row',
    'walkers.csv:2 height_m: must be a number from 0.4 to 2.8 (m), got "175"',
    'walkers.csv:3 walker: "w1" is in line 2 already; keep one row a walker',
    'walkers.csv:3 group: is empty; it must be given',
    'walks.csv:2 walker: "W1" is not in walkers.csv; there are w1. Did you mean "w1"?',
    'walks.csv:3 walk: is empty; it must be given',
    'walks.csv:3 log: "/logs/x.csv" is an absolute path; use a path below the campaign folder',
    'passes.csv:2 checkpoint: "c2" is not in survey.csv; there are c1.',
    'passes.csv:3 walk: "a9" is not in walks.csv; there are a1.',
    'passes.csv:3 t_s: must be a number (s), got "noon"',
    'passes.csv:3 role: got "ancor"; allowed: anchor, scored. Did you mean "anchor"?',
  ]);
});

test.each([
  [
    'walks.csv',
    'walk,walker,log\na1,w1,x\na1,w1,x\n',
    'walks.csv:3 walk: "a1" is in line 2 already; each walk needs a name of its own',
  ],
  [
    'walks.csv',
    'walk,walker,log\na1,w1,x\nA1,w1,x\n',
    'walks.csv:3 walk: "A1" and "a1" (line 2) differ only in case; not every file system tells them apart',
  ],
  ['walks.csv', 'walk,walker,log\n..,w1,x\n', 'walks.csv:2 walk: ".." is not a folder name'],
  [
    'walks.csv',
    'walk,walker,log\na/b,w1,x\n',
    'walks.csv:2 walk: "a/b" has a slash; walks are folders in the results, so use letters, digits, - and _',
  ],
  [
    'walks.csv',
    'walk,walker,log\na\\b,w1,x\n',
    'walks.csv:2 walk: "a\\b" has a slash; walks are folders in the results, so use letters, digits, - and _',
  ],
  [
    'walks.csv',
    'walk,walker,log\n.a,w1,x\n',
    'walks.csv:2 walk: ".a" begins with a dot, which hides its results; use letters, digits, - and _',
  ],
  [
    'walks.csv',
    'walk,walker,log,layout\na1,w1,x,recorder-b\n',
    'walks.csv:2 layout: "recorder-b" is not in campaign.yaml\'s layouts; there are recorder-a. Did you mean "recorder-a"?',
  ],
  [
    'walks.csv',
    'walk,walker,log,steps\na1,w1,x,10.5\n',
    'walks.csv:2 steps: must be a whole number, got "10.5"',
  ],
  [
    'walks.csv',
    'walk,walker,log,start_heading_deg\na1,w1,x,north\n',
    'walks.csv:2 start_heading_deg: must be a number from -360 to 360 (degrees), got "north"',
  ],
  ['walks.csv', 'walk,walker,log\n', 'walks.csv: has no walk; give each recording a row'],
  [
    'walks.csv',
    '',
    'walks.csv:1 is empty; its first line must name the columns walk, walker, log\nwalks.csv: has no walk; give each recording a row',
  ],
  [
    'walks.csv',
    'walk,walker,log\na1,w1,x,y\n',
    'walks.csv:2 has 4 cells, the header has 3; quote cells that hold a comma\nwalks.csv: has no walk; give each recording a row',
  ],
  [
    'walks.csv',
    'walk,walker,Log\na1,w1,x\n',
    'walks.csv:1 no column "log"; it has walk, walker, Log. Did you mean "Log"?',
  ],
  ['walks.csv', 'walk,walker,log,Start\na1,w1,x,c\n', 'walks.csv:1 column "Start" must be written "start"'],
  ['walks.csv', 'walk,walker,log,log\na1,w1,x,x\n', 'walks.csv:1 column "log" is there twice; keep one'],
  ['walks.csv', 'walk,walker,log\n"a1,w1,x\n', 'walks.csv:2 a quote is opened and never closed'],
  ['walks.csv', new Uint8Array([0xff, 0xfe, 0x77]), 'walks.csv: is not UTF-8 text; save it as UTF-8'],
  ['walkers.csv.gz', gzipSync(WALKERS), 'walkers.csv: there is a walkers.csv.gz too; keep one of them'],
  [
    'survey.csv',
    'checkpoint,x,y\nc1,0,0\n',
    'survey.csv:1 must have either the columns east_m and north_m, or lat_deg and lon_deg',
  ],
  [
    'survey.csv',
    'checkpoint,lat_deg,lon_deg\nc1,0,0\n',
    'survey.csv:1 has lat_deg and lon_deg, but campaign.yaml gives no grid.origin to convert them with',
  ],
  [
    'survey.csv',
    'checkpoint,east_m,north_m,sigma_m\nc1,0,0,-1\n',
    'survey.csv:2 sigma_m: must be a number of at least 0 (m), got "-1"',
  ],
  ['survey.csv', 'checkpoint,east_m,north_m\nc1,,0\n', 'survey.csv:2 east_m: is empty; it must be given'],
  [
    'passes.csv',
    'walk,checkpoint,t_s\na1,c1,5\na1,c1,5.0\n',
    'passes.csv:3 t_s: the same pass is in line 2 already; keep one row',
  ],
  [
    'step-truth.csv',
    'walk,t_s\na3,5\n',
    'step-truth.csv:2 walk: "a3" is not in walks.csv; there are a1, a2.',
  ],
  ['path-truth/a12.csv', '', 'path-truth/a12.csv: walk "a12" is not in walks.csv. Did you mean "a1"?'],
])('%s: a problem is told in full (%#)', async (file, content, message) => {
  expect((await problemsOf({ [file]: content })).join('\n')).toBe(message);
});

test('start must be surveyed where there is a survey', async () => {
  const files = {
    'survey.csv': 'checkpoint,east_m,north_m\ndoor-1,0,0\n',
    'walks.csv': 'walk,walker,log,start\na1,w1,x,dor-1\n',
  };
  expect(await problemsOf(files)).toEqual([
    'walks.csv:2 start: "dor-1" is not in survey.csv; there are door-1. Did you mean "door-1"?',
  ]);
});

test('several layouts: each walk must name its own', async () => {
  const second = YAML.slice(YAML.indexOf('  recorder-a')).replace('recorder-a', 'recorder-b');
  expect((await problemsOf({ 'campaign.yaml': YAML + second }))[0]).toBe(
    'walks.csv:2 layout: must be given where campaign.yaml has several layouts: recorder-a, recorder-b',
  );
});

test('links of the campaign that lead out of it are refused', async () => {
  const outside = folderWith({ 'a1.csv': '', 'survey.csv': 'checkpoint,east_m,north_m\n' });
  const dir = folderWith(LEAST);
  mkdirSync(join(dir, 'logs'));
  symlinkSync(join(outside, 'a1.csv'), join(dir, 'logs/a1.csv'));
  symlinkSync(join(outside, 'survey.csv'), join(dir, 'survey.csv'));
  const end = 'is a link that leads out of the campaign folder; use a path below the campaign folder';
  expect(await messageFrom(() => readCampaign(dir))).toBe(
    `survey.csv: "survey.csv" ${end}\nwalks.csv:2 log: "logs/a1.csv" ${end}`,
  );
});

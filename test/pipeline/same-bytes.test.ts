import { createHash } from 'node:crypto';
import { readdirSync, readFileSync, rmSync, statSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { beforeAll, expect, test } from 'vitest';
import { runCampaign } from '../../src/pipeline.js';
import { readStored } from '../../src/tables/read.js';
import { smallCampaign } from '../small-campaign.js';
import { temporaryFolder } from '../temporary-folder.js';

let campaign: string;
beforeAll(async () => {
  campaign = await smallCampaign();
});

/** Hash of every file below a folder, by its path there. */
function hashes(dir: string): Record<string, string> {
  const out: Record<string, string> = {};
  for (const name of readdirSync(dir, { recursive: true }) as string[]) {
    const path = join(dir, name);
    if (statSync(path).isFile()) out[name] = createHash('sha256').update(readFileSync(path)).digest('hex');
  }
  return out;
}

/** What was written by the last run, walk by walk. */
const made = (run: Awaited<ReturnType<typeof runCampaign>>) => run.outcomes.map((outcome) => outcome.made);

test('one worker and several write the same bytes, wherever the results stand', async () => {
  const [one, several] = [join(temporaryFolder(), 'a'), join(temporaryFolder(), 'b')];
  await runCampaign(campaign, { out: one, jobs: 1 });
  await runCampaign(campaign, { out: several, jobs: 3 });
  const expected = hashes(one);
  expect(Object.keys(expected)).toContain(join('w01', 'path.arrow'));
  // The record names the campaign as seen from the results, which stand in two places.
  delete expected['run.json'];
  const found = hashes(several);
  delete found['run.json'];
  expect(found).toEqual(expected);
});

test('walks run one by one end in the same bytes as all at once', async () => {
  const [all, each] = [join(temporaryFolder(), 'a'), join(temporaryFolder(), 'a')];
  await runCampaign(campaign, { out: all, jobs: 1 });
  for (const walk of ['w03', 'w01', 'w02'])
    await runCampaign(campaign, { out: each, walks: [walk], jobs: 1 });
  const [expected, found] = [hashes(all), hashes(each)];
  for (const record of [expected, found]) delete record['run.json'];
  expect(found).toEqual(expected);
});

test('nothing runs twice; --again runs everything and writes the same', async () => {
  const out = join(temporaryFolder(), 'results');
  await runCampaign(campaign, { out, jobs: 1 });
  const before = hashes(out);
  expect(made(await runCampaign(campaign, { out, jobs: 1 }))).toEqual([[], [], []]);
  const again = await runCampaign(campaign, { out, jobs: 1, again: true });
  expect(again.outcomes[0]!.made).toContain('attitude');
  expect(hashes(out)).toEqual(before);
});

test('a setting of one stage runs that stage and those after it, nothing else', async () => {
  const folder = temporaryFolder();
  const out = join(folder, 'results');
  const recipe = join(folder, 'recipe.yaml');
  writeFileSync(recipe, 'name: first\n');
  await runCampaign(campaign, { out, jobs: 1, recipe });
  writeFileSync(recipe, 'name: first\npath: { anchors: all }\n');
  expect(made(await runCampaign(campaign, { out, jobs: 1, recipe }))).toEqual(
    Array.from({ length: 3 }, () => ['path', 'checkpoints']),
  );
});

test('a lost, damaged or foreign table is made anew', async () => {
  const out = join(temporaryFolder(), 'results');
  await runCampaign(campaign, { out, jobs: 1 });
  const before = hashes(out);
  rmSync(join(out, 'w01', 'steps.arrow'));
  writeFileSync(
    join(out, 'w02', 'motion.arrow'),
    readFileSync(join(out, 'w02', 'motion.arrow')).subarray(0, 999),
  );
  writeFileSync(join(out, 'w03', 'attitude.arrow'), readFileSync(join(out, 'w01', 'attitude.arrow')));
  const run = await runCampaign(campaign, { out, jobs: 1 });
  expect(made(run)).toEqual([['steps'], ['motion'], ['attitude']]);
  expect(hashes(out)).toEqual(before);
});

test('a changed log, survey point or walker changes what follows from it', async () => {
  const dir = await smallCampaign();
  const out = join(dir, 'results', 'default');
  await runCampaign(dir, { jobs: 1 });
  const edit = (name: string, change: (text: string) => string) =>
    writeFileSync(join(dir, name), change(readFileSync(join(dir, name), 'utf8')));
  edit('survey.csv', (text) => text.replace(/^C,([^,]*),/m, 'C,20,'));
  expect(made(await runCampaign(dir, { jobs: 1 }))).toEqual(
    Array.from({ length: 3 }, () => ['findings', 'checkpoints']),
  );
  edit('walkers.csv', (text) => text.replace(/^lou,old,[^,]*/m, 'lou,old,1.20'));
  expect(made(await runCampaign(dir, { jobs: 1 }))).toEqual([[], ['strides', 'path', 'checkpoints'], []]);
  edit(join('logs', 'w03.csv'), (text) => text.slice(0, text.lastIndexOf('\n', text.length - 2) + 1));
  const [, , changed] = made(await runCampaign(dir, { jobs: 1 }));
  expect(changed).toEqual(expect.arrayContaining(['readings-accel', 'motion', 'attitude', 'path']));
  expect(readStored(join(out, 'w03', 'path.arrow')).metadata['treadline.stage']).toBe('path');
});

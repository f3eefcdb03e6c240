import { existsSync, readFileSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { beforeAll, expect, test } from 'vitest';
import { smallCampaign } from '../small-campaign.js';
import { temporaryFolder } from '../temporary-folder.js';
import { runCli } from './run-cli.js';

let campaign: string;
let results: string;
beforeAll(async () => {
  campaign = await smallCampaign();
  results = join(campaign, 'results', 'default');
  expect(await runCli('run', campaign, '--jobs', '1')).toMatchObject({ code: 0 });
});

test('run prints groups to standard output and what it did to standard error', async () => {
  const { code, out, err } = await runCli('run', campaign, '--jobs', '1');
  expect(code).toBe(0);
  expect(out).toContain('small trial (invented), recipe default');
  expect(out).toMatch(/^group +old +1 +1 /m);
  expect(err).toMatch(/^3 walks, 0 tables written, \d+ up to date, in /m);
});

test('--quiet leaves only data, --json only JSON', async () => {
  expect((await runCli('run', campaign, '--quiet', '--jobs', '1')).err).toBe('');
  const { out } = await runCli('score', results, '--json');
  const read = JSON.parse(out);
  expect(read.walk_scores).toHaveLength(3);
  expect(read.walk_scores[0]).toMatchObject({ walk: 'w01', walker: 'kim', group: 'young', scored: 2 });
  expect(read.group_scores[0]).toMatchObject({ by: 'all', value: 'all', walkers: 2, walks: 3 });
});

test('score prints every walk', async () => {
  const { out } = await runCli('score', results);
  for (const walk of ['w01', 'w02', 'w03']) expect(out).toMatch(new RegExp(`^${walk} `, 'm'));
});

test('show tells what made a table, and filters', async () => {
  const path = join(results, 'w01', 'checkpoints.arrow');
  const { out } = await runCli('show', path, '--where', 'd.role == "scored"');
  expect(out).toContain('at-pass-times');
  expect(out).toMatch(/^true_east_m +f64 +m /m);
  expect(out).toMatch(/2 rows of 3 that hold/);
  const wrong = await runCli('show', path, '--where', 'd.eror_m > 3');
  expect(wrong.code).toBe(2);
  expect(wrong.err).toMatch(/^--where d\.eror_m > 3: .*columns are checkpoint, t_s/);
});

test('show writes CSV that a spreadsheet can open without running anything', async () => {
  const hostile = await smallCampaign((plan) => plan.replaceAll('kim', "'=1+1'"));
  await runCli('run', hostile, '--jobs', '1', '--upto', 'steps');
  const csv = join(temporaryFolder(), 'scores.csv');
  await runCli('show', join(hostile, 'results', 'default', 'walk-scores.arrow'), '--csv', csv);
  expect(readFileSync(csv, 'utf8')).toContain('w01,"\'=1+1",young');
});

test('run --upto and --walk do no more than asked', async () => {
  const out = join(temporaryFolder(), 'results');
  await runCli('run', campaign, '--out', out, '--walk', 'w02', '--upto', 'motion', '--jobs', '1');
  expect(existsSync(join(out, 'w02', 'motion.arrow'))).toBe(true);
  expect(existsSync(join(out, 'w02', 'attitude.arrow'))).toBe(false);
  expect(existsSync(join(out, 'w01'))).toBe(false);
});

test('names that are not there are refused with a near one', async () => {
  expect((await runCli('run', campaign, '--upto', 'stps')).err).toMatch(/Did you mean "steps"\?/);
  expect((await runCli('run', campaign, '--recipe', 'fast')).err).toMatch(/^--recipe fast: no such file/);
  expect((await runCli('run', campaign, '--walk', 'w09')).err).toMatch(/^--walk w09: not in walks\.csv/);
  expect((await runCli('run', campaign, '--jobs', '0')).err).toMatch(/^--jobs must be a whole number from 1/);
});

test('the demo refuses a folder that holds something else', async () => {
  expect(await runCli('demo', campaign)).toMatchObject({
    code: 2,
    err: expect.stringMatching(/holds something other than the demo/),
  });
});

test('compare: verdict, table, what the recipes differ in, gates and their exit code', async () => {
  const recipe = join(temporaryFolder(), 'plain.yaml');
  writeFileSync(recipe, 'name: plain\nheadings: { method: device-axis }\n');
  const plain = join(temporaryFolder(), 'plain');
  await runCli('run', campaign, '--recipe', recipe, '--out', plain, '--jobs', '1', '--quiet');
  const { code, out } = await runCli('compare', plain, results, '--gate', 'p95 <= 50 m');
  expect(code).toBe(0);
  expect(out).toMatch(/^b is (better|worse) by .* with 2 walkers that cannot be told from luck\n/);
  expect(out).toContain('headings.method ("device-axis" to "tracked-offset")');
  expect(out).toMatch(/^holds {2}p95 <= 50 m/m);
  expect(await runCli('compare', plain, results, '--gate', 'p95 <= 0.001 m')).toMatchObject({ code: 1 });
  expect(await runCli('compare', plain, results, '--gate', 'p95 is good')).toMatchObject({ code: 2 });
});

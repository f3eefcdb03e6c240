import { cpSync, existsSync, readFileSync, rmSync, truncateSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { gzipSync } from 'node:zlib';
import { beforeAll, expect, test } from 'vitest';
import { smallCampaign } from '../small-campaign.js';
import { temporaryFolder } from '../temporary-folder.js';
import { runCli } from './run-cli.js';

let good: string;
beforeAll(async () => {
  good = await smallCampaign();
});

/** A copy of the good campaign with something broken in it. */
function broken(breakIt: (dir: string) => void): string {
  const dir = join(temporaryFolder(), 'campaign');
  cpSync(good, dir, { recursive: true });
  breakIt(dir);
  return dir;
}

const LOG = join('logs', 'w02.csv');
const edit = (path: string, change: (text: string) => string) =>
  writeFileSync(path, change(readFileSync(path, 'utf8')));

const ONE_WALK_BAD: [string, (dir: string) => void, RegExp][] = [
  ['a missing log', (dir) => rmSync(join(dir, LOG)), /logs\/w02\.csv.*no such file/],
  ['an empty log', (dir) => writeFileSync(join(dir, LOG), ''), /logs\/w02\.csv.*empty/],
  [
    'a log with a header only',
    (dir) => edit(join(dir, LOG), (text) => text.slice(0, text.indexOf('\n') + 1)),
    /logs\/w02\.csv: no accelerometer readings/,
  ],
  [
    'an unknown column',
    (dir) => edit(join(dir, LOG), (text) => text.replace(/^[^\n]*/, (head) => head.replace('ax', 'accel-x'))),
    /logs\/w02\.csv.*no column "ax".*accel-x/,
  ],
  [
    'text in a number column',
    (dir) =>
      edit(join(dir, LOG), (text) => {
        const lines = text.split('\n');
        lines[10] = lines[10]!.replace(/,[^,]*/, ',fast');
        return lines.join('\n');
      }),
    /logs\/w02\.csv row 11 column ax: "fast" is not a number/,
  ],
  [
    'a truncated gzip',
    (dir) => {
      const path = join(dir, LOG);
      writeFileSync(path, gzipSync(readFileSync(path)));
      truncateSync(path, 5000);
    },
    /logs\/w02\.csv.*(cut off|truncated|gzip)/,
  ],
];

test.each(ONE_WALK_BAD)(
  '%s: one clear line, the other walks finish, exit code 1',
  async (_what, breakIt, line) => {
    const dir = broken(breakIt);
    const { code, out, err } = await runCli('run', dir, '--jobs', '1', '--quiet');
    expect(err.trimEnd().split('\n')).toEqual([expect.stringMatching(line)]);
    expect(err).toMatch(/^failed w02: /);
    expect(code).toBe(1);
    expect(out).toMatch(/^all +all +1 +2 /m);
  },
);

test('passes outside the log: a finding that says so, the path stands, exit code 1', async () => {
  const dir = broken((path) =>
    edit(join(path, 'passes.csv'), (text) =>
      text.replaceAll(/^(w02,[^,]*),[^,]*/gm, (_, head: string) => `${head},9999`),
    ),
  );
  const { code, err } = await runCli('run', dir, '--jobs', '1', '--quiet');
  expect(err).toMatch(/^fail w02: pass of checkpoint B lies 9\d+\.\d s after the log ends: .*truth_time/m);
  expect(code).toBe(1);
});

test('no accelerometer in a log', async () => {
  const dir = broken((path) =>
    edit(join(path, 'campaign.yaml'), (text) => text.replace(/^ {4}accel:[\s\S]*?(?=^ {4}\S)/m, '')),
  );
  const { code, err } = await runCli('run', dir, '--jobs', '1', '--quiet');
  expect(err).toMatch(/accelerometer|accel/);
  expect(code).toBe(2);
});

test('no walk can be processed: exit code 2', async () => {
  const dir = broken((path) => {
    for (const walk of ['w01', 'w02', 'w03']) writeFileSync(join(path, 'logs', `${walk}.csv`), '');
  });
  const { code, err } = await runCli('run', dir, '--jobs', '1', '--quiet');
  expect(err.trimEnd().split('\n')).toHaveLength(3);
  expect(code).toBe(2);
});

test('accelerometer only: steps and strides, and what is left out with the reason', async () => {
  const dir = await smallCampaign((plan) =>
    plan.replace('rate_hz: 50', 'shape: tagged, rate_hz: { accel: 50 }'),
  );
  const { code, out, err } = await runCli('run', dir, '--jobs', '1');
  expect(code).toBe(0);
  expect(err).toMatch(
    /^left out attitude, headings, path, checkpoints \(all 3 walks\): the log has no gyroscope.*$/m,
  );
  expect(out).toMatch(/^all +all +2 +3 +–/m);
});

test('without a survey: a path and no score, and the reason', async () => {
  const dir = broken((path) => {
    rmSync(join(path, 'survey.csv'));
    rmSync(join(path, 'passes.csv'));
    edit(join(path, 'walks.csv'), (text) => text.replaceAll(',A,', ',,'));
  });
  const { code, err } = await runCli('run', dir, '--jobs', '1');
  expect(code).toBe(0);
  expect(err).toMatch(/^left out checkpoints \(all 3 walks\): .*survey/m);
  expect(existsSync(join(dir, 'results', 'default', 'w01', 'path.arrow'))).toBe(true);
});

import { cpSync, readFileSync } from 'node:fs';
import { join } from 'node:path';
import { afterAll, beforeAll, expect, test } from 'vitest';
import { runCli } from './cli/run-cli.js';
import { temporaryFolder } from './temporary-folder.js';

const README = readFileSync(join(import.meta.dirname, '../README.md'), 'utf8');

/** The README's console blocks: command lines after `$ `, each with what it prints. */
const COMMANDS = [...README.matchAll(/^```console\n([\s\S]*?)^```$/gm)].flatMap(([, block]) =>
  block!
    .split(/^\$ /m)
    .slice(1)
    .map((entry) => {
      const end = entry.indexOf('\n');
      return { line: entry.slice(0, end), printed: entry.slice(end + 1) };
    }),
);

/** Words of a command line; quotes keep blanks. */
function wordsOf(line: string): string[] {
  return [...line.matchAll(/'([^']*)'|(\S+)/g)].map(([, quoted, plain]) => quoted ?? plain!);
}

const before = process.cwd();
beforeAll(() => {
  process.chdir(temporaryFolder());
  cpSync(join(import.meta.dirname, '../data-demo'), 'data-demo', { recursive: true });
});
afterAll(() => process.chdir(before));

test('the README has an example of every command', async () => {
  const { out } = await runCli('--help');
  const commands = [...out.matchAll(/^ {2}treadline (\S+)/gm)].map(([, name]) => name!);
  const shown = new Set(COMMANDS.map(({ line }) => wordsOf(line)[1]));
  expect(commands.filter((name) => !shown.has(name))).toEqual([]);
});

test('every example of the README prints what the README shows', async () => {
  for (const { line, printed } of COMMANDS) {
    const { out, err } = await runCli(...wordsOf(line).slice(1));
    const lines = printed.split('\n');
    const cut = lines.indexOf('...');
    const got = `${out}${err}`.replaceAll(process.cwd(), '.').split('\n');
    // "..." stands for the lines between its neighbours.
    if (cut < 0) expect(got, line).toEqual(lines);
    else {
      const tail = lines.slice(cut + 1);
      expect(got.slice(0, cut), line).toEqual(lines.slice(0, cut));
      expect(got.slice(got.length - tail.length), line).toEqual(tail);
    }
  }
});

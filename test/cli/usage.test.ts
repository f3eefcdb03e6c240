import { expect, test } from 'vitest';
import { runCli } from './run-cli.js';

test.each([
  [[], /^Name a command; "treadline --help" lists them\.\n$/],
  [['rum', 'x'], /^rum: no such command; must be one of demo, .*\. Did you mean "run"\?\n$/],
  [['run'], /^Not enough non-option arguments: got 0, need at least 1\n$/],
  [['run', 'x', '--jbos', '2'], /^--jbos: no such option here; .* Did you mean "jobs"\?\n$/],
  [['run', '/nowhere/at-all'], /^\/nowhere\/at-all.*no such folder.*\n$/],
  [['score', '/nowhere/at-all'], /^\/nowhere\/at-all: not a results folder .*\n$/],
  [['show', '/nowhere/t.arrow'], /^\/nowhere\/t\.arrow: no such file\n$/],
  [['simulate', '/nowhere/plan.yaml', '-o', '/nowhere/else'], /^\/nowhere\/plan\.yaml.*\n$/],
])('%j is refused with one line and exit code 2', async (args, line) => {
  const { code, out, err } = await runCli(...args);
  expect(err).toMatch(line);
  expect({ code, out }).toEqual({ code: 2, out: '' });
});

test('help lists every command, and each command has help with an example', async () => {
  const help = await runCli('--help');
  expect(help.code).toBe(0);
  const commands = [...help.out.matchAll(/^ {2}treadline (\S+)/gm)].map(([, name]) => name!);
  expect(commands).toContain('run');
  for (const command of commands) {
    const { code, out } = await runCli(command, '--help');
    expect(code).toBe(0);
    expect(out).toContain('Examples:');
    expect(out).toContain('--json');
  }
});

test('the version is the package’s', async () => {
  const { out } = await runCli('--version');
  expect(out).toMatch(/^\d+\.\d+\.\d+\n$/);
});

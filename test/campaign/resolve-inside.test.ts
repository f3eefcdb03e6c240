import { mkdirSync, symlinkSync } from 'node:fs';
import { join } from 'node:path';
import { expect, test } from 'vitest';
import { resolveInside } from '../../src/campaign/resolve-inside.js';
import { folderWith } from './folder.js';

test('resolveInside: a path below the folder, there or not', () => {
  const dir = folderWith({ 'logs/a.csv': '' });
  expect(resolveInside(dir, 'logs/a.csv', 'x')).toBe(join(dir, 'logs/a.csv'));
  expect(resolveInside(dir, 'logs/./none/b..csv', 'x')).toBe(join(dir, 'logs/none/b..csv'));
});

test('resolveInside: refuses absolute paths, climbing, and links that lead out', () => {
  const outside = folderWith({ 'secret.csv': '' });
  const dir = folderWith({ 'logs/a.csv': '' });
  symlinkSync(outside, join(dir, 'out'));
  symlinkSync(join(dir, 'logs'), join(dir, 'in'));
  const end = '; use a path below the campaign folder';
  expect(() => resolveInside(dir, '/etc/passwd', 'walks.csv:2 log')).toThrow(
    `walks.csv:2 log: "/etc/passwd" is an absolute path${end}`,
  );
  expect(() => resolveInside(dir, 'C:\\x.csv', 'log')).toThrow(`log: "C:\\x.csv" is an absolute path${end}`);
  expect(() => resolveInside(dir, 'logs/../../a', 'log')).toThrow(
    `log: "logs/../../a" climbs out with ".."${end}`,
  );
  expect(() => resolveInside(dir, 'out/secret.csv', 'log')).toThrow(
    `log: "out/secret.csv" is a link that leads out of the campaign folder${end}`,
  );
  expect(() => resolveInside(dir, 'out/none.csv', 'log')).toThrow('is a link that leads out');
  expect(resolveInside(dir, 'in/a.csv', 'log')).toBe(join(dir, 'in/a.csv'));
});

test('resolveInside: a campaign that is itself reached through a link is fine', () => {
  const real = folderWith({ 'logs/a.csv': '' });
  const home = folderWith({});
  mkdirSync(join(home, 'x'));
  symlinkSync(real, join(home, 'x/campaign'));
  expect(resolveInside(join(home, 'x/campaign'), 'logs/a.csv', 'log')).toBe(
    join(home, 'x/campaign/logs/a.csv'),
  );
});

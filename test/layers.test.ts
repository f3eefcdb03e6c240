import { readdirSync, readFileSync } from 'node:fs';
import { dirname, join, normalize, relative, sep } from 'node:path';
import { fileURLToPath } from 'node:url';
import { expect, test } from 'vitest';

const SRC = fileURLToPath(new URL('../src', import.meta.url));

/** What each layer may import besides itself; files right under src are layers of their own name. */
const MAY_IMPORT: Readonly<Record<string, readonly string[]>> = {
  'errors.ts': [],
  'version.ts': [],
  stats: ['errors.ts'],
  signal: ['errors.ts', 'stats'],
  geometry: ['errors.ts', 'stats'],
  tables: ['errors.ts', 'version.ts'],
  campaign: ['errors.ts', 'tables', 'geometry', 'signal', 'stats', 'stages'],
  stages: ['errors.ts', 'signal', 'geometry', 'stats', 'tables', 'campaign'],
  calibration: ['errors.ts', 'signal', 'stats'],
  report: ['errors.ts', 'stats', 'tables'],
  scores: ['errors.ts', 'signal', 'geometry', 'stats', 'tables', 'campaign', 'stages'],
  simulate: ['errors.ts', 'geometry', 'signal', 'stats', 'tables', 'campaign'],
};
const TOP = ['pipeline', 'pipeline.ts', 'demo.ts', 'cli', 'index.ts'];

/** Parts of a layer that others may see although the layer as a whole is closed to them. */
const TYPES_ONLY: Readonly<Record<string, readonly string[]>> = {
  // Plain data: what a stage knows of a walk, and what a stage is.
  stages: ['campaign/context.ts'],
  campaign: ['stages/stage.ts'],
};

interface Import {
  from: string;
  to: string;
}

const files = (readdirSync(SRC, { recursive: true }) as string[]).filter((name) => name.endsWith('.ts'));

/** A file's imports of other files; statements that begin as `except` are left out. */
function importsOf(file: string, except: RegExp | null = null): Import[] {
  const statements = readFileSync(join(SRC, file), 'utf8').split(/;\n/);
  const text = statements.filter((statement) => !except?.test(statement)).join(';\n');
  return [...text.matchAll(/(?:from|import)\s*\(?\s*'(\.[^']+)'/g)].map(([, target]) => ({
    from: file,
    to: relative(SRC, normalize(join(SRC, dirname(file), target!))).replace(/\.js$/, '.ts'),
  }));
}

const layerOf = (file: string) => file.split(sep)[0]!;
const imports = files.flatMap((file) => importsOf(file));

test('every layer is named here', () => {
  const known = new Set([...Object.keys(MAY_IMPORT), ...TOP]);
  const own = new Set(files.map(layerOf).filter((layer) => !known.has(layer)));
  expect([...own]).toEqual([]);
  expect(imports.length).toBeGreaterThan(300);
});

test('imports point one way', () => {
  const wrong = imports.filter(({ from, to }) => {
    const [a, b] = [layerOf(from), layerOf(to)];
    if (a === b || TOP.includes(a)) return false;
    const only = TYPES_ONLY[a]?.find((file) => layerOf(file) === b);
    return only ? to !== only : !MAY_IMPORT[a]?.includes(b);
  });
  expect(wrong).toEqual([]);
});

test('nothing below the command line imports it', () => {
  expect(imports.filter(({ from, to }) => layerOf(to) === 'cli' && layerOf(from) !== 'cli')).toEqual([]);
});

test('only tables/ knows Arrow, only tables/, campaign/ and what stands above them touch the disk', () => {
  const uses = (pattern: RegExp) =>
    files.filter((file) => pattern.test(readFileSync(join(SRC, file), 'utf8')));
  expect(
    uses(/from 'apache-arrow'/).filter((file) => !['tables', 'campaign'].includes(layerOf(file))),
  ).toEqual([]);
  const closed = ['stages', 'scores', 'signal', 'geometry', 'stats'];
  expect(
    uses(/from 'node:(fs|http|child_process|os)/).filter((file) => closed.includes(layerOf(file))),
  ).toEqual([]);
});

test('no cycles', () => {
  const next = new Map<string, string[]>();
  // Types are gone when the program runs.
  for (const { from, to } of files.flatMap((file) => importsOf(file, /^(import|export) type /m)))
    next.set(from, [...(next.get(from) ?? []), to]);
  const done = new Set<string>();
  const cycles: string[] = [];
  const visit = (file: string, path: string[]): void => {
    if (path.includes(file)) {
      cycles.push([...path.slice(path.indexOf(file)), file].join(' > '));
      return;
    }
    if (done.has(file)) return;
    for (const to of next.get(file) ?? []) visit(to, [...path, file]);
    done.add(file);
  };
  for (const file of files) visit(file, []);
  expect(cycles).toEqual([]);
});

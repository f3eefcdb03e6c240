import { join } from 'node:path';
import { gzipSync } from 'node:zlib';
import { expect, test } from 'vitest';
import { readAttitudeTruth } from '../../src/campaign/attitude-truth.js';
import { readPathTruth } from '../../src/campaign/path-truth.js';
import { folderWith, messageFrom } from './folder.js';

const f64 = (...values: number[]) => Float64Array.from(values);
const file = (content: string | Uint8Array) => join(folderWith({ 'a1.csv': content }), 'a1.csv');

test('attitude truth: normalised, qw not negative, rows without sight left out, other columns passed over', async () => {
  const path = file(
    't_s,qw,qx,qy,qz,note,moving\n0,1,0,0,0,,0\n0.5,-0.6,0.8,0,0,x,1\n1,NaN,NaN,NaN,NaN,,1\n1.5,1.002,0,0,0,,1\n',
  );
  const truth = await readAttitudeTruth(path);
  expect(truth.t_s).toEqual(f64(0, 0.5, 1.5));
  expect(truth.qw).toEqual(f64(1, 0.6, 1));
  expect(truth.qx).toEqual(f64(0, -0.8, 0));
  expect(truth.moving).toEqual(f64(0, 1, 1));
  expect((await readAttitudeTruth(file('t_s,qw,qx,qy,qz\n0,1,0,0,0\n'))).moving).toBeUndefined();
});

test("path truth on the log's clock: gzipped, exact from epoch stamps, up where the file has it", async () => {
  const path = file(gzipSync('t_s,east_m,north_m,up_m\n1574570929.6,1,2,\n1574570930.727,3,-4.5,0.25\n'));
  const clock = { truthTime: 'log', t0: { value: '1574570929727', unit: 'ms' } } as const;
  const truth = await readPathTruth(path, clock);
  // By hand: 929.6 - 929.727 and 930.727 - 929.727.
  expect(truth.t_s).toEqual(f64(-0.127, 1));
  expect(truth.north_m).toEqual(f64(2, -4.5));
  expect(truth.up_m).toEqual(f64(Number.NaN, 0.25));
  expect((await readPathTruth(path, { ...clock, truthTime: 'relative' })).t_s[0]).toBe(1574570929.6);
});

test('a truth of many rows keeps them all', async () => {
  const n = 20_000;
  const truth = await readPathTruth(
    file(`t_s,east_m,north_m\n${Array.from({ length: n }, (_, i) => `${i},${i},0`).join('\n')}`),
  );
  expect(truth.east_m).toEqual(Float64Array.from({ length: n }, (_, i) => i));
});

test.each([
  ['', 'a1.csv: has no row with all of t_s, east_m, north_m'],
  ['t_s,east_m,north_m\n', 'a1.csv: has no row with all of t_s, east_m, north_m'],
  [
    't_s,east,north_m\n0,0,0\n',
    'a1.csv: no column "east_m"; it has t_s, east, north_m. Did you mean "east"?',
  ],
  ['t_s,east_m,north_m\n0,0,zero\n', 'a1.csv row 2 column north_m: "zero" is not a number'],
  ['t_s,east_m,north_m\nnoon,0,0\n', 'a1.csv row 2 column t_s: "noon" is not a number'],
  ['t_s,east_m,north_m\n0,0\n', "a1.csv row 2: has 2 fields, the header's columns need 3"],
  [
    't_s,east_m,north_m\n1,0,0\n1.0,0,0\n',
    'a1.csv row 3 column t_s: 1.0 is not later than the row before; sort the rows, keep one a time',
  ],
])('path truth: %j', async (text, message) => {
  expect(await messageFrom(() => readPathTruth(file(text)))).toBe(message);
});

test('attitude truth: what is no rotation is refused', async () => {
  expect(await messageFrom(() => readAttitudeTruth(file('t_s,qw,qx,qy,qz\n2.5,0.5,0,0,0\n')))).toBe(
    'a1.csv at t_s 2.5: qw, qx, qy, qz have the norm 0.5; a rotation has 1',
  );
});

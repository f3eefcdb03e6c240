import { createHash } from 'node:crypto';
import { gzipSync } from 'node:zlib';
import { expect, test } from 'vitest';
import { hashLog, readLog } from '../../../src/campaign/read-log.js';
import { folderWith } from '../folder.js';
import { layoutFrom, NUMBERED, readText, TAGGED, WIDE, walkOf } from './layouts.js';

const f64 = (...values: number[]) => Float64Array.from(values);

test('wide: a row a sample, other columns passed over, digest of the bytes as stored', async () => {
  const text =
    'note,t,ax,ay,az,gx,gy,gz\nhi,1574570929727,1,2,3,.1,.2,.3\n,1574570929747,4,5,6,4e-1,5E-1,+0.6\n';
  const log = await readText(text, WIDE);
  expect(log).toEqual({
    t0: { value: '1574570929727', unit: 'ms' },
    accel: { t_s: f64(0, 0.02), x_mps2: f64(1, 4), y_mps2: f64(2, 5), z_mps2: f64(3, 6) },
    gyro: { t_s: f64(0, 0.02), x_radps: f64(0.1, 0.4), y_radps: f64(0.2, 0.5), z_radps: f64(0.3, 0.6) },
    mag: null,
    baro: null,
    counts: {
      accel: { rows: 2, outOfOrder: 0, duplicateTimes: 0, missing: 0 },
      gyro: { rows: 2, outOfOrder: 0, duplicateTimes: 0, missing: 0 },
    },
    sha256: createHash('sha256').update(text).digest('hex'),
    skippedRows: 0,
  });
});

test('wide: an empty sensor is no reading; part of one, or NaN, is a missing one', async () => {
  const rows = [
    '0,1,2,3,,,', // no gyroscope reading
    '10,1,2,3,1,,3', // a gyroscope reading that lacks an axis
    '20,NaN,nan,NAN,1,2,3', // an accelerometer reading that was written as not a number
    ',1,2,3,,,', // a time missing
    '40,1,2,3,null,NA,N/A',
    '50,4,5,6,7,8,9',
  ];
  const log = await readText(`t,ax,ay,az,gx,gy,gz\n${rows.join('\n')}`, WIDE);
  expect(log.accel?.t_s).toEqual(f64(0, 0.01, 0.04, 0.05));
  expect(log.gyro?.t_s).toEqual(f64(0.02, 0.05));
  expect(log.counts.accel).toEqual({ rows: 4, outOfOrder: 0, duplicateTimes: 0, missing: 2 });
  expect(log.counts.gyro).toEqual({ rows: 2, outOfOrder: 0, duplicateTimes: 0, missing: 2 });
});

test('times start at the earliest reading of any sensor, not at an earlier row without one', async () => {
  const log = await readText('t,ax,ay,az,gx,gy,gz\n5,,,,,,\n20,1,2,3,,,\n10,,,,7,8,9\n', WIDE);
  expect(log.t0).toEqual({ value: '10', unit: 'ms' });
  expect(log.accel?.t_s).toEqual(f64(0.01));
  expect(log.gyro?.t_s).toEqual(f64(0));
});

test("disorder is sorted, equal times keep the file's order, both are counted", async () => {
  const log = await readText('0.3,3,0,0\n0.1,1,0,0\n0.2,2,0,0\n0.1,11,0,0\n0.10,12,0,0\n', NUMBERED);
  expect(log.accel?.t_s).toEqual(f64(0, 0, 0, 0.1, 0.2));
  expect(log.accel?.x_mps2).toEqual(f64(1, 11, 12, 2, 3));
  expect(log.counts.accel).toEqual({ rows: 5, outOfOrder: 2, duplicateTimes: 2, missing: 0 });
  expect(log.t0).toEqual({ value: '0.1', unit: 's' });
});

test('tagged: rows of no sensor in the layout are passed over, whatever they hold, and counted', async () => {
  const text = 't,sensor,x,y,z\n0,acc,1,2,3\n1,wifi,"a, b"\n2,bar,1013.25,,\n3,acc,4,5,6\n4,bar,\n5,acc,,,\n';
  const log = await readText(text, TAGGED);
  expect(log.accel?.x_mps2).toEqual(f64(1, 4));
  expect(log.baro).toEqual({ t_s: f64(0.002), p_hPa: f64(1013.25) });
  expect(log.counts.accel?.missing).toBe(1);
  expect(log.counts.baro?.missing).toBe(1);
  expect(log.skippedRows).toBe(1);
});

test('split: a file a sensor, each with its own time; the digest runs over the files by name', async () => {
  const layout = layoutFrom(
    '{ shape: split, time: { column: t, unit: ns }, accel: { file: b.csv, columns: [x, y, z], unit: mps2 }, ' +
      'gyro: { file: a.csv.gz, columns: [x, y, z], unit: radps, time: { column: ms, unit: ms } } }',
  );
  const accel = 't,x,y,z\n1700000000005000000,1,2,3\n';
  const gyro = gzipSync('ms,x,y,z\n1700000000004.5,4,5,6\n');
  const dir = folderWith({ 'logs/a1/b.csv': accel, 'logs/a1/a.csv.gz': gyro });
  const log = await readLog(dir, walkOf('logs/a1/'), layout);
  expect(log.t0).toEqual({ value: '1700000000004.5', unit: 'ms' });
  expect(log.accel?.t_s).toEqual(f64(0.0005));
  expect(log.gyro?.z_radps).toEqual(f64(6));
  expect(log.sha256).toBe(createHash('sha256').update(gyro).update(accel).digest('hex'));
  expect(await hashLog(dir, walkOf('logs/a1'), layout)).toBe(log.sha256);
});

test("units, sign and axes are the device's after import", async () => {
  const layout = layoutFrom(
    '{ shape: wide, time: { column: 1, unit: us }, accel: { columns: [2, 3, 4], unit: g, sign: gravity-directed }, ' +
      'gyro: { columns: [5, 6, 7], unit: degps }, mag: { columns: [8, 9, 10], unit: nT }, baro: { columns: [11], unit: Pa }, axes: [-y, x, z] }',
  );
  const log = await readText('0,0,0.5,-1,180,90,-90,1000,2000,48300,101325\n', layout);
  // By hand: a gravity-directed reading of -1 g on z is specific force +9.80665 m/s² (1 g, exact by definition).
  expect(log.accel).toEqual({ t_s: f64(0), x_mps2: f64(4.903325), y_mps2: f64(0), z_mps2: f64(9.80665) });
  expect(log.gyro).toEqual({
    t_s: f64(0),
    x_radps: f64(-Math.PI / 2),
    y_radps: f64(Math.PI),
    z_radps: f64(-Math.PI / 2),
  });
  expect(log.mag).toEqual({ t_s: f64(0), x_uT: f64(-2), y_uT: f64(1), z_uT: f64(48.3) });
  expect(log.baro?.p_hPa).toEqual(f64(1013.25));
});

test.each([
  ['mT', 0.05, 50],
  ['gauss', 0.5, 50],
  ['uT', 50, 50],
])('magnetometer in %s', async (unit, written, uT) => {
  const layout = layoutFrom(
    `{ shape: wide, time: { column: 1, unit: s }, accel: { columns: [2, 3, 4], unit: mps2 }, mag: { columns: [5, 6, 7], unit: ${unit} } }`,
  );
  const log = await readText(`0,0,0,9.8,${written},0,0\n`, layout);
  expect(log.mag?.x_uT[0]).toBe(uT);
});

test('barometer in kPa', async () => {
  const layout = layoutFrom(
    '{ shape: wide, time: { column: 1, unit: s }, accel: { columns: [2, 3, 4], unit: mps2 }, baro: { columns: [5], unit: kPa } }',
  );
  expect((await readText('0,0,0,9.8,101.5\n', layout)).baro?.p_hPa[0]).toBe(1015);
});

test.each([
  ['semicolons and decimal commas', 'sep;t;ax;ay;az;gx;gy;gz\n;0;1,5;2;3;4;5;6\n;20,5;1;2;3;4;5;-6,25\n'],
  [
    'tabs and Windows line ends',
    'sep\tt\tax\tay\taz\tgx\tgy\tgz\r\n\t0\t1.5\t2\t3\t4\t5\t6\r\n\t20.5\t1\t2\t3\t4\t5\t-6.25\r\n',
  ],
  [
    'bars and blanks around them',
    'sep | t | ax | ay | az | gx | gy | gz\n | 0 | 1.5 | 2|3|4|5| 6 \n|20.5|1|2|3|4|5|-6.25',
  ],
  ['runs of blanks', '  t    ax ay az gx gy gz  \n  0  1.5 2 3 4 5 6\n20.5 1   2 3 4 5 -6.25 \n'],
  [
    'a byte order mark and blank lines',
    '\uFEFFt,ax,ay,az,gx,gy,gz\n\n0,1.5,2,3,4,5,6\n\n20.5,1,2,3,4,5,-6.25\n\n',
  ],
  [
    'everything in quotes',
    '"t","ax","ay","az","gx","gy","gz"\n"0","1.5","2","3","4","5","6"\n"20.5","1","2","3","4","5","-6.25"\n',
  ],
])('CSV with %s', async (_, text) => {
  const log = await readText(text, WIDE);
  expect(log.accel?.t_s).toEqual(f64(0, 0.0205));
  expect(log.accel?.x_mps2).toEqual(f64(1.5, 1));
  expect(log.gyro?.z_radps).toEqual(f64(6, -6.25));
});

test('a start stamp with a decimal comma is kept with a point', async () => {
  expect((await readText('t;ax;ay;az;gx;gy;gz\n0,25;1;2;3;4;5;6\n', WIDE)).t0.value).toBe('0.25');
});

test('columns by number: a header is passed over, and needed nowhere', async () => {
  const rows = '0.5,1,2,3\n1.5,4,5,6\n';
  const plain = await readText(rows, NUMBERED);
  expect(plain.accel?.x_mps2).toEqual(f64(1, 4));
  for (const header of ['t,ax,ay,az\n', ',0,1,two\n'])
    expect((await readText(header + rows, NUMBERED)).accel).toEqual(plain.accel);
  // A first line of numbers is a header only where the layout says so.
  expect((await readText(rows, { ...NUMBERED, header: true })).accel?.x_mps2).toEqual(f64(4));
});

test('nanosecond epochs beyond 2^53 lose nothing', async () => {
  const layout = { ...NUMBERED, time: { column: 1, unit: 'ns' } } as const;
  const log = await readText(
    '1700000000005000000,0,0,9\n1700000000005000001,0,0,9\n1700000000015000003,0,0,9\n',
    layout,
  );
  expect(log.accel?.t_s).toEqual(f64(0, 1e-9, 0.010000003));
});

test('gzip is told by its bytes, not by the name; members in a row and bytes after them are read and digested', async () => {
  const rows = ['0.5,1,2,3\n', '1.5,4,5,6\n'];
  const plain = await readText(rows.join(''), NUMBERED);
  const zipped = Buffer.concat([...rows.map((row) => gzipSync(row)), Buffer.alloc(700_000)]);
  const log = await readText(zipped, NUMBERED);
  expect(log.accel).toEqual(plain.accel);
  expect(log.sha256).toBe(createHash('sha256').update(zipped).digest('hex'));
});

test('rows that straddle the chunks of a long file are whole', async () => {
  // 60000 rows are about 1.9 MB, more than seven chunks of 256 KiB.
  const n = 60_000;
  const text = Array.from({ length: n }, (_, i) => `${(i / 100).toFixed(2)},${i},${-i}.5,"${i}.25"\n`).join(
    '',
  );
  for (const stored of [text, gzipSync(text)]) {
    const { accel } = await readText(stored, NUMBERED);
    expect(accel?.t_s).toHaveLength(n);
    let wrong = 0;
    for (let i = 0; i < n; i++)
      if (accel!.t_s[i] !== i / 100 || accel!.x_mps2[i] !== i || accel!.z_mps2[i] !== i + 0.25) wrong++;
    expect(wrong).toBe(0);
  }
});

import { createHash } from 'node:crypto';
import { gzipSync } from 'node:zlib';
import {
  Bool,
  DataType,
  Dictionary,
  Float32,
  Float64,
  Int32,
  Int64,
  makeData,
  makeVector,
  Table,
  type Timestamp,
  TimestampMicrosecond,
  TimestampNanosecond,
  tableToIPC,
  Utf8,
  vectorFromArray,
} from 'apache-arrow';
import { parquetWriteBuffer } from 'hyparquet-writer';
import { expect, test } from 'vitest';
import { messageFrom } from '../folder.js';
import { layoutFrom, NUMBERED, readText, TAGGED, WIDE } from './layouts.js';

const f64 = (...values: number[]) => Float64Array.from(values);

/** The library's own builder takes milliseconds; this takes ticks. */
function tickVector(type: Timestamp, ticks: readonly bigint[]) {
  const data = BigInt64Array.from(ticks);
  return makeVector(makeData({ type, length: data.length, nullCount: 0, data }));
}

/** An Arrow file or stream with the given columns. */
function arrow(
  columns: Record<string, [DataType, readonly unknown[]]>,
  format: 'file' | 'stream' = 'file',
): Uint8Array {
  const vectors = Object.entries(columns).map(([name, [type, values]]) => [
    name,
    DataType.isTimestamp(type) ? tickVector(type, values as bigint[]) : vectorFromArray(values, type),
  ]);
  return tableToIPC(new Table(Object.fromEntries(vectors)), format);
}

const NS = { ...NUMBERED, time: { column: 1, unit: 'ns' } } as const;
const START = 1700000000005000000n;
const axes = {
  x: [new Float64(), [1, 4]],
  y: [new Float32(), [2.5, 5]],
  z: [new Int32(), [3, 6]],
} satisfies Record<string, [DataType, unknown[]]>;

test.each(['file', 'stream'] as const)(
  'Arrow %s: int64 nanoseconds are exact, any number type will do',
  async (format) => {
    const bytes = arrow({ t: [new Int64(), [START, START + 3n]], ...axes }, format);
    const log = await readText(bytes, NS);
    expect(log.t0).toEqual({ value: '1700000000005000000', unit: 'ns' });
    expect(log.accel).toEqual({
      t_s: f64(0, 3e-9),
      x_mps2: f64(1, 4),
      y_mps2: f64(2.5, 5),
      z_mps2: f64(3, 6),
    });
    expect(log.sha256).toBe(createHash('sha256').update(bytes).digest('hex'));
    expect((await readText(gzipSync(bytes), NS)).accel).toEqual(log.accel);
  },
);

test('Arrow time stamps keep their ticks, floats mean their shortest decimal form', async () => {
  const ticks = arrow({ t: [new TimestampNanosecond(), [START, START + 3n]], ...axes });
  expect((await readText(ticks, NS)).accel?.t_s).toEqual(f64(0, 3e-9));
  const floats = arrow({ t: [new Float64(), [1574570929.727, 1574570929.747]], ...axes });
  expect((await readText(floats, NUMBERED)).accel?.t_s).toEqual(f64(0, 0.02));
});

test('Arrow nulls are empty fields, NaN is a missing value', async () => {
  const number = (values: (number | null)[]): [DataType, unknown[]] => [new Float64(), values];
  const log = await readText(
    arrow({
      t: [new Int64(), [0n, 10n, 20n, null, 40n]],
      ax: number([1, 1, Number.NaN, 1, 2]),
      ay: number([1, 1, 1, 1, 2]),
      az: number([1, 1, 1, 1, 2]),
      gx: number([null, 1, 1, null, 2]),
      gy: number([null, null, 1, null, 2]),
      gz: number([null, 1, 1, null, 2]),
    }),
    WIDE,
  );
  expect(log.accel?.t_s).toEqual(f64(0, 0.01, 0.04));
  expect(log.gyro?.t_s).toEqual(f64(0.02, 0.04));
  expect([log.counts.accel?.missing, log.counts.gyro?.missing]).toEqual([2, 1]);
});

test('Arrow tagged, the tags in a dictionary', async () => {
  const log = await readText(
    arrow({
      t: [new Int32(), [0, 1, 2]],
      sensor: [new Dictionary(new Utf8(), new Int32()), ['acc', 'bar', 'wifi']],
      x: [new Float64(), [1, 1013, 0]],
      y: [new Float64(), [2, null, null]],
      z: [new Float64(), [3, null, null]],
    }),
    TAGGED,
  );
  expect(log.accel?.z_mps2).toEqual(f64(3));
  expect(log.baro?.p_hPa).toEqual(f64(1013));
  expect(log.skippedRows).toBe(1);
});

test.each([
  [
    'flags for numbers',
    arrow({
      t: [new Int32(), [0]],
      x: [new Bool(), [true]],
      y: [new Float64(), [1]],
      z: [new Float64(), [1]],
    }),
    'logs/a1.csv: column "2" holds Bool, accel needs numbers',
  ],
  [
    'time stamps in another unit than the layout says',
    arrow({ t: [new TimestampMicrosecond(), [1n, 2n]], ...axes }),
    'logs/a1.csv: column "1" holds time stamps in us, the layout says ns; mend the layout',
  ],
  [
    'infinity',
    arrow({ t: [new Int32(), [0, 1]], ...axes, x: [new Float64(), [1, Number.NEGATIVE_INFINITY]] }),
    'logs/a1.csv row 2 column 2: "-Infinity" is not a number',
  ],
  [
    'too few columns',
    arrow({ t: [new Int32(), [0]], x: [new Float64(), [1]] }),
    'logs/a1.csv: no column 3; it has 2 columns',
  ],
])('Arrow with %s', async (_, bytes, message) => {
  expect(await messageFrom(() => readText(bytes, NS))).toBe(message);
});

test('Arrow and Parquet files cut short are told as such', async () => {
  const bytes = arrow({ t: [new Int64(), [START, START + 3n]], ...axes });
  expect(await messageFrom(() => readText(bytes.subarray(0, 200), NS))).toMatch(
    /^logs\/a1\.csv: is not a whole Arrow file, or a compressed one \(.+\); write it again, uncompressed$/,
  );
  const parquet = new Uint8Array(
    parquetWriteBuffer({ columnData: [{ name: 't', data: [1, 2], type: 'INT32' }] }),
  );
  expect(await messageFrom(() => readText(parquet.subarray(0, parquet.length - 9), NS))).toMatch(
    /^logs\/a1\.csv: is not a whole Parquet file \(.+\); write it again$/,
  );
});

const doubles = (name: string, data: (number | null)[]) => ({ name, data, type: 'DOUBLE' as const });

test('Parquet: int64 nanoseconds are exact, nulls are empty fields', async () => {
  const bytes = new Uint8Array(
    parquetWriteBuffer({
      columnData: [
        { name: 't', data: [START, START + 3n, START + 5n], type: 'INT64' },
        doubles('x', [1, 4, 7]),
        { name: 'y', data: [2.5, 5, 8], type: 'FLOAT' },
        doubles('z', [3, 6, null]),
      ],
    }),
  );
  const log = await readText(bytes, NS);
  expect(log.t0).toEqual({ value: '1700000000005000000', unit: 'ns' });
  expect(log.accel).toEqual({ t_s: f64(0, 3e-9), x_mps2: f64(1, 4), y_mps2: f64(2.5, 5), z_mps2: f64(3, 6) });
  expect(log.counts.accel?.missing).toBe(1);
  expect(log.sha256).toBe(createHash('sha256').update(bytes).digest('hex'));
});

test('Parquet: nanosecond time stamps keep their ticks; a tag column; several row groups', async () => {
  const n = 2500;
  const rows = Array.from({ length: n }, (_, i) => i);
  const layout = layoutFrom(
    '{ shape: tagged, time: { column: t, unit: ns }, tag: s, accel: { tag: acc, columns: [x, y, z], unit: mps2 } }',
  );
  const bytes = new Uint8Array(
    parquetWriteBuffer({
      schema: [
        { name: 'root', num_children: 5 },
        {
          name: 't',
          type: 'INT64',
          repetition_type: 'REQUIRED',
          logical_type: { type: 'TIMESTAMP', isAdjustedToUTC: true, unit: 'NANOS' },
        },
        { name: 's', type: 'BYTE_ARRAY', repetition_type: 'REQUIRED', converted_type: 'UTF8' },
        ...['x', 'y', 'z'].map((name) => ({
          name,
          type: 'DOUBLE' as const,
          repetition_type: 'REQUIRED' as const,
        })),
      ],
      columnData: [
        { name: 't', data: rows.map((i) => START + BigInt(i)) },
        { name: 's', data: rows.map((i) => (i % 2 ? 'acc' : 'gyr')) },
        ...['x', 'y', 'z'].map((name) => ({ name, data: rows })),
      ],
      rowGroupSize: 1000,
    }),
  );
  const log = await readText(bytes, layout);
  expect(log.accel?.t_s).toEqual(Float64Array.from({ length: n / 2 }, (_, i) => (2 * i) / 1e9));
  expect(log.accel?.x_mps2).toEqual(Float64Array.from({ length: n / 2 }, (_, i) => 2 * i + 1));
  expect(log.skippedRows).toBe(n / 2);
});

test('Parquet: a column that is not there, or of text', async () => {
  const text = parquetWriteBuffer({
    columnData: [
      { name: 't', data: [1], type: 'INT32' },
      { name: 'ax', data: ['1'], type: 'STRING' },
      doubles('ay', [1]),
      doubles('az', [1]),
      doubles('gx', [1]),
      doubles('gy', [1]),
      doubles('gz', [1]),
    ],
  });
  expect(await messageFrom(() => readText(new Uint8Array(text), WIDE))).toBe(
    'logs/a1.csv: column "ax" holds UTF8, accel needs numbers',
  );
  const other = parquetWriteBuffer({ columnData: [{ name: 'time', data: [1], type: 'INT32' }] });
  expect(await messageFrom(() => readText(new Uint8Array(other), WIDE))).toBe(
    'logs/a1.csv: no column "t"; it has time.',
  );
});

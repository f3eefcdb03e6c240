import { brotliDecompressSync, gunzipSync } from 'node:zlib';
import { parquetMetadata, parquetRead, parquetSchema, type SchemaElement } from 'hyparquet';
import { InputError, messageOf } from '../../errors.js';
import type { TimeUnit } from '../types.js';
import { type Cell, type LogColumn, readColumnarLog } from './columnar-log.js';
import { findColumn } from './find-column.js';
import type { LogPlan } from './log-plan.js';

const UNITS: Readonly<Record<string, TimeUnit>> = { MILLIS: 'ms', MICROS: 'us', NANOS: 'ns' };

function kindOf(element: SchemaElement): Pick<LogColumn, 'type' | 'holds' | 'unit'> {
  const { type, converted_type: converted, logical_type: logical } = element;
  const name = logical?.type ?? converted ?? type ?? 'a group';
  if (type === undefined || element.repetition_type === 'REPEATED')
    return { type: name, holds: 'other', unit: null };
  if (logical?.type === 'TIMESTAMP') return { type: name, holds: 'time', unit: UNITS[logical.unit] ?? null };
  if (converted === 'TIMESTAMP_MILLIS') return { type: name, holds: 'time', unit: 'ms' };
  if (converted === 'TIMESTAMP_MICROS') return { type: name, holds: 'time', unit: 'us' };
  if (type === 'INT96') return { type: name, holds: 'time', unit: 'ns' };
  if (converted === 'UTF8' || logical?.type === 'STRING' || logical?.type === 'ENUM')
    return { type: name, holds: 'text', unit: null };
  const plainInteger =
    converted === undefined || converted.startsWith('INT_') || converted.startsWith('UINT_');
  const plainLogical = logical === undefined || logical.type === 'INTEGER' || logical.type === 'FLOAT16';
  const numeric =
    type === 'DOUBLE' || type === 'FLOAT' || logical?.type === 'FLOAT16' || type.startsWith('INT');
  return { type: name, holds: numeric && plainInteger && plainLogical ? 'number' : 'other', unit: null };
}

const ticks = (value: bigint) => value;

/**
 * Reads a Parquet log; uncompressed or compressed with snappy, gzip or brotli.
 *
 * @throws InputError `corrupt-log` where it is not a whole one.
 */
export async function readParquetLog(bytes: Uint8Array, plan: LogPlan): Promise<void> {
  const buffer = new Uint8Array(bytes).buffer;
  try {
    const metadata = parquetMetadata(buffer);
    const elements = parquetSchema(metadata).children.map(({ element }) => element);
    const names = elements.map(({ name }) => name);
    const refs = plan.parts.flatMap((part) => [part.time.column, ...part.columns]);
    if (plan.tag !== null) refs.push(plan.tag);
    const wanted = new Set(refs.map((ref) => names[findColumn(ref, names, names.length, plan.label)]!));
    const cells = new Map<string, Cell[]>([...wanted].map((name) => [name, []]));
    await parquetRead({
      file: { byteLength: buffer.byteLength, slice: (start, end) => buffer.slice(start, end) },
      metadata,
      columns: [...wanted],
      compressors: { GZIP: (input) => gunzipSync(input), BROTLI: (input) => brotliDecompressSync(input) },
      // Ticks as stored: dates would drop what is finer than a millisecond.
      parsers: {
        timestampFromMilliseconds: ticks,
        timestampFromMicroseconds: ticks,
        timestampFromNanoseconds: ticks,
      },
      onChunk: ({ columnName, columnData, rowStart }) => {
        const column = cells.get(columnName);
        for (let i = 0; column && i < columnData.length; i++)
          column[rowStart + i] = (columnData[i] ?? null) as Cell;
      },
    });
    readColumnarLog(
      {
        names,
        nRows: Math.max(...[...cells.values()].map(({ length }) => length)),
        column: (index) => {
          const column = cells.get(names[index]!)!;
          return { ...kindOf(elements[index]!), at: (row) => column[row] ?? null };
        },
      },
      plan,
    );
  } catch (error) {
    if (error instanceof InputError) throw error;
    throw new InputError(
      'corrupt-log',
      `${plan.label}: is not a whole Parquet file (${messageOf(error)}); write it again`,
      {
        cause: error,
      },
    );
  }
}

import { TimeUnit as ArrowUnit, DataType, type Table, tableFromIPC, type Vector } from 'apache-arrow';
import { InputError, messageOf } from '../../errors.js';
import type { TimeUnit } from '../types.js';
import { type Cell, type ColumnarLog, type LogColumn, readColumnarLog } from './columnar-log.js';
import type { LogPlan } from './log-plan.js';

const UNITS: Readonly<Record<ArrowUnit, TimeUnit>> = {
  [ArrowUnit.SECOND]: 's',
  [ArrowUnit.MILLISECOND]: 'ms',
  [ArrowUnit.MICROSECOND]: 'us',
  [ArrowUnit.NANOSECOND]: 'ns',
};

function holds(type: DataType): LogColumn['holds'] {
  if (DataType.isDictionary(type)) return holds(type.dictionary);
  if (DataType.isInt(type) || DataType.isFloat(type)) return 'number';
  if (DataType.isUtf8(type) || DataType.isLargeUtf8(type)) return 'text';
  return DataType.isTimestamp(type) ? 'time' : 'other';
}

function columnOf(vector: Vector): LogColumn {
  const type: DataType = vector.type;
  if (!DataType.isTimestamp(type))
    return { type: String(type), holds: holds(type), unit: null, at: (row) => vector.get(row) as Cell };
  // `get` gives milliseconds and drops what is finer; the array holds the ticks as stored, but 0 for a null.
  const ticks = vector.toArray() as BigInt64Array;
  const at = (row: number) => (vector.isValid(row) ? ticks[row]! : null);
  return { type: String(type), holds: 'time', unit: UNITS[type.unit], at };
}

/** Reads an Arrow IPC log, file or stream format. @throws InputError `corrupt-log` where it is not a whole one. */
export function readArrowLog(bytes: Uint8Array, plan: LogPlan): void {
  let table: Table;
  try {
    table = tableFromIPC(bytes);
    if (table.schema.fields.length === 0) throw new Error('it has no columns');
  } catch (error) {
    throw new InputError(
      'corrupt-log',
      `${plan.label}: is not a whole Arrow file, or a compressed one (${messageOf(error)}); write it again, uncompressed`,
      { cause: error },
    );
  }
  const log: ColumnarLog = {
    names: table.schema.fields.map(({ name }) => name),
    nRows: table.numRows,
    column: (index) => columnOf(table.getChildAt(index)!),
  };
  readColumnarLog(log, plan);
}

import { InputError } from '../../errors.js';
import { compareStamps, parseStamp, type Stamp } from '../exact-time.js';
import type { ColumnRef, TimeUnit } from '../types.js';
import { findColumn } from './find-column.js';
import type { LogPlan, SensorPart } from './log-plan.js';

/** What a cell of a columnar file holds; null where there is nothing. */
export type Cell = number | bigint | string | null;

/** One column of a columnar file. */
export interface LogColumn {
  /** The file's own word for its type, for messages. */
  type: string;
  /** `other`: flags, lists, dates and the like, which no log column can be. */
  holds: 'number' | 'time' | 'text' | 'other';
  /** The column's own unit, of a `time` column. */
  unit: TimeUnit | null;
  at(row: number): Cell;
}

/** A log of named columns: Arrow or Parquet. */
export interface ColumnarLog {
  names: readonly string[];
  nRows: number;
  column(index: number): LogColumn;
}

interface PlacedPart {
  part: SensorPart;
  time: LogColumn;
  values: readonly LogColumn[];
}

/** Reads the rows of a columnar log into the readings of its plan; rules as for CSV, nulls being empty fields. */
export function readColumnarLog(log: ColumnarLog, plan: LogPlan): void {
  const columns = new Map<number, LogColumn>();
  const place = (ref: ColumnRef, allowed: readonly LogColumn['holds'][], what: string): LogColumn => {
    const index = findColumn(ref, log.names, log.names.length, plan.label);
    const column = columns.get(index) ?? log.column(index);
    columns.set(index, column);
    if (!allowed.includes(column.holds))
      throw new InputError('wrong-type', `${plan.label}: column "${ref}" holds ${column.type}, ${what}`);
    return column;
  };
  const tags =
    plan.tag === null ? null : place(plan.tag, ['text', 'number'], 'a tag column needs text or numbers');
  const parts: PlacedPart[] = plan.parts.map((part) => {
    const time = place(
      part.time.column,
      ['number', 'time', 'text'],
      'a time column needs numbers or time stamps',
    );
    if (time.unit !== null && time.unit !== part.time.unit)
      throw new InputError(
        'wrong-type',
        `${plan.label}: column "${part.time.column}" holds time stamps in ${time.unit}, the layout says ${part.time.unit}; mend the layout`,
      );
    const values = part.columns.map((ref) => place(ref, ['number'], `${part.sensor} needs numbers`));
    return { part, time, values };
  });
  const values = new Float64Array(3);
  for (let row = 0; row < log.nRows; row++) {
    const tag = tags && String(tags.at(row) ?? '');
    let claimed = false;
    for (const placed of parts) {
      if (tag !== null && tag !== placed.part.tag) continue;
      claimed = true;
      readPart(placed, row, values, plan);
    }
    if (claimed) continue;
    plan.unclaimedRows++;
    if (plan.unclaimedTags.size < 20) plan.unclaimedTags.add(tag ?? '');
  }
}

function readPart(
  { part, time, values: columns }: PlacedPart,
  row: number,
  values: Float64Array,
  plan: LogPlan,
): void {
  let nEmpty = 0;
  let complete = true;
  for (let axis = 0; axis < columns.length; axis++) {
    const cell = columns[axis]!.at(row);
    if (cell === null) nEmpty++;
    const value = cell === null ? Number.NaN : Number(cell);
    if (Number.isNaN(value)) complete = false;
    else if (!Number.isFinite(value)) refuse(plan, row, part.columns[axis]!, cell);
    values[axis] = value;
  }
  if (nEmpty === columns.length && !part.emptyIsMissing) return;
  const cell = time.at(row);
  const stamp = stampOf(cell, part.time.unit);
  if (stamp === 'bad') refuse(plan, row, part.time.column, cell);
  if (stamp === 'missing' || !complete) {
    part.readings.missing++;
    return;
  }
  part.readings.push(stamp.seconds, stamp.femtos, values);
  const { first } = plan;
  if (compareStamps(stamp.seconds, stamp.femtos, first.seconds, first.femtos) < 0)
    Object.assign(first, { ...stamp, text: String(cell), unit: part.time.unit });
}

/** A float's shortest decimal form is what the logger meant, and it has no more digits than the float. */
function stampOf(cell: Cell, unit: TimeUnit): Stamp | 'missing' | 'bad' {
  if (cell === null || cell === '' || Number.isNaN(cell)) return 'missing';
  return parseStamp(String(cell), unit) ?? 'bad';
}

function refuse(plan: LogPlan, row: number, column: ColumnRef, cell: Cell): never {
  throw new InputError(
    'not-a-number',
    `${plan.label} row ${row + 1} column ${column}: "${String(cell).slice(0, 60)}" is not a number`,
  );
}

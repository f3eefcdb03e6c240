import { InputError } from '../../errors.js';
import { compareStamps } from '../exact-time.js';
import type { ColumnRef, TimeUnit } from '../types.js';
import { type CsvDialect, findDialect } from './csv-dialect.js';
import { CsvScanner } from './csv-scanner.js';
import { findColumn } from './find-column.js';
import type { LogPlan, SensorPart } from './log-plan.js';
import { FIELD, parseNumber, parseTime } from './parse-field.js';

/** As much of a log's head as its dialect is found from. */
const HEAD_BYTES = 64 * 1024;

/** A sensor's part with its columns' indexes in this very file. */
interface PlacedPart {
  part: SensorPart;
  time: number;
  values: Int32Array;
  tag: Buffer | null;
  /** The highest of its indexes. */
  last: number;
}

/** Reads a CSV log chunk by chunk into the readings of its plan. */
export class CsvLogReader {
  readonly #plan: LogPlan;
  readonly #scanner: CsvScanner;
  #dialect: CsvDialect | null = null;
  #parts: PlacedPart[] = [];
  #tagIndex = -1;
  readonly #stamp = new Float64Array(2);
  /** The field of the present row, and its unit, that `#stamp` was read from: sensors of a wide log share it. */
  #stampField = -1;
  #stampUnit: TimeUnit = 's';
  #stampFound: number = FIELD.missing;
  readonly #values = new Float64Array(3);

  constructor(plan: LogPlan) {
    this.#plan = plan;
    this.#scanner = new CsvScanner(plan.label);
  }

  push(chunk: Uint8Array): void {
    this.#scanner.push(chunk);
    if (this.#dialect === null && this.#scanner.pending.length < HEAD_BYTES) return;
    this.#readRows();
  }

  finish(): void {
    this.#scanner.end();
    this.#readRows();
  }

  #readRows(): void {
    if (this.#dialect === null && !this.#begin()) return;
    while (this.#scanner.next()) this.#readRow();
  }

  /** Finds the dialect and the columns. @returns false where that takes more of the file. */
  #begin(): boolean {
    const { label, tag, parts } = this.#plan;
    const scanner = this.#scanner;
    const head = scanner.pending;
    const complete = scanner.ended ? head.length : head.lastIndexOf(0x0a) + 1;
    if (complete === 0 && !scanner.ended) return false;
    const dialect = findDialect(head.subarray(0, complete), this.#plan);
    this.#dialect = dialect;
    scanner.delimiter = dialect.delimiter;
    let nFields = dialect.header?.length ?? 0;
    if (dialect.header) scanner.next();
    else {
      // Rows of other sensors may be longer than the first one; too few fields are told row by row.
      nFields = Number.POSITIVE_INFINITY;
    }
    const place = (column: ColumnRef) => findColumn(column, dialect.header, nFields, label);
    this.#tagIndex = tag === null ? -1 : place(tag);
    this.#parts = parts.map((part) => {
      const time = place(part.time.column);
      const values = Int32Array.from(part.columns, place);
      const last = Math.max(time, ...values);
      return { part, time, values, last, tag: part.tag === null ? null : Buffer.from(part.tag) };
    });
    return true;
  }

  #readRow(): void {
    this.#stampField = -1;
    if (this.#tagIndex === -1) {
      for (const placed of this.#parts) this.#readPart(placed);
      return;
    }
    const scanner = this.#scanner;
    if (this.#tagIndex < scanner.nFields) {
      const start = scanner.starts[this.#tagIndex]!;
      const end = scanner.ends[this.#tagIndex]!;
      for (const placed of this.#parts)
        if (placed.tag && isSame(placed.tag, scanner.bytes, start, end)) {
          this.#readPart(placed);
          return;
        }
    }
    this.#plan.unclaimedRows++;
    if (this.#plan.unclaimedTags.size < 20) this.#plan.unclaimedTags.add(scanner.text(this.#tagIndex));
  }

  #readPart({ part, time, values, last }: PlacedPart): void {
    const scanner = this.#scanner;
    const { bytes, starts, ends } = scanner;
    const decimal = this.#dialect!.decimal;
    if (last >= scanner.nFields) this.#refuseShortRow(last);
    let nEmpty = 0;
    let complete = true;
    for (let axis = 0; axis < values.length; axis++) {
      const field = values[axis]!;
      const start = starts[field]!;
      const end = ends[field]!;
      if (start === end) {
        nEmpty++;
        complete = false;
        continue;
      }
      const value = parseNumber(bytes, start, end, decimal);
      if (value === Number.POSITIVE_INFINITY) this.#refuse(field, part.columns[axis]!);
      if (Number.isNaN(value)) complete = false;
      this.#values[axis] = value;
    }
    if (nEmpty === values.length && !part.emptyIsMissing) return;
    const stamp = this.#stamp;
    if (this.#stampField !== time || this.#stampUnit !== part.time.unit) {
      this.#stampField = time;
      this.#stampUnit = part.time.unit;
      this.#stampFound = parseTime(bytes, starts[time]!, ends[time]!, decimal, part.time.unit, stamp);
    }
    const found = this.#stampFound;
    if (found === FIELD.bad) this.#refuse(time, part.time.column);
    if (found === FIELD.missing || !complete) {
      part.readings.missing++;
      return;
    }
    const seconds = stamp[0]!;
    const femtos = stamp[1]!;
    part.readings.push(seconds, femtos, this.#values);
    const { first } = this.#plan;
    if (compareStamps(seconds, femtos, first.seconds, first.femtos) < 0) {
      first.seconds = seconds;
      first.femtos = femtos;
      first.text = scanner.text(time).replace(',', '.');
      first.unit = part.time.unit;
    }
  }

  #refuse(field: number, column: ColumnRef): never {
    const text = this.#scanner.text(field);
    const hint =
      this.#dialect!.decimal === 0x2e && /^[+-]?\d*,\d+$/.test(text)
        ? "; where the file has decimal commas, say decimal: ',' in its layout"
        : '';
    throw new InputError(
      'not-a-number',
      `${this.#plan.label} row ${this.#scanner.row} column ${column}: "${text.slice(0, 60)}" is not a number${hint}`,
    );
  }

  #refuseShortRow(last: number): never {
    const { nFields, row } = this.#scanner;
    throw new InputError(
      'short-row',
      `${this.#plan.label} row ${row}: has ${nFields} ${nFields === 1 ? 'field' : 'fields'}, the layout needs ${last + 1}; mend or remove the row`,
    );
  }
}

function isSame(tag: Buffer, bytes: Buffer, start: number, end: number): boolean {
  if (end - start !== tag.length) return false;
  for (let i = 0; i < tag.length; i++) if (tag[i] !== bytes[start + i]) return false;
  return true;
}

import { createHash } from 'node:crypto';
import { basename } from 'node:path';
import { InputError } from '../errors.js';
import { parseStamp, secondsBetween } from './exact-time.js';
import { CsvScanner } from './logs/csv-scanner.js';
import { findColumn } from './logs/find-column.js';
import { FIELD, parseNumber, parseTime } from './logs/parse-field.js';
import { unzippedBytes } from './logs/stored-bytes.js';
import type { TimeUnit } from './types.js';

/** What a truth file's times are, see `Campaign.truthTime`, and where the walk's own time begins. */
export interface TruthClock {
  truthTime: 'log' | 'relative';
  t0: { value: string; unit: TimeUnit };
}

const COMMA = 0x2c;
const POINT = 0x2e;

/**
 * Reads a CSV table (or `.csv.gz`) whose first column wanted is `t_s` and whose others are numbers.
 *
 * Rows with a required value missing (empty or NaN: the instrument lost sight) are left out; an
 * optional value missing is NaN. Other columns are passed over.
 *
 * @param clock - times become seconds since the walk's first reading; null: they stay as written.
 * @returns columns by name, those of `optional` only where the file has them; times strictly rising.
 * @throws InputError `no-column`, `short-row`, `not-a-number`, `not-rising`, `empty-file`, or as of unzippedBytes.
 */
export async function readNumberTable(
  path: string,
  required: readonly string[],
  optional: readonly string[],
  clock: TruthClock | null,
): Promise<Record<string, Float64Array>> {
  const label = basename(path);
  const t0 = clock?.truthTime === 'log' ? parseStamp(clock.t0.value, clock.t0.unit) : null;
  const start = t0 ?? { seconds: 0, femtos: 0 };
  const scanner = new CsvScanner(label);
  const stamp = new Float64Array(2);
  let names: string[] = [];
  let fields: number[] = [];
  let timeField = -1;
  let rows = new Float64Array(4096);
  let nRows = 0;
  let before = Number.NEGATIVE_INFINITY;

  const begin = () => {
    const header = scanner.texts();
    names = [...required, ...optional.filter((name) => header.includes(name))];
    timeField = findColumn('t_s', header, header.length, label);
    fields = names.map((name) => findColumn(name, header, header.length, label));
  };
  const refuse = (code: string, text: string): never => {
    throw new InputError(code, `${label} row ${scanner.row}${text}`);
  };
  const readRow = () => {
    const width = names.length + 1;
    if (Math.max(timeField, ...fields) >= scanner.nFields)
      refuse(
        'short-row',
        `: has ${scanner.nFields} fields, the header's columns need ${Math.max(timeField, ...fields) + 1}`,
      );
    if ((nRows + 1) * width > rows.length) {
      const longer = new Float64Array(rows.length * 2);
      longer.set(rows);
      rows = longer;
    }
    const at = nRows * width;
    const found = parseTime(
      scanner.bytes,
      scanner.starts[timeField]!,
      scanner.ends[timeField]!,
      POINT,
      's',
      stamp,
    );
    if (found === FIELD.bad)
      refuse('not-a-number', ` column t_s: "${scanner.text(timeField)}" is not a number`);
    let complete = found === FIELD.good;
    for (const [index, field] of fields.entries()) {
      const value = parseNumber(scanner.bytes, scanner.starts[field]!, scanner.ends[field]!, POINT);
      if (value === Number.POSITIVE_INFINITY)
        refuse('not-a-number', ` column ${names[index]}: "${scanner.text(field)}" is not a number`);
      if (Number.isNaN(value) && index < required.length) complete = false;
      rows[at + 1 + index] = value;
    }
    if (!complete) return;
    const t = secondsBetween(stamp[0]!, stamp[1]!, start.seconds, start.femtos);
    if (!(t > before))
      refuse(
        'not-rising',
        ` column t_s: ${scanner.text(timeField)} is not later than the row before; sort the rows, keep one a time`,
      );
    before = t;
    rows[at] = t;
    nRows++;
  };
  const readRows = () => {
    if (names.length === 0 && scanner.next()) begin();
    while (names.length > 0 && scanner.next()) readRow();
  };

  scanner.delimiter = COMMA;
  for await (const chunk of unzippedBytes(path, label, createHash('sha256'))) {
    scanner.push(chunk);
    readRows();
  }
  scanner.end();
  readRows();
  if (nRows === 0)
    throw new InputError('empty-file', `${label}: has no row with all of t_s, ${required.join(', ')}`);
  const width = names.length + 1;
  const column = (index: number) =>
    Float64Array.from({ length: nRows }, (_, row) => rows[row * width + index]!);
  return Object.fromEntries(['t_s', ...names].map((name, index) => [name, column(index)]));
}

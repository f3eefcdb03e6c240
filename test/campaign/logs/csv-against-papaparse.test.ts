import fc from 'fast-check';
import Papa from 'papaparse';
import { expect, test } from 'vitest';
import { planLog } from '../../../src/campaign/logs/log-plan.js';
import { CsvLogReader } from '../../../src/campaign/logs/read-csv-log.js';
import { InputError } from '../../../src/errors.js';
import { layoutFrom } from './layouts.js';

const LAYOUT = layoutFrom(
  '{ shape: wide, time: { column: t, unit: s }, accel: { columns: [x, y, z], unit: mps2 }, delimiter: ",", decimal: ".", header: true }',
);
const START = { seconds: 0, femtos: 0 };

/** What the reader makes of a text that comes in pieces; null where it refuses it. */
function read(text: string, pieceBytes: number) {
  const plan = planLog('a.csv', LAYOUT)[0]!;
  const reader = new CsvLogReader(plan);
  const bytes = Buffer.from(text);
  try {
    for (let from = 0; from < bytes.length; from += pieceBytes)
      reader.push(bytes.subarray(from, from + pieceBytes));
    reader.finish();
  } catch (error) {
    if (error instanceof InputError) return null;
    throw error;
  }
  const { t_s, values, counts } = plan.parts[0]!.readings.inTimeOrder(START);
  const rows = Array.from(t_s, (t, row) => [t, ...values.map((column) => column[row]!)]);
  return { rows, missing: counts.missing };
}

const NUMBER = /^[+-]?(\d+\.?\d*|\.\d+)(e[+-]?\d+)?$/i;
const MISSING = /^(nan|null|na|n\/a)?$/i;

/** The plainest way: the whole text at once, strings, the language's own numbers; null where it is to be refused. */
function readPlainly(text: string) {
  // Blanks after a closing quote mean nothing; papaparse agrees but for those at the very end.
  const parsed = Papa.parse<string[]>(text.replace(/[ \t\r]+$/, ''), { delimiter: ',', newline: '\n' });
  if (parsed.errors.length > 0) return null;
  const [header, ...lines] = parsed.data
    .map((cells) => cells.map((cell) => cell.replace(/^[ \t\r]+|[ \t\r]+$/g, '')))
    .filter((cells) => cells.length > 1 || cells[0] !== '');
  if (!header) return { rows: [], missing: 0 };
  const indexes = ['t', 'x', 'y', 'z'].map((name) => header.indexOf(name));
  if (indexes.some((index) => index === -1 || header.indexOf(header[index]!, index + 1) !== -1)) return null;
  const rows: number[][] = [];
  let missing = 0;
  for (const line of lines) {
    const cells = indexes.map((index) => line[index]);
    if (cells.some((cell) => cell === undefined)) return null;
    if (cells.slice(1).every((cell) => cell === '')) continue;
    const numbers = cells.map((cell) =>
      MISSING.test(cell!) ? Number.NaN : NUMBER.test(cell!) ? Number(cell) : Number.POSITIVE_INFINITY,
    );
    // Stamps of 16 digits of seconds and more are refused by design.
    if (Math.abs(numbers[0]!) >= 1e15) return null;
    if (numbers.some((value) => Math.abs(value) === Number.POSITIVE_INFINITY)) return null;
    if (numbers.some((value) => Number.isNaN(value))) missing++;
    else rows.push(numbers);
  }
  return { rows: rows.sort((a, b) => a[0]! - b[0]!), missing };
}

const field = fc.oneof(
  { weight: 6, arbitrary: fc.double({ noNaN: true, noDefaultInfinity: true }).map(String) },
  { weight: 6, arbitrary: fc.integer({ min: -(10 ** 6), max: 10 ** 6 }).map((i) => (i / 1000).toFixed(3)) },
  { weight: 1, arbitrary: fc.constantFrom('', 'NaN', 'null', ' 1.5 ', '"2"', '+3', '.5', '7.', '1e3', '-0') },
);
const time = fc.oneof(
  { weight: 9, arbitrary: fc.integer({ min: 0, max: 10 ** 9 }).map((i) => (i / 1000).toFixed(3)) },
  { weight: 1, arbitrary: fc.constantFrom('', 'NaN', '1e2', '"0.25"') },
);
const row = fc
  .tuple(time, field, field, field, fc.constantFrom('', 'note', '"a, ""b"""'))
  .map((cells) => cells.join(','));
const log = fc
  .tuple(fc.constantFrom('\n', '\r\n'), fc.array(row, { maxLength: 8 }))
  .map(([end, rows]) => ['t,x,y,z,note', ...rows].join(end));

/** Puts one piece of text in place of some characters, anywhere. */
const damage = fc.record({
  at: fc.nat(400),
  cut: fc.nat(3),
  put: fc.constantFrom('', ',', '"', '\n', '.', 'e', '-', 'x', '9', ' ', '""', ',,', '\r\n', '00', 'é'),
});

function damaged(text: string, wounds: readonly { at: number; cut: number; put: string }[]): string {
  let result = text;
  for (const { at, cut, put } of wounds) {
    const place = at % (result.length + 1);
    result = result.slice(0, place) + put + result.slice(place + cut);
  }
  return result;
}

/** Sorting by time: rows of one time in the file's order, as both sorts are stable. */
function expectSame(text: string, pieceBytes: number) {
  const [ours, theirs] = [read(text, pieceBytes), readPlainly(text)];
  if (!ours || !theirs) {
    expect(ours === null, `refused by one alone: ${JSON.stringify(text)}`).toBe(theirs === null);
    return;
  }
  expect(ours.missing).toBe(theirs.missing);
  expect(ours.rows.length).toBe(theirs.rows.length);
  for (const [index, cells] of ours.rows.entries())
    for (const [column, value] of cells.entries()) {
      const other = theirs.rows[index]![column]!;
      // Tolerance: times are differences of two parts, one unit in the last place; values have none.
      if (column === 0)
        expect(Math.abs(value - other)).toBeLessThanOrEqual(2 ** -52 * Math.abs(other) + 1e-300);
      else expect(value).toBe(other);
    }
}

test('whole logs: the same numbers to the last bit, however they come in pieces', () => {
  fc.assert(
    fc.property(log, fc.integer({ min: 1, max: 60 }), (text, piece) => expectSame(text, piece)),
    { seed: 20254, numRuns: 2000 },
  );
});

test('damaged logs: never other numbers than the plain reader, and refused where it refuses', () => {
  fc.assert(
    fc.property(
      log,
      fc.array(damage, { minLength: 1, maxLength: 3 }),
      fc.integer({ min: 1, max: 60 }),
      (text, wounds, piece) => expectSame(damaged(text, wounds), piece),
    ),
    { seed: 20255, numRuns: 4000 },
  );
});

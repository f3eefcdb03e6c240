import fc from 'fast-check';
import Papa from 'papaparse';
import { expect, test } from 'vitest';
import { splitCsv } from '../../src/campaign/split-csv.js';

test('splitCsv: quotes, doubled quotes, line breaks in cells, blank lines, either line end, byte order mark', () => {
  const text = '\uFEFFwalk,note\r\na,"one, ""two""\nthree"\r\n\r\nb , c\n"d",""';
  expect(splitCsv(text, 'walks.csv')).toEqual([
    { line: 1, cells: ['walk', 'note'] },
    { line: 2, cells: ['a', 'one, "two"\nthree'] },
    { line: 5, cells: ['b', 'c'] },
    { line: 6, cells: ['d', ''] },
  ]);
  expect(splitCsv('', 'walks.csv')).toEqual([]);
});

test('splitCsv: refuses quotes that do not fit', () => {
  expect(() => splitCsv('a\n"b', 'walks.csv')).toThrow('walks.csv:2 a quote is opened and never closed');
  expect(() => splitCsv('"a"b,c', 'walks.csv')).toThrow(
    'walks.csv:1 text follows a closing quote; double the quotes inside a quoted cell',
  );
});

test('splitCsv agrees with papaparse on whatever papaparse writes', () => {
  const cell = fc.string({ maxLength: 6, unit: fc.constantFrom('a', ',', '"', '\n', ' ', '.', 'é') });
  fc.assert(
    fc.property(
      fc.array(fc.array(cell, { minLength: 2, maxLength: 4 }), { minLength: 1, maxLength: 5 }),
      (rows) => {
        const text = Papa.unparse(rows, { newline: '\n' });
        const want = (Papa.parse(text).data as string[][]).map((cells) => cells.map((each) => each.trim()));
        expect(splitCsv(text, 'x.csv').map(({ cells }) => cells)).toEqual(want);
      },
    ),
    { seed: 20253, numRuns: 1000 },
  );
});

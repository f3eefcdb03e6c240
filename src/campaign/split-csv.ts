import { InputError } from '../errors.js';

/** One row of a small CSV file: the line it begins on (from 1) and its cells, blanks around them removed. */
export interface CsvRow {
  line: number;
  cells: string[];
}

/**
 * Splits a small CSV text into rows; quoted cells may hold commas, quotes (doubled) and line breaks.
 *
 * Blank lines are left out. A byte order mark and either kind of line end are understood.
 *
 * @param file - the name that messages use.
 * @throws InputError `malformed-csv` on a quote that is not closed, or text after a closing quote.
 */
export function splitCsv(text: string, file: string, delimiter = ','): CsvRow[] {
  const rows: CsvRow[] = [];
  let at = text.startsWith('\uFEFF') ? 1 : 0;
  let line = 1;
  while (at < text.length) {
    const row: CsvRow = { line, cells: [] };
    for (let rowEnds = false; !rowEnds; ) {
      let cell: string;
      if (text[at] === '"') {
        let close = at + 1;
        for (;;) {
          close = text.indexOf('"', close);
          if (close === -1)
            throw new InputError('malformed-csv', `${file}:${row.line} a quote is opened and never closed`);
          if (text[close + 1] !== '"') break;
          close += 2;
        }
        cell = text.slice(at + 1, close);
        line += cell.split('\n').length - 1;
        cell = cell.replaceAll('""', '"').trim();
        at = close + 1;
        if (text[at] === '\r' && (text[at + 1] === '\n' || at + 1 === text.length)) at++;
        if (at < text.length && text[at] !== delimiter && text[at] !== '\n')
          throw new InputError(
            'malformed-csv',
            `${file}:${row.line} text follows a closing quote; double the quotes inside a quoted cell`,
          );
      } else {
        let end = at;
        while (end < text.length && text[end] !== delimiter && text[end] !== '\n') end++;
        cell = text.slice(at, end).trim();
        at = end;
      }
      row.cells.push(cell);
      rowEnds = text[at] !== delimiter;
      at++;
    }
    line++;
    if (row.cells.length > 1 || row.cells[0] !== '') rows.push(row);
  }
  return rows;
}

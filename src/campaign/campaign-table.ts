import { existsSync, readFileSync } from 'node:fs';
import { gunzipSync } from 'node:zlib';
import { InputError, messageOf } from '../errors.js';
import { didYouMean, listNames } from './nearest-name.js';
import type { Problems } from './problems.js';
import { resolveInside } from './resolve-inside.js';
import { type CsvRow, splitCsv } from './split-csv.js';

/** More than any folder table needs (a hundred hours of labelled steps take 20 MB); stops a gzip bomb. */
const MOST_BYTES = 512 * 1024 * 1024;

/**
 * The stored form of a campaign file that may be gzipped: `name`, or `name.gz`; null where there is neither.
 *
 * @throws InputError `ambiguous-file` where both are there, `outside-campaign` where it is a link that leads out.
 */
export function findStored(dir: string, name: string): { path: string; file: string } | null {
  const found = [name, `${name}.gz`]
    .map((file) => ({ file, path: resolveInside(dir, file, file) }))
    .filter(({ path }) => existsSync(path));
  if (found.length > 1)
    throw new InputError('ambiguous-file', `${name}: there is a ${name}.gz too; keep one of them`);
  return found[0] ?? null;
}

/** A small text file of a campaign, unzipped where its bytes are gzip, as UTF-8. */
export function readCampaignText(path: string, file: string): string {
  try {
    let bytes: Uint8Array = readFileSync(path);
    if (bytes[0] === 0x1f && bytes[1] === 0x8b) bytes = gunzipSync(bytes, { maxOutputLength: MOST_BYTES });
    return new TextDecoder('utf-8', { fatal: true }).decode(bytes);
  } catch (error) {
    const encoding = (error as { code?: string }).code === 'ERR_ENCODING_INVALID_ENCODED_DATA';
    const reason = encoding ? 'is not UTF-8 text; save it as UTF-8' : `cannot be read: ${messageOf(error)}`;
    throw new InputError('unreadable-file', `${file}: ${reason}`, { cause: error });
  }
}

/** What a folder table's columns are called, and what becomes of any other. */
export interface TableColumns {
  required: readonly string[];
  optional: readonly string[];
}

/** One row of a folder table, which reports what is wrong with its cells. */
export class TableRow {
  readonly line: number;
  readonly #table: CampaignTable;
  readonly #cells: readonly string[];

  constructor(table: CampaignTable, row: CsvRow) {
    this.#table = table;
    this.line = row.line;
    this.#cells = row.cells;
  }

  /** Reports a problem with one cell of this row. */
  problem(column: string, text: string): void {
    this.#table.problems.add(`${this.#table.file}:${this.line} ${column}: ${text}`);
  }

  /** The cell's text; null where it is empty or the table has no such column. */
  text(column: string): string | null {
    const index = this.#table.header.indexOf(column);
    const cell = index === -1 ? '' : (this.#cells[index] ?? '');
    return cell === '' ? null : cell;
  }

  /** As {@link text}, but an empty cell is a problem (and gives an empty text). */
  needed(column: string): string {
    const cell = this.text(column);
    if (cell === null && this.#table.header.includes(column))
      this.problem(column, 'is empty; it must be given');
    return cell ?? '';
  }

  /** A decimal number between two bounds (included); null where empty or wrong (reported). */
  number(
    column: string,
    unit: string,
    low = Number.NEGATIVE_INFINITY,
    high = Number.POSITIVE_INFINITY,
  ): number | null {
    const cell = this.text(column);
    if (cell === null) return null;
    const value = /^[+-]?(\d+\.?\d*|\.\d+)([eE][+-]?\d+)?$/.test(cell) ? Number(cell) : Number.NaN;
    if (Number.isFinite(value) && value >= low && value <= high) return value;
    const range =
      low === Number.NEGATIVE_INFINITY
        ? ''
        : high === Number.POSITIVE_INFINITY
          ? ` of at least ${low}`
          : ` from ${low} to ${high}`;
    this.problem(column, `must be a number${range}${unit === '' ? '' : ` (${unit})`}, got "${cell}"`);
    return null;
  }

  /** The columns that are not the table's own, as text. */
  extra(own: TableColumns): Record<string, string> {
    const extra: Record<string, string> = {};
    for (const [index, name] of this.#table.header.entries())
      if (name !== '' && !own.required.includes(name) && !own.optional.includes(name))
        extra[name] = this.#cells[index] ?? '';
    return extra;
  }
}

/** A folder table: CSV with a header line. */
export class CampaignTable {
  readonly file: string;
  readonly problems: Problems;
  readonly header: readonly string[];
  readonly rows: readonly TableRow[];

  constructor(file: string, text: string, columns: TableColumns, problems: Problems) {
    this.file = file;
    this.problems = problems;
    const [head, ...rows] = splitCsv(text, file);
    this.header = head?.cells ?? [];
    if (!head)
      problems.add(`${file}:1 is empty; its first line must name the columns ${columns.required.join(', ')}`);
    else this.#checkHeader(columns);
    this.rows = rows.flatMap((row) => {
      if (row.cells.length === this.header.length) return [new TableRow(this, row)];
      // A trailing comma is harmless; any other difference means that cells stand under the wrong name.
      const surplus = row.cells.slice(this.header.length);
      if (surplus.length > 0 && surplus.every((cell) => cell === '')) return [new TableRow(this, row)];
      problems.add(
        `${file}:${row.line} has ${row.cells.length} cells, the header has ${this.header.length}; quote cells that hold a comma`,
      );
      return [];
    });
  }

  #checkHeader(columns: TableColumns): void {
    const { file, header, problems } = this;
    for (const [index, name] of header.entries())
      if (name !== '' && header.indexOf(name) !== index)
        problems.add(`${file}:1 column "${name}" is there twice; keep one`);
    for (const name of columns.required)
      if (!header.includes(name))
        problems.add(
          `${file}:1 no column "${name}"; it has ${listNames(header)}.${didYouMean(name, header)}`,
        );
    // A column that is an optional one but for its case would be passed over without a word.
    for (const name of header) {
      const own = columns.optional.find((column) => column.toLowerCase() === name.toLowerCase());
      if (own !== undefined && own !== name && !header.includes(own))
        problems.add(`${file}:1 column "${name}" must be written "${own}"`);
    }
  }
}

/** Reads `<name>` or `<name>.gz` of a campaign; null where there is neither, or where it cannot be read (reported). */
export function readCampaignTable(
  dir: string,
  name: string,
  columns: TableColumns,
  problems: Problems,
): CampaignTable | null {
  return problems.attempt(() => {
    const stored = findStored(dir, name);
    return (
      stored && new CampaignTable(stored.file, readCampaignText(stored.path, stored.file), columns, problems)
    );
  });
}

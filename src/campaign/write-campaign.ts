import { join } from 'node:path';
import { gzipSync } from 'node:zlib';
import { stringify } from 'yaml';
import type { z } from 'zod';
import { writeText, writeWhole } from '../tables/write.js';
import { campaignSchema } from './campaign-yaml.js';

/** A column of a log to write; NaN is written as an empty cell. */
export type WrittenColumn = Float64Array | BigInt64Array | readonly string[];

const ROWS_PER_CHUNK = 4096;

function quoted(cell: string): string {
  return /[",\r\n]|^\s|\s$/.test(cell) ? `"${cell.replaceAll('"', '""')}"` : cell;
}

function cellOf(value: string | number): string {
  if (typeof value === 'string') return quoted(value);
  if (Number.isNaN(value)) return '';
  if (!Number.isFinite(value)) throw new Error(`a CSV cell must be a finite number, got ${value}`);
  return String(value);
}

/** Writes text whole or not at all, gzipped where the path ends in `.gz`. */
function writeLines(path: string, lines: Iterable<string>): string {
  const chunks: Buffer[] = [];
  for (const text of lines) chunks.push(Buffer.from(text, 'utf8'));
  if (!path.endsWith('.gz')) return writeWhole(path, chunks);
  // zlib leaves the header's time 0; the byte that tells operating systems apart is set to `unknown`.
  const zipped = gzipSync(Buffer.concat(chunks), { level: 9 });
  zipped[9] = 0xff;
  return writeWhole(path, [zipped]);
}

/**
 * Writes a CSV file from rows; cells are quoted where they must be, numbers in their shortest exact form.
 *
 * @param path - gzipped where it ends in `.gz`.
 * @returns SHA-256 of the file's bytes, in hexadecimal.
 */
export function writeCsv(
  path: string,
  header: readonly string[],
  rows: Iterable<readonly (string | number)[]>,
): string {
  function* lines() {
    yield `${header.map(quoted).join(',')}\n`;
    for (const row of rows) {
      if (row.length !== header.length)
        throw new Error(`${path}: a row has ${row.length} cells, the header has ${header.length}`);
      yield `${row.map(cellOf).join(',')}\n`;
    }
  }
  return writeLines(path, lines());
}

/**
 * Writes a CSV file from columns, such as a log.
 *
 * @param digits - decimals of each column; not used for whole numbers (BigInt64Array) and text.
 * @returns SHA-256 of the file's bytes, in hexadecimal.
 */
export function writeNumberCsv(
  path: string,
  header: readonly string[],
  columns: readonly WrittenColumn[],
  digits: readonly number[],
): string {
  const nRows = columns[0]?.length ?? 0;
  if (columns.length !== header.length || columns.some(({ length }) => length !== nRows))
    throw new Error(
      `${path}: ${header.length} names for columns of ${columns.map(({ length }) => length)} rows`,
    );
  const cell = (column: WrittenColumn, row: number, decimals: number): string => {
    const value = column[row]!;
    if (typeof value !== 'number') return typeof value === 'string' ? quoted(value) : String(value);
    if (!Number.isFinite(value)) return cellOf(value);
    const text = value.toFixed(decimals);
    return /^-[0.]+$/.test(text) ? text.slice(1) : text;
  };
  function* chunks() {
    yield `${header.map(quoted).join(',')}\n`;
    for (let from = 0; from < nRows; from += ROWS_PER_CHUNK) {
      let text = '';
      for (let row = from; row < Math.min(from + ROWS_PER_CHUNK, nRows); row++)
        text += `${columns.map((column, index) => cell(column, row, digits[index] ?? 0)).join(',')}\n`;
      yield text;
    }
  }
  return writeLines(path, chunks());
}

/**
 * Writes campaign.yaml.
 *
 * @param yaml - as the file shall say it; checked against the schema first.
 * @returns SHA-256 of the file's bytes, in hexadecimal.
 */
export function writeCampaignYaml(dir: string, yaml: z.input<typeof campaignSchema>): string {
  campaignSchema.parse(yaml);
  return writeText(join(dir, 'campaign.yaml'), stringify(yaml, { lineWidth: 0 }));
}

import { InputError } from '../../errors.js';
import { parseStamp } from '../exact-time.js';
import { CsvScanner } from './csv-scanner.js';
import type { LogPlan } from './log-plan.js';
import { parseNumber } from './parse-field.js';

/** How a CSV log is written. */
export interface CsvDialect {
  delimiter: number;
  decimal: number;
  /** The first line's names; null where it has readings already. */
  header: readonly string[] | null;
}

/** In order of preference: a file that two of them split evenly is split by the earlier. */
const DELIMITERS = [';', '\t', '|', ',', ' '];

const SAMPLE_ROWS = 20;

function sampleRows(head: Buffer, delimiter: string, label: string): string[][] {
  const scanner = new CsvScanner(label);
  scanner.delimiter = delimiter.charCodeAt(0);
  scanner.push(head);
  scanner.end();
  const rows: string[][] = [];
  while (rows.length < SAMPLE_ROWS && scanner.next()) rows.push(scanner.texts());
  return rows;
}

/** 4: its first line has all the names wanted; 2: every line has as many fields; 1: the first line has several. */
function fitOf(rows: readonly string[][], wanted: readonly string[]): number {
  const first = rows[0] ?? [];
  if (first.length < 2) return 0;
  const named = wanted.length > 0 && wanted.every((name) => first.includes(name));
  return (named ? 4 : 0) + (rows.every((row) => row.length === first.length) ? 2 : 0) + 1;
}

function findDelimiter(head: Buffer, wanted: readonly string[], label: string): string {
  let best = ',';
  let bestFit = 0;
  for (const delimiter of DELIMITERS) {
    let rows: string[][] = [];
    try {
      rows = sampleRows(head, delimiter, label);
    } catch (error) {
      // Quotes that do not fit this delimiter may fit another.
      if (!(error instanceof InputError)) throw error;
    }
    const found = fitOf(rows, wanted);
    if (found > bestFit) {
      best = delimiter;
      bestFit = found;
    }
  }
  return best;
}

/** The number in a text of the sample, as {@link parseNumber} sees it. */
function numberOf(text: string, decimal: string): number {
  const bytes = Buffer.from(text);
  return parseNumber(bytes, 0, bytes.length, decimal.charCodeAt(0));
}

function isNumber(text: string): boolean {
  return [',', '.'].some((decimal) => Number.isFinite(numberOf(text, decimal)));
}

/**
 * Finds out how a CSV log is written, as far as its layout does not say.
 *
 * The delimiter is the one that shows the wanted names in the first line, or else splits all lines
 * evenly. Commas in the wanted fields where none has a point mean a decimal comma. Without names in the
 * layout, a first line whose time is a number means that there is no header.
 *
 * @param head - the log's first complete lines.
 */
export function findDialect(head: Buffer, plan: LogPlan): CsvDialect {
  const { layout, label, parts, tag } = plan;
  const numeric = parts.flatMap((part) => [part.time.column, ...part.columns]);
  const wanted = [...numeric, ...(tag === null ? [] : [tag])].filter((column) => typeof column === 'string');
  const delimiter = layout.delimiter ?? findDelimiter(head, wanted, label);
  const rows = sampleRows(head, delimiter, label);
  const first = rows[0] ?? [];
  const cells = (row: readonly string[], names: readonly string[] | null) =>
    numeric.map(
      (column) => (typeof column === 'number' ? row[column - 1] : row[names?.indexOf(column) ?? -1]) ?? '',
    );

  let header: readonly string[] | null;
  if (layout.header !== null) header = layout.header ? first : null;
  else if (wanted.length > 0) {
    const known = wanted.some((name) => first.includes(name));
    header = known || !first.every((text) => text === '' || isNumber(text)) ? first : null;
  } else {
    const time = first[(parts[0]!.time.column as number) - 1] ?? '';
    const readable = cells(first, null).every((text) => text === '' || isNumber(text));
    header = isNumber(time) || (time === '' && readable) ? null : first;
  }

  let decimal = layout.decimal;
  if (decimal === null) {
    const sample = (header ? rows.slice(1) : rows).flatMap((row) => cells(row, header));
    const comma = delimiter !== ',' && sample.some((text) => /^[+-]?\d*,\d+([eE]|$)/.test(text));
    decimal = comma && !sample.some((text) => text.includes('.') && parseStamp(text, 's')) ? ',' : '.';
  }
  return { delimiter: delimiter.charCodeAt(0), decimal: decimal.charCodeAt(0), header };
}

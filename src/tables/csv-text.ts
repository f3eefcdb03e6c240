import Papa from 'papaparse';
import type { JsonCell } from './rows.js';

/**
 * Rows as CSV (RFC 4180, line feeds).
 *
 * A text that a spreadsheet would take for a formula gets an apostrophe before it: names come from campaigns,
 * and opening a table must not run anything.
 */
export function csvText(
  rows: readonly Record<string, JsonCell | boolean>[],
  names: readonly string[],
): string {
  const text = Papa.unparse(
    { fields: [...names], data: rows.map((row) => names.map((name) => row[name] ?? '')) },
    { newline: '\n', escapeFormulae: true },
  );
  return rows.length > 0 ? `${text}\n` : text;
}

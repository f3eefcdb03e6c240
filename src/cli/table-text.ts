import type { ShownTable } from '../tables/filter-rows.js';
import type { StoredTable } from '../tables/read.js';
import { printable, textTable } from './text-table.js';

/** A table for people: what made it, its columns, and its first rows. */
export function tableText(stored: StoredTable, table: ShownTable, rows: number, isQuiet: boolean): string {
  const parts: string[] = [];
  if (!isQuiet) parts.push(madeBy(stored), '\n', columnList(table), '\n');
  const shown = table.rows(rows);
  parts.push(
    textTable(
      table.names.map((name) => ({
        head: name,
        cells: shown.map((row) => cellText(row[name]!)),
        isNumber: ['f64', 'i32'].includes(table.spec.columns[name]!.type),
      })),
    ),
  );
  if (!isQuiet) {
    const of =
      table.nRows < table.nAll ? `${table.nRows} rows of ${table.nAll} that hold` : `${table.nRows} rows`;
    parts.push(`${shown.length < table.nRows ? `first ${shown.length} of ` : ''}${of}\n`);
  }
  return parts.join('');
}

function madeBy({ path, metadata }: StoredTable): string {
  const lines = [path];
  const say = (name: string, key: string) => {
    const value = metadata[key];
    if (value !== undefined) lines.push(`  ${name.padEnd(9)} ${value}`);
  };
  say('stage', 'treadline.stage');
  say('method', 'treadline.method');
  say('settings', 'treadline.settings');
  say('version', 'treadline.version');
  say('t0', 't0');
  for (const [name, sha256] of Object.entries(inputsOf(metadata)))
    lines.push(`  ${'input'.padEnd(9)} ${name} ${sha256.slice(0, 12)}`);
  return `${lines.join('\n')}\n`;
}

function inputsOf(metadata: Readonly<Record<string, string>>): Record<string, string> {
  try {
    return JSON.parse(metadata['treadline.inputs'] ?? '{}') as Record<string, string>;
  } catch {
    return {};
  }
}

function columnList({ spec, names }: ShownTable): string {
  return textTable([
    { head: 'column', cells: names, isNumber: false },
    { head: 'type', cells: names.map((name) => spec.columns[name]!.type), isNumber: false },
    { head: 'unit', cells: names.map((name) => spec.columns[name]!.unit ?? ''), isNumber: false },
    { head: 'what', cells: names.map((name) => spec.columns[name]!.about), isNumber: false },
  ]);
}

/** Enough digits to tell rows apart, few enough to read. */
function cellText(value: string | number | boolean | null): string {
  if (value === null) return '–';
  if (typeof value === 'string') return printable(value);
  if (typeof value === 'boolean' || Number.isInteger(value)) return String(value);
  const size = Math.abs(value);
  return size >= 1e-3 && size < 1e7 ? value.toFixed(4) : value.toPrecision(5);
}

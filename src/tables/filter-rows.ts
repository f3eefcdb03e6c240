import { type ColumnTable, table } from 'arquero';
import { InputError, messageOf } from '../errors.js';
import { anyColumnsOf, type StoredTable } from './read.js';
import type { JsonCell } from './rows.js';
import type { TableSpec } from './spec.js';

/** A stored table's rows, filtered, for people and other programs. */
export interface ShownTable {
  spec: TableSpec;
  names: string[];
  nRows: number;
  /** Rows before filtering. */
  nAll: number;
  /** The first `count` rows (default all); numbers that are not finite are null, flags true or false. */
  rows(count?: number): Record<string, JsonCell | boolean>[];
}

/**
 * Rows of a table for which every expression holds.
 *
 * @param where - arquero expressions of a row `d`, e.g. `d.error_m > 3 && d.role == "scored"`.
 * @throws InputError `bad-where` where an expression cannot be understood or names a column that is not there.
 */
export function filterRows(stored: StoredTable, where: readonly string[]): ShownTable {
  const { spec, columns } = anyColumnsOf(stored.table, stored.path);
  const names = Object.keys(columns);
  let filtered: ColumnTable = table(columns as Record<string, ArrayLike<unknown>>);
  const nAll = filtered.numRows();
  for (const expression of where) {
    try {
      filtered = filtered.filter(`d => (${expression})`).reify();
    } catch (error) {
      throw new InputError(
        'bad-where',
        `--where ${expression}: ${messageOf(error).replaceAll(/\s+/g, ' ')}; must be an expression of the row d, ` +
          `such as d.${names[0]} > 3; columns are ${names.join(', ')}`,
        { cause: error },
      );
    }
  }
  return {
    spec,
    names,
    nRows: filtered.numRows(),
    nAll,
    rows(count = filtered.numRows()) {
      const shown = filtered.slice(0, count);
      const values = names.map((name) => shown.array(name) as ArrayLike<number | string>);
      return Array.from({ length: shown.numRows() }, (_, row) =>
        Object.fromEntries(names.map((name, i) => [name, cell(values[i]![row]!, spec.columns[name]!.type)])),
      );
    },
  };
}

function cell(value: number | string, type: string): JsonCell | boolean {
  if (type === 'bool') return value === 1;
  return typeof value === 'number' && !Number.isFinite(value) ? null : value;
}

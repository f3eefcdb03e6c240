import { InputError } from '../../errors.js';
import { didYouMean, listNames } from '../nearest-name.js';
import type { ColumnRef } from '../types.js';

/**
 * Index from 0 of a column in a file.
 *
 * @param names - the header's names; null where the file has none, with `nColumns` columns.
 * @throws InputError `no-column` where the file does not have it, or has it twice.
 */
export function findColumn(
  column: ColumnRef,
  names: readonly string[] | null,
  nColumns: number,
  label: string,
): number {
  if (typeof column === 'number') {
    if (column <= nColumns) return column - 1;
    throw new InputError('no-column', `${label}: no column ${column}; it has ${nColumns} columns`);
  }
  const index = names?.indexOf(column) ?? -1;
  if (!names)
    throw new InputError(
      'no-column',
      `${label}: no column "${column}", as its first line has numbers instead of names; give columns by number from 1 in the layout`,
    );
  if (index === -1)
    throw new InputError(
      'no-column',
      `${label}: no column "${column}"; it has ${listNames(names)}.${didYouMean(column, names)}`,
    );
  if (names.indexOf(column, index + 1) !== -1)
    throw new InputError(
      'no-column',
      `${label}: column "${column}" is there twice; give columns by number from 1 in the layout`,
    );
  return index;
}

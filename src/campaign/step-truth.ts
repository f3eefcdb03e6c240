import { readCampaignTable } from './campaign-table.js';
import { timeOf, walkOf } from './passes.js';
import type { Problems } from './problems.js';
import type { StepInstant, Walk } from './types.js';

const COLUMNS = { required: ['walk', 't_s'], optional: ['foot'] };

/**
 * Reads step-truth.csv, in file order; other columns are passed over.
 *
 * Two steps at the same instant are left as they are: foot switches do report a contact twice, and
 * scoring tells the second from a real step.
 *
 * @param walks - null where walks.csv could not be read.
 * @returns null where there is no step-truth.csv, or where it cannot be read (reported).
 */
export function readStepTruth(
  dir: string,
  walks: readonly Walk[] | null,
  problems: Problems,
): StepInstant[] | null {
  const table = readCampaignTable(dir, 'step-truth.csv', COLUMNS, problems);
  if (!table) return null;
  const names = walks?.map(({ walk }) => walk) ?? null;
  return table.rows.map((row) => ({
    walk: walkOf(row, names),
    time: timeOf(row),
    foot: row.text('foot'),
    line: row.line,
  }));
}

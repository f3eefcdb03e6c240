import { readCampaignTable } from './campaign-table.js';
import type { Problems } from './problems.js';
import type { Walker } from './types.js';

const COLUMNS = { required: ['walker', 'group'], optional: ['height_m', 'leg_m', 'mass_kg'] };

/**
 * Reads walkers.csv; columns of the campaign's own are kept as text.
 *
 * The bounds on sizes are there to catch centimetres and pounds, not unusual people.
 *
 * @returns null where it cannot be read (reported).
 */
export function readWalkers(dir: string, problems: Problems): Walker[] | null {
  const table = readCampaignTable(dir, 'walkers.csv', COLUMNS, problems);
  if (!table) return null;
  const lines = new Map<string, number>();
  return table.rows.map((row) => {
    const walker = row.needed('walker');
    const before = lines.get(walker);
    if (before !== undefined && walker !== '')
      row.problem('walker', `"${walker}" is in line ${before} already; keep one row a walker`);
    lines.set(walker, row.line);
    return {
      walker,
      group: row.needed('group'),
      heightM: row.number('height_m', 'm', 0.4, 2.8),
      legM: row.number('leg_m', 'm', 0.2, 1.6),
      massKg: row.number('mass_kg', 'kg', 2, 700),
      extra: row.extra(COLUMNS),
    };
  });
}

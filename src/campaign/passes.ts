import { readCampaignTable, type TableRow } from './campaign-table.js';
import { parseStamp } from './exact-time.js';
import { didYouMean, listNames } from './nearest-name.js';
import type { Problems } from './problems.js';
import type { Pass, SurveyedPoint, Walk } from './types.js';

const COLUMNS = { required: ['walk', 'checkpoint', 't_s'], optional: ['sigma_s', 'role'] };

/**
 * Standard uncertainty of a pass's time where passes.csv gives none. Markers tapped on passing are
 * good to a quarter of a second: below 250 ms in published annotation of gait trials.
 */
const DEFAULT_SIGMA_S = 0.25;

const ROLES = ['anchor', 'scored'] as const;

/** The row's time as written; a problem where it is not a number of seconds. */
export function timeOf(row: TableRow): string {
  const time = row.needed('t_s');
  if (time !== '' && !parseStamp(time, 's')) row.problem('t_s', `must be a number (s), got "${time}"`);
  return time;
}

/** The row's walk; a problem where walks.csv does not have it. */
export function walkOf(row: TableRow, walks: readonly string[] | null): string {
  const walk = row.needed('walk');
  if (walks && walk !== '' && !walks.includes(walk))
    row.problem(
      'walk',
      `"${walk}" is not in walks.csv; there are ${listNames(walks)}.${didYouMean(walk, walks)}`,
    );
  return walk;
}

/**
 * Reads passes.csv, in file order. `sigma_s` defaults to 0.25 s, `role` to `scored`; other columns are passed over.
 *
 * @param walks - null where walks.csv could not be read.
 * @param survey - null where there is no survey: checkpoints are then not looked up, and nothing is scored.
 * @returns null where there is no passes.csv, or where it cannot be read (reported).
 */
export function readPasses(
  dir: string,
  walks: readonly Walk[] | null,
  survey: ReadonlyMap<string, SurveyedPoint> | null,
  problems: Problems,
): Pass[] | null {
  const table = readCampaignTable(dir, 'passes.csv', COLUMNS, problems);
  if (!table) return null;
  const names = walks?.map(({ walk }) => walk) ?? null;
  const checkpoints = survey && [...survey.keys()];
  const lines = new Map<string, number>();
  return table.rows.map((row) => {
    const walk = walkOf(row, names);
    const checkpoint = row.needed('checkpoint');
    if (survey && checkpoints && checkpoint !== '' && !survey.has(checkpoint))
      row.problem(
        'checkpoint',
        `"${checkpoint}" is not in survey.csv; there are ${listNames(checkpoints)}.${didYouMean(checkpoint, checkpoints)}`,
      );
    const time = timeOf(row);
    const stamp = parseStamp(time, 's');
    const key = JSON.stringify([walk, checkpoint, stamp?.seconds, stamp?.femtos]);
    const before = lines.get(key);
    if (before !== undefined && stamp)
      row.problem('t_s', `the same pass is in line ${before} already; keep one row`);
    lines.set(key, row.line);
    const role = row.text('role') ?? 'scored';
    const known = ROLES.find((each) => each === role);
    if (!known) row.problem('role', `got "${role}"; allowed: ${ROLES.join(', ')}.${didYouMean(role, ROLES)}`);
    const sigmaS = row.number('sigma_s', 's', 0) ?? DEFAULT_SIGMA_S;
    return { walk, checkpoint, time, sigmaS, role: known ?? 'scored', line: row.line };
  });
}

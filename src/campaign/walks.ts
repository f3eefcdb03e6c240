import { readCampaignTable, type TableRow } from './campaign-table.js';
import { folderNameProblem } from './folder-name.js';
import { didYouMean, listNames } from './nearest-name.js';
import type { Problems } from './problems.js';
import { resolveInside } from './resolve-inside.js';
import type { SurveyedPoint, Walk, Walker } from './types.js';

const COLUMNS = {
  required: ['walk', 'walker', 'log'],
  optional: ['device', 'carry', 'layout', 'level', 'start', 'start_heading_deg', 'distance_m', 'steps'],
};

/** What walks refer to; null where the file concerned could not be read, so that it is not blamed twice. */
export interface WalkReferences {
  walkers: readonly Walker[] | null;
  layouts: readonly string[] | null;
  survey: ReadonlyMap<string, SurveyedPoint> | null;
}

function checkReference(
  row: TableRow,
  column: string,
  name: string,
  known: readonly string[],
  where: string,
): void {
  if (!known.includes(name))
    row.problem(
      column,
      `"${name}" is not in ${where}; there are ${listNames(known)}.${didYouMean(name, known)}`,
    );
}

/** The walk's layout: the one it names, or the only one there is. */
function layoutOf(row: TableRow, layouts: readonly string[] | null): string {
  const name = row.text('layout');
  if (!layouts) return name ?? '';
  if (name !== null) {
    checkReference(row, 'layout', name, layouts, "campaign.yaml's layouts");
    return name;
  }
  if (layouts.length > 1)
    row.problem('layout', `must be given where campaign.yaml has several layouts: ${listNames(layouts)}`);
  return layouts[0] ?? '';
}

/**
 * Reads walks.csv; columns of the campaign's own are kept as text.
 *
 * `layout` defaults to the only layout of campaign.yaml. Whether the logs are there is found when they
 * are read: one lost log does not stop the other walks.
 *
 * @returns null where it cannot be read (reported).
 */
export function readWalks(dir: string, known: WalkReferences, problems: Problems): Walk[] | null {
  const table = readCampaignTable(dir, 'walks.csv', COLUMNS, problems);
  if (!table) return null;
  const walkers = known.walkers?.map(({ walker }) => walker);
  const checkpoints = known.survey && [...known.survey.keys()];
  const folders = new Map<string, { walk: string; line: number }>();
  return table.rows.map((row) => {
    const walk = row.needed('walk');
    const unsafe = folderNameProblem(walk);
    if (unsafe !== null) row.problem('walk', `"${walk}" ${unsafe}`);
    const before = folders.get(walk.toLowerCase());
    if (before?.walk === walk && walk !== '')
      row.problem('walk', `"${walk}" is in line ${before.line} already; each walk needs a name of its own`);
    else if (before && walk !== '')
      row.problem(
        'walk',
        `"${walk}" and "${before.walk}" (line ${before.line}) differ only in case; not every file system tells them apart`,
      );
    folders.set(walk.toLowerCase(), { walk, line: row.line });
    const walker = row.needed('walker');
    if (walkers && walker !== '') checkReference(row, 'walker', walker, walkers, 'walkers.csv');
    const log = row.needed('log');
    if (log !== '') problems.attempt(() => resolveInside(dir, log, `${table.file}:${row.line} log`));
    const start = row.text('start');
    if (checkpoints && start !== null) checkReference(row, 'start', start, checkpoints, 'survey.csv');
    const steps = row.number('steps', '', 0);
    if (steps !== null && !Number.isInteger(steps))
      row.problem('steps', `must be a whole number, got "${steps}"`);
    return {
      walk,
      walker,
      log,
      device: row.text('device'),
      carry: row.text('carry'),
      layout: layoutOf(row, known.layouts),
      level: row.text('level'),
      start,
      startHeadingDeg: row.number('start_heading_deg', 'degrees', -360, 360),
      distanceM: row.number('distance_m', 'm', 0),
      steps,
      extra: row.extra(COLUMNS),
      line: row.line,
    };
  });
}

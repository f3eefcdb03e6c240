import { gridFromGeodetic } from '../geometry/enu.js';
import { readCampaignTable, type TableRow } from './campaign-table.js';
import type { Problems } from './problems.js';
import type { Grid, SurveyedPoint } from './types.js';

const COLUMNS = {
  required: ['checkpoint'],
  optional: ['east_m', 'north_m', 'up_m', 'lat_deg', 'lon_deg', 'height_m', 'level', 'sigma_m'],
};

/** Standard uncertainty of a surveyed coordinate where survey.csv gives none: tape or laser from the building's plan. Common practice, no source. */
const DEFAULT_SIGMA_M = 0.1;

/** A coordinate that must be there; 0 with a reported problem where it is not. */
function coordinate(row: TableRow, column: string, unit: string, low?: number, high?: number): number {
  row.needed(column);
  return row.number(column, unit, low, high) ?? 0;
}

/**
 * Reads survey.csv: checkpoints in the grid (east_m, north_m) or as latitude and longitude.
 *
 * `sigma_m` defaults to 0.1 m, `height_m` to the grid origin's height. Other columns are passed over.
 *
 * @param grid - null where campaign.yaml could not be read: coordinates are then checked, not converted.
 * @returns null where there is no survey.csv, or where it cannot be read (reported).
 */
export function readSurvey(
  dir: string,
  grid: Grid | null,
  problems: Problems,
): Map<string, SurveyedPoint> | null {
  const table = readCampaignTable(dir, 'survey.csv', COLUMNS, problems);
  if (!table) return null;
  const { file, header } = table;
  const has = (...columns: string[]) => columns.every((column) => header.includes(column));
  const geodetic = has('lat_deg', 'lon_deg');
  if (geodetic === has('east_m', 'north_m')) {
    problems.add(`${file}:1 must have either the columns east_m and north_m, or lat_deg and lon_deg`);
    return null;
  }
  if (geodetic && grid && !grid.origin) {
    problems.add(
      `${file}:1 has lat_deg and lon_deg, but campaign.yaml gives no grid.origin to convert them with`,
    );
    return null;
  }
  const survey = new Map<string, SurveyedPoint>();
  const lines = new Map<string, number>();
  for (const row of table.rows) {
    const checkpoint = row.needed('checkpoint');
    const before = lines.get(checkpoint);
    if (before !== undefined && checkpoint !== '')
      row.problem('checkpoint', `"${checkpoint}" is surveyed in line ${before} already; keep one row`);
    lines.set(checkpoint, row.line);
    let point: { eastM: number; northM: number; upM: number | null };
    if (geodetic) {
      const latDeg = coordinate(row, 'lat_deg', 'degrees', -90, 90);
      const lonDeg = coordinate(row, 'lon_deg', 'degrees', -180, 180);
      const heightM = row.number('height_m', 'm');
      const { origin = null, rotationDeg = 0 } = grid ?? {};
      const inGrid = gridFromGeodetic(latDeg, lonDeg, heightM ?? origin?.heightM ?? 0, {
        origin: origin ?? { latDeg, lonDeg, heightM: 0 },
        rotationDeg,
      });
      point = { ...inGrid, upM: heightM === null ? null : inGrid.upM };
    } else
      point = {
        eastM: coordinate(row, 'east_m', 'm'),
        northM: coordinate(row, 'north_m', 'm'),
        upM: row.number('up_m', 'm'),
      };
    const sigmaM = row.number('sigma_m', 'm', 0) ?? DEFAULT_SIGMA_M;
    survey.set(checkpoint, { checkpoint, ...point, level: row.text('level'), sigmaM });
  }
  return survey;
}

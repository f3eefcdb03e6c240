import { createHash, type Hash } from 'node:crypto';
import { InputError } from '../errors.js';
import { inDeviceUnits } from './logs/device-units.js';
import { type LogPlan, planLog, type SensorPart } from './logs/log-plan.js';
import { readArrowLog } from './logs/read-arrow-log.js';
import { CsvLogReader } from './logs/read-csv-log.js';
import { readParquetLog } from './logs/read-parquet-log.js';
import { storedBytes, unzippedBytes } from './logs/stored-bytes.js';
import { didYouMean, listNames } from './nearest-name.js';
import type { ImportCounts, LogReadings } from './readings.js';
import { resolveInside } from './resolve-inside.js';
import type { LogLayout, SensorName, Walk } from './types.js';

export { secondsSinceStart } from './seconds-since-start.js';

/** By the first bytes: the magic of an Arrow file or stream, or of Parquet; anything else is text. */
function formatOf(head: Buffer): 'csv' | 'arrow' | 'parquet' {
  if (head.toString('latin1', 0, 6) === 'ARROW1') return 'arrow';
  if (head.length >= 4 && head.readUInt32LE(0) === 0xffffffff) return 'arrow';
  return head.toString('latin1', 0, 4) === 'PAR1' ? 'parquet' : 'csv';
}

async function readFile(path: string, plan: LogPlan, hash: Hash): Promise<void> {
  const chunks: Buffer[] = [];
  let csv: CsvLogReader | null = null;
  let format: ReturnType<typeof formatOf> | null = null;
  for await (const chunk of unzippedBytes(path, plan.label, hash)) {
    if (csv) {
      csv.push(chunk);
      continue;
    }
    chunks.push(chunk);
    if (format !== null || chunks.reduce((sum, { length }) => sum + length, 0) < 6) continue;
    format = formatOf(Buffer.concat(chunks));
    if (format !== 'csv') continue;
    csv = new CsvLogReader(plan);
    for (const each of chunks.splice(0)) csv.push(each);
  }
  const bytes = Buffer.concat(chunks);
  if (csv === null && bytes.length === 0) throw new InputError('empty-log', `${plan.label}: is empty`);
  if (format === 'arrow') return readArrowLog(bytes, plan);
  if (format === 'parquet') return readParquetLog(bytes, plan);
  csv ??= new CsvLogReader(plan);
  csv.push(bytes);
  csv.finish();
}

/** Why there is no accelerometer reading: none of its rows, or none that is whole. */
function noAccelerometer(plan: LogPlan, part: SensorPart): InputError {
  let why = '';
  if (part.readings.missing > 0)
    why = `; ${part.readings.missing} rows lack the time or one of ${listNames(part.columns)}`;
  else if (plan.tag !== null)
    why =
      `; no row has "${part.tag}" in column ${plan.tag}, there are ${listNames(plan.unclaimedTags)}.` +
      didYouMean(part.tag ?? '', plan.unclaimedTags);
  return new InputError('no-readings', `${plan.label}: no accelerometer readings${why}`);
}

/**
 * Reads one walk's log as its layout describes it: CSV, Arrow or Parquet, gzipped or not, told apart by content.
 *
 * Readings come out in the device frame and the tables' units, in time order (those of one instant in
 * file order), times in seconds since the earliest reading of any sensor. Nothing is dropped but
 * readings with a value or the time missing, which are counted; nothing is repaired.
 *
 * @throws InputError, one line that names the file and where there is one the row and column:
 *   `outside-campaign`, `no-log`, `unreadable-log`, `corrupt-log`, `empty-log`, `malformed-csv`,
 *   `no-column`, `short-row`, `not-a-number`, `wrong-type`, `no-readings`.
 */
export async function readLog(campaignDir: string, walk: Walk, layout: LogLayout): Promise<LogReadings> {
  const hash = createHash('sha256');
  const plans = planLog(walk.log, layout);
  for (const plan of plans)
    await readFile(resolveInside(campaignDir, plan.label, `walk ${walk.walk} log`), plan, hash);
  const readings: Partial<Record<SensorName, Record<string, Float64Array>>> = {};
  const counts: Partial<Record<SensorName, ImportCounts>> = {};
  const { first } = plans[0]!;
  for (const plan of plans)
    for (const part of plan.parts) {
      if (part.sensor === 'accel' && part.readings.count === 0) throw noAccelerometer(plan, part);
      const ordered = part.readings.inTimeOrder(first);
      counts[part.sensor] = ordered.counts;
      if (ordered.counts.rows === 0) continue;
      const values = inDeviceUnits(ordered.values, part.sensor, layout.sensors[part.sensor]!, layout);
      readings[part.sensor] = namedColumns(part.sensor, ordered.t_s, values);
    }
  return {
    t0: { value: first.text, unit: first.unit },
    accel: (readings.accel as LogReadings['accel']) ?? null,
    gyro: (readings.gyro as LogReadings['gyro']) ?? null,
    mag: (readings.mag as LogReadings['mag']) ?? null,
    baro: (readings.baro as LogReadings['baro']) ?? null,
    counts,
    sha256: hash.digest('hex'),
    skippedRows: plans.reduce((sum, plan) => sum + plan.unclaimedRows, 0),
  };
}

const COLUMN_NAMES: Readonly<Record<SensorName, readonly string[]>> = {
  accel: ['x_mps2', 'y_mps2', 'z_mps2'],
  gyro: ['x_radps', 'y_radps', 'z_radps'],
  mag: ['x_uT', 'y_uT', 'z_uT'],
  baro: ['p_hPa'],
};

function namedColumns(sensor: SensorName, t_s: Float64Array, values: readonly Float64Array[]) {
  return { t_s, ...Object.fromEntries(COLUMN_NAMES[sensor].map((name, axis) => [name, values[axis]!])) };
}

/**
 * SHA-256 of a walk's log as {@link readLog} gives it, without reading the log's content.
 *
 * @throws InputError `outside-campaign`, `no-log`, `unreadable-log`.
 */
export async function hashLog(campaignDir: string, walk: Walk, layout: LogLayout): Promise<string> {
  const hash = createHash('sha256');
  for (const { label } of planLog(walk.log, layout))
    for await (const _ of storedBytes(
      resolveInside(campaignDir, label, `walk ${walk.walk} log`),
      label,
      hash,
    ));
  return hash.digest('hex');
}

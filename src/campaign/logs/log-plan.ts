import { InputError } from '../../errors.js';
import { type ColumnRef, type LogLayout, SENSOR_NAMES, type SensorName, type TimeUnit } from '../types.js';
import { SensorColumnSet } from './sensor-column-set.js';

/** One sensor's part of a log file: where it stands in a row, and what has been read of it. */
export interface SensorPart {
  sensor: SensorName;
  columns: readonly ColumnRef[];
  tag: string | null;
  time: { column: ColumnRef; unit: TimeUnit };
  /** Whether a row without any value of the sensor is a lost reading, or just a row of another sensor. */
  emptyIsMissing: boolean;
  readings: SensorColumnSet;
}

/** The earliest stamp of all readings so far, as the log has it. */
export interface FirstStamp {
  seconds: number;
  femtos: number;
  text: string;
  unit: TimeUnit;
}

/** How one log file is read. */
export interface LogPlan {
  /** The file's name in messages. */
  label: string;
  tag: ColumnRef | null;
  parts: readonly SensorPart[];
  layout: LogLayout;
  first: FirstStamp;
  /** Rows of a tagged log that are of no sensor in the layout. */
  unclaimedRows: number;
  /** Some of the tags of such rows, for messages. */
  unclaimedTags: Set<string>;
}

/**
 * One plan for each file of a walk's log, in the order of their names.
 *
 * @param log - as written in walks.csv: a file, or the folder of a `split` layout.
 */
export function planLog(log: string, layout: LogLayout): LogPlan[] {
  const first: FirstStamp = {
    seconds: Number.POSITIVE_INFINITY,
    femtos: 0,
    text: '',
    unit: layout.time.unit,
  };
  const files = new Map<string, SensorPart[]>();
  for (const sensor of SENSOR_NAMES) {
    const part = layout.sensors[sensor];
    if (!part) continue;
    const file = layout.shape === 'split' ? `${log.replace(/\/+$/, '')}/${part.file}` : log;
    const parts = files.get(file) ?? [];
    files.set(file, parts);
    const readings = new SensorColumnSet(part.columns.length);
    const time = part.time ?? layout.time;
    parts.push({ sensor, columns: part.columns, tag: part.tag, time, emptyIsMissing: false, readings });
  }
  if (files.size === 0)
    throw new InputError('no-sensor', `layout ${layout.name}: has no sensor; it needs accel`);
  return [...files]
    .sort(([a], [b]) => (a < b ? -1 : 1))
    .map(([label, parts]) => {
      for (const part of parts)
        part.emptyIsMissing = layout.shape === 'tagged' || (layout.shape === 'split' && parts.length === 1);
      return {
        label,
        tag: layout.tag,
        parts,
        layout,
        first,
        unclaimedRows: 0,
        unclaimedTags: new Set<string>(),
      };
    });
}

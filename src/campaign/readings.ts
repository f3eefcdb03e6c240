import type { ReadingsAccel, ReadingsBaro, ReadingsGyro, ReadingsMag } from '../tables/schemas.js';
import type { SensorName, TimeUnit } from './types.js';

/** What reading one sensor's rows brought up; kept in the readings table's metadata for the log check. */
export interface ImportCounts {
  /** Readings of this sensor in the file. */
  rows: number;
  /** Readings whose time is earlier than the reading before them in the file. */
  outOfOrder: number;
  /** Readings with the very time of another one. */
  duplicateTimes: number;
  /** Rows left out because a value was empty or not a number (NaN), as loggers write a missing reading. */
  missing: number;
}

/** One walk's log as read: device frame, SI units (and uT, hPa), in time order, nothing dropped or repaired. */
export interface LogReadings {
  /** The first reading's own time stamp, as written, and its unit. */
  t0: { value: string; unit: TimeUnit };
  accel: ReadingsAccel | null;
  gyro: ReadingsGyro | null;
  mag: ReadingsMag | null;
  baro: ReadingsBaro | null;
  counts: Readonly<Partial<Record<SensorName, ImportCounts>>>;
  /** SHA-256 of the log's bytes as stored, over its files in the order of their names. */
  sha256: string;
  /** Rows of a tagged log that are of no sensor in the layout; they are passed over. */
  skippedRows?: number;
}

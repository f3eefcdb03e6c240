/** A campaign folder as read: plain data, checked, with defaults filled in. */
export interface Campaign {
  /** Absolute path of the folder. */
  dir: string;
  name: string;
  grid: Grid;
  /** Whether times of passes and truths are in the log's own time base or since its first reading. */
  truthTime: 'log' | 'relative';
  layouts: Readonly<Record<string, LogLayout>>;
  walkers: readonly Walker[];
  walks: readonly Walk[];
  /** Surveyed checkpoints by name; null where there is no survey.csv. */
  survey: ReadonlyMap<string, SurveyedPoint> | null;
  /** Passes in file order; null where there is no passes.csv. */
  passes: readonly Pass[] | null;
  /** Labelled step instants in file order; null where there is no step-truth.csv. */
  stepTruth: readonly StepInstant[] | null;
  /** Files under attitude-truth/ and path-truth/, by walk, absolute. */
  attitudeTruth: ReadonlyMap<string, string>;
  pathTruth: ReadonlyMap<string, string>;
  /** floor-plan.geojson (or .gz), absolute; null where there is none. */
  floorPlan: string | null;
  /** The floor plan's edges by level, `""` for all levels together; empty where there is no plan. */
  wallEdges: ReadonlyMap<string, Float64Array>;
  /** Calibration files by device and by walker, absolute. */
  deviceCalibrations: ReadonlyMap<string, string>;
  walkerCalibrations: ReadonlyMap<string, string>;
}

export interface Grid {
  /** Null with plain `local`. */
  origin: { latDeg: number; lonDeg: number; heightM: number } | null;
  /** Grid north is turned this much clockwise from true north. */
  rotationDeg: number;
  /** ISO date for the geomagnetic model; null where not given. */
  date: string | null;
  /** Given declination; null: from the model, or assumed 0 with plain `local`. */
  declinationDeg: number | null;
}

export interface Walker {
  walker: string;
  group: string;
  heightM: number | null;
  legM: number | null;
  massKg: number | null;
  /** Any other column, as text. */
  extra: Readonly<Record<string, string>>;
}

export interface Walk {
  walk: string;
  walker: string;
  /** The log's path in the campaign folder, as written. For `split` layouts a folder or a pattern, see {@link LogLayout}. */
  log: string;
  device: string | null;
  carry: string | null;
  layout: string;
  level: string | null;
  start: string | null;
  startHeadingDeg: number | null;
  distanceM: number | null;
  /** Counted steps, for the count error. */
  steps: number | null;
  extra: Readonly<Record<string, string>>;
  /** Line of walks.csv, from 1, for messages. */
  line: number;
}

export interface SurveyedPoint {
  checkpoint: string;
  eastM: number;
  northM: number;
  upM: number | null;
  level: string | null;
  sigmaM: number;
}

export interface Pass {
  walk: string;
  checkpoint: string;
  /** As written, so that a time base in nanoseconds keeps its digits until the log's start is subtracted. */
  time: string;
  sigmaS: number;
  role: 'anchor' | 'scored';
  line: number;
}

export interface StepInstant {
  walk: string;
  /** As written; see {@link Pass.time}. */
  time: string;
  foot: string | null;
  line: number;
}

export type SensorName = 'accel' | 'gyro' | 'mag' | 'baro';
export const SENSOR_NAMES: readonly SensorName[] = ['accel', 'gyro', 'mag', 'baro'];

export type TimeUnit = 's' | 'ms' | 'us' | 'ns';

/** Column by name, or by number from 1 where a file has no header. */
export type ColumnRef = string | number;

export interface SensorLayout {
  columns: readonly ColumnRef[];
  unit: string;
  /** Only for the accelerometer. */
  sign: 'specific-force' | 'gravity-directed';
  /** The tag's value in a `tagged` file. */
  tag: string | null;
  /** The file's name below the walk's log folder in a `split` layout. */
  file: string | null;
  /** The sensor's own time column in a `split` layout; null: the layout's. */
  time: { column: ColumnRef; unit: TimeUnit } | null;
}

export interface LogLayout {
  name: string;
  shape: 'wide' | 'tagged' | 'split';
  time: { column: ColumnRef; unit: TimeUnit };
  /** The column that says which sensor, in a `tagged` file. */
  tag: ColumnRef | null;
  sensors: Readonly<Partial<Record<SensorName, SensorLayout>>>;
  /** Device axes in terms of the file's: for each of x, y, z the file axis (0..2) and its sign. */
  axes: readonly { axis: 0 | 1 | 2; sign: 1 | -1 }[];
  /** CSV: null means found out from the file. */
  delimiter: string | null;
  decimal: '.' | ',' | null;
  header: boolean | null;
}

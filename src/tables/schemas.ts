import { bool, type Columns, defineTable, f64, i32, optionalF64, utf8 } from './spec.js';

/** Accelerometer readings as the log has them, in time order, device frame. */
export const readingsAccelTable = defineTable('readings-accel', {
  t_s: f64('s', "since the walk's first reading of any sensor"),
  x_mps2: f64('mps2', 'specific force, to the right of the screen'),
  y_mps2: f64('mps2', 'specific force, to the top of the screen'),
  z_mps2: f64('mps2', 'specific force, out of the screen'),
});

/** Gyroscope readings as the log has them, in time order, device frame. */
export const readingsGyroTable = defineTable('readings-gyro', {
  t_s: f64('s', "since the walk's first reading of any sensor"),
  x_radps: f64('radps', 'angular rate about x'),
  y_radps: f64('radps', 'angular rate about y'),
  z_radps: f64('radps', 'angular rate about z'),
});

/** Magnetometer readings as the log has them, in time order, device frame. */
export const readingsMagTable = defineTable('readings-mag', {
  t_s: f64('s', "since the walk's first reading of any sensor"),
  x_uT: f64('uT', 'magnetic flux density along x'),
  y_uT: f64('uT', 'magnetic flux density along y'),
  z_uT: f64('uT', 'magnetic flux density along z'),
});

/** Barometer readings as the log has them, in time order. */
export const readingsBaroTable = defineTable('readings-baro', {
  t_s: f64('s', "since the walk's first reading of any sensor"),
  p_hPa: f64('hPa', 'air pressure'),
});

/** What reading the log brought up, a row per sensor; it has no file of its own but stands in the readings' metadata. */
export const readingsImportTable = defineTable('readings-import', {
  sensor: utf8('accel, gyro, mag or baro'),
  rows: i32('readings of this sensor in the log'),
  out_of_order: i32('readings whose time is earlier than that of the reading before them in the file'),
  duplicate_times: i32('readings with the very time of another one'),
  missing: i32('rows left out because a value was empty or not a number'),
});

/** What the log check noticed. */
export const findingsTable = defineTable('findings', {
  severity: utf8('note, warn or fail'),
  kind: utf8('what was noticed, one word'),
  sensor: utf8('accel, gyro, mag, baro, or walk for the walk as a whole'),
  from_s: f64('s', 'where it begins'),
  to_s: f64('s', 'where it ends'),
  value: f64('', 'how big it is, in the unit that the message names'),
  message: utf8('what it is, what it does to the result, what to do'),
});

/** All sensors on one uniform time grid, calibrated, device frame. */
export const motionTable = defineTable('motion', {
  t_s: f64('s', "since the walk's first reading of any sensor"),
  ax_mps2: f64('mps2', 'specific force along x'),
  ay_mps2: f64('mps2', 'specific force along y'),
  az_mps2: f64('mps2', 'specific force along z'),
  gx_radps: optionalF64('radps', 'angular rate about x'),
  gy_radps: optionalF64('radps', 'angular rate about y'),
  gz_radps: optionalF64('radps', 'angular rate about z'),
  mx_uT: optionalF64('uT', 'magnetic flux density along x'),
  my_uT: optionalF64('uT', 'magnetic flux density along y'),
  mz_uT: optionalF64('uT', 'magnetic flux density along z'),
  p_hPa: optionalF64('hPa', 'air pressure'),
  gap: bool('inside a gap of the accelerometer or gyroscope longer than the recipe bridges'),
});

/** Orientation of the device against east, north, up. */
export const attitudeTable = defineTable('attitude', {
  t_s: f64('s', "since the walk's first reading of any sensor"),
  qw: f64('', 'scalar part of the unit quaternion device -> east, north, up; never negative'),
  qx: f64('', 'x part'),
  qy: f64('', 'y part'),
  qz: f64('', 'z part'),
  bgx_radps: f64('radps', 'gyroscope bias about x, to be subtracted'),
  bgy_radps: f64('radps', 'gyroscope bias about y'),
  bgz_radps: f64('radps', 'gyroscope bias about z'),
  mag_trust: f64('', 'weight that the magnetometer had, 0 to 1'),
  tilt_sd_rad: f64('rad', 'standard deviation of the tilt error about one horizontal axis'),
  yaw_sd_rad: f64('rad', 'standard deviation of the yaw error'),
});

/** One row a step. */
export const stepsTable = defineTable('steps', {
  step: i32('number of the step, from 1'),
  t_s: f64('s', 'the event: the foot contact that the step is told by'),
  start_s: f64('s', 'where the body begins to move for this step: half way to the event before'),
  end_s: f64('s', 'where it ends: half way to the event after'),
  strength_mps2: f64('mps2', 'peak to valley of the vertical acceleration over the step'),
  confidence: f64('', 'probability that the event is a step, 0 to 1'),
  bout: i32('number of the walking bout, from 1'),
});

/** Length of each step (not of a stride, which is two steps). */
export const stridesTable = defineTable('strides', {
  step: i32('number of the step'),
  length_m: f64('m', 'length of this one step'),
  sd_m: f64('m', 'standard deviation of the length'),
  cadence_hz: f64('hz', 'steps per second around this step'),
});

/** Walking direction of each step. */
export const headingsTable = defineTable('headings', {
  step: i32('number of the step'),
  heading_rad: f64('rad', 'walking direction, clockwise from grid north, 0 to 2 pi'),
  sd_rad: f64('rad', 'standard deviation of the walking direction'),
  offset_rad: f64('rad', "walking direction minus the device axis' direction, clockwise, -pi to pi"),
  source: utf8('where the direction came from: device-axis, or motion'),
});

/** Position after each step; row 0 is the start. */
export const pathTable = defineTable('path', {
  step: i32('number of the step; 0 is the start'),
  t_s: f64('s', 'when the position is reached'),
  east_m: f64('m', 'position east in the grid'),
  north_m: f64('m', 'position north in the grid'),
  heading_rad: f64('rad', 'walking direction of the step that led here'),
  length_m: f64('m', 'length of the step that led here'),
  cov_ee_m2: f64('m2', 'variance of east'),
  cov_en_m2: f64('m2', 'covariance of east and north'),
  cov_nn_m2: f64('m2', 'variance of north'),
});

/** Estimated against surveyed position at each pass. */
export const checkpointsTable = defineTable('checkpoints', {
  checkpoint: utf8('name of the surveyed checkpoint'),
  t_s: f64('s', 'when the walker passed it'),
  role: utf8('anchor or scored'),
  true_east_m: f64('m', 'surveyed east'),
  true_north_m: f64('m', 'surveyed north'),
  est_east_m: f64('m', 'estimated east at the pass'),
  est_north_m: f64('m', 'estimated north at the pass'),
  error_m: f64('m', 'distance of estimate and survey'),
  along_m: f64('m', 'error along the direction of travel, ahead positive'),
  across_m: f64('m', 'error across it, to the right positive'),
  travelled_m: f64('m', 'true distance from the start, checkpoint to checkpoint'),
  cov_ee_m2: f64('m2', 'variance of the estimated east'),
  cov_en_m2: f64('m2', 'covariance of the estimated east and north'),
  cov_nn_m2: f64('m2', 'variance of the estimated north'),
});

export type ReadingsAccel = Columns<typeof readingsAccelTable>;
export type ReadingsGyro = Columns<typeof readingsGyroTable>;
export type ReadingsMag = Columns<typeof readingsMagTable>;
export type ReadingsBaro = Columns<typeof readingsBaroTable>;
export type ReadingsImport = Columns<typeof readingsImportTable>;
export type Findings = Columns<typeof findingsTable>;
export type Motion = Columns<typeof motionTable>;
export type Attitude = Columns<typeof attitudeTable>;
export type Steps = Columns<typeof stepsTable>;
export type Strides = Columns<typeof stridesTable>;
export type Headings = Columns<typeof headingsTable>;
export type Path = Columns<typeof pathTable>;
export type Checkpoints = Columns<typeof checkpointsTable>;

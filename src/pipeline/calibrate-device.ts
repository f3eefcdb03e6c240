import { fitNorm, type NormFit, type NormShape } from '../calibration/fit-norm.js';
import { fitGyroScale, type PoseChange } from '../calibration/gyro-scale.js';
import { stillPoses } from '../calibration/still-poses.js';
import type { AxisCalibration } from '../campaign/context.js';
import { placeOf } from '../campaign/place.js';
import { readCampaign } from '../campaign/read-campaign.js';
import { readLog } from '../campaign/read-log.js';
import type { LogReadings } from '../campaign/readings.js';
import { writeCalibrationPart } from '../campaign/write-calibration.js';
import { InputError } from '../errors.js';
import { chosenWalks } from '../pipeline.js';
import { interpolateCubic } from '../signal/interpolate-cubic.js';
import { stillWindows } from '../signal/still-windows.js';
import { vectorDelay } from '../signal/vector-delay.js';
import { median } from '../stats/quantile.js';
import { layoutOf } from './import-readings.js';

export type CalibratedSensor = 'gyro' | 'accel' | 'mag';

export interface DeviceFit {
  device: string;
  sensor: CalibratedSensor;
  calibration: AxisCalibration;
  biasSd: readonly number[];
  /** Accelerometer and magnetometer only. */
  fit: NormFit | null;
  /** Still seconds, poses, or readings that it rests on. */
  basis: string;
  path: string;
}

export interface CalibrateOptions {
  /** Walks whose logs are used; they must be of one device. */
  walks: readonly string[];
  /** What is fitted; default `bias` for the gyroscope, `full` for the others. */
  shape?: NormShape | undefined;
  /** Device name where walks.csv gives none. */
  device?: string | undefined;
}

/** Scatter within a second up to which a device lies still: on a table with a noisy part. */
const STILL_MPS2 = 0.3;
const STILL_RADPS = 0.03;
/** Only the direction of gravity matters where this is used. */
const STANDARD_GRAVITY_MPS2 = 9.80665;
const IDENTITY: AxisCalibration['matrix'] = [1, 0, 0, 0, 1, 0, 0, 0, 1];

/**
 * Calibrates one sensor of a device from still or rotation logs, and writes `calibrations/device-<device>.yaml`, which
 * `motion` uses from then on.
 *
 * gyro: mean rate over still seconds; with `scales` or `full` the scales too, from turns between still poses. accel: |f| in still poses is gravity. mag: |m| is the field of the model at the
 * place and date, or, where the place is not known, the median size.
 *
 * @throws InputError where the logs are of several devices, lack the sensor, or cannot determine the parameters.
 */
export async function calibrateDevice(
  campaignDir: string,
  sensor: CalibratedSensor,
  options: CalibrateOptions,
): Promise<DeviceFit> {
  const { campaign, walks, device } = deviceWalks(campaignDir, sensor, options);
  const logs: LogReadings[] = [];
  for (const walk of walks) logs.push(await readLog(campaign.dir, walk, layoutOf(campaign, walk)));
  const place = placeOf(campaign.grid);
  const found =
    sensor === 'gyro'
      ? gyroAtRest(logs, options.shape ?? 'bias')
      : sensor === 'accel'
        ? accelFromPoses(logs, place.gravity_mps2, options.shape ?? 'full')
        : magFromRotation(logs, place.field_uT, options.shape ?? 'full');
  const { fit, biasSd, basis, calibration } = found;
  const about = {
    from: walks.map(({ walk }) => walk),
    basis,
    bias_sd: biasSd,
    ...(fit
      ? {
          matrix_sd: fit.matrixSd,
          residual: fit.residual,
          residual_before: fit.residualBefore,
          condition: fit.condition,
        }
      : {}),
  };
  const path = writeCalibrationPart(campaign.dir, 'device', device, sensor, calibration, about);
  return { device, sensor, path, ...found };
}

/** The walks to use and the one device that they are of. */
function deviceWalks(campaignDir: string, what: string, options: CalibrateOptions) {
  const campaign = readCampaign(campaignDir);
  const walks = campaign.walks.filter(({ walk }) => chosenWalks(campaign, options.walks).includes(walk));
  const devices = [...new Set(walks.map(({ device }) => device ?? options.device ?? null))];
  const device = options.device ?? devices[0];
  if (devices.length > 1 || device === null || device === undefined)
    throw new InputError(
      'no-device',
      devices.length > 1
        ? `calibrate ${what}: the walks are of several devices (${devices.join(', ')}); name the walks of one with --walk`
        : `calibrate ${what}: walks.csv names no device for these walks; fill its column device, or give --device`,
    );
  return { campaign, walks, device };
}

type Found = Pick<DeviceFit, 'calibration' | 'biasSd' | 'fit' | 'basis'>;

function gyroAtRest(logs: readonly LogReadings[], shape: NormShape): Found {
  const windows = logs.flatMap(({ gyro, accel }) => {
    if (!gyro) return [];
    const turning = stillWindows(gyro.t_s, [gyro.x_radps, gyro.y_radps, gyro.z_radps], STILL_RADPS);
    if (!accel) return turning;
    // A walker's phone may hardly turn, but it is shaken.
    const resting = stillWindows(accel.t_s, [accel.x_mps2, accel.y_mps2, accel.z_mps2], STILL_MPS2);
    return turning.filter(({ from_s, to_s }) => {
      const middle = (from_s + to_s) / 2;
      return resting.some((rest) => rest.from_s <= middle && middle <= rest.to_s);
    });
  });
  if (windows.length < 5)
    throw new InputError(
      'too-few',
      `calibrate gyro: needs at least 5 still seconds, found ${windows.length}; lay the device down for half a minute and record`,
    );
  // A slow even turn looks still as well; most seconds of a still log are not of one.
  const usual = [0, 1, 2].map((a) => median(Float64Array.from(windows, ({ mean }) => mean[a]!)));
  const away = windows.map(({ mean }) => Math.hypot(...mean.map((x, a) => x - usual[a]!)));
  const limit = 4 * 1.4826 * median(Float64Array.from(away)) + 1e-9;
  const still = windows.filter((_, i) => away[i]! <= limit);
  const n = still.length;
  const mean = [0, 1, 2].map((a) => still.reduce((sum, w) => sum + w.mean[a]!, 0) / n);
  const biasSd = [0, 1, 2].map((a) =>
    Math.sqrt(still.reduce((sum, w) => sum + (w.mean[a]! - mean[a]!) ** 2, 0) / (n - 1) / n),
  );
  const bias: [number, number, number] = [mean[0]!, mean[1]!, mean[2]!];
  const basis = `${n} still seconds`;
  if (shape === 'bias') return { calibration: { bias, matrix: IDENTITY }, biasSd, fit: null, basis };
  const changes = logs.flatMap((log) => poseChanges(log, bias));
  const { scale, scaleSd, residual, residualBefore } = fitGyroScale(changes);
  const degrees = (rad: number) => ((rad * 180) / Math.PI).toFixed(2);
  return {
    calibration: { bias, matrix: [scale[0], 0, 0, 0, scale[1], 0, 0, 0, scale[2]] },
    biasSd,
    fit: null,
    basis: `${basis} and ${changes.length} turns between still poses (gravity off by ${degrees(residual)} degrees, ${degrees(residualBefore)} before; scales' se ${scaleSd.map((x) => x.toFixed(4)).join(', ')})`,
  };
}

/** Turns from one still pose to the next in one log, with the zero taken off. */
function poseChanges({ accel, gyro }: LogReadings, bias: readonly number[]): PoseChange[] {
  if (!accel || !gyro) return [];
  const axes: [Float64Array, Float64Array, Float64Array] = [accel.x_mps2, accel.y_mps2, accel.z_mps2];
  const poses = stillPoses(accel.t_s, axes, STILL_MPS2);
  // Gravity's direction needs the accelerometer's zero and scales, which the same poses tell.
  const fit =
    poses.length >= 6
      ? fitNorm(axesOf(poses.map(({ mean }) => mean)), STANDARD_GRAVITY_MPS2, 'scales')
      : null;
  const direction = (mean: readonly [number, number, number]): [number, number, number] => {
    const v = mean.map((x, a) => (fit ? fit.matrix[4 * a]! * (x - fit.bias[a]!) : x));
    const size = Math.hypot(v[0]!, v[1]!, v[2]!);
    return [v[0]! / size, v[1]! / size, v[2]! / size];
  };
  const rates = [gyro.x_radps, gyro.y_radps, gyro.z_radps];
  return poses.slice(1).map((after, k) => {
    const before = poses[k]!;
    const from = gyro.t_s.findIndex((t) => t >= (before.from_s + before.to_s) / 2);
    const end = gyro.t_s.findIndex((t) => t >= (after.from_s + after.to_s) / 2);
    const stepS = Float64Array.from(
      { length: end - from },
      (_, i) => gyro.t_s[from + i + 1]! - gyro.t_s[from + i]!,
    );
    const rate = rates.map((column, a) => column.slice(from, end).map((x) => x - bias[a]!));
    return {
      rate: rate as unknown as PoseChange['rate'],
      stepS,
      before: direction(before.mean),
      after: direction(after.mean),
    };
  });
}

function accelFromPoses(logs: readonly LogReadings[], gravity: number, shape: NormShape): Found {
  const poses = logs.flatMap(({ accel }) =>
    accel ? stillPoses(accel.t_s, [accel.x_mps2, accel.y_mps2, accel.z_mps2], STILL_MPS2) : [],
  );
  const fit = fitNorm(axesOf(poses.map(({ mean }) => mean)), gravity, shape);
  return { ...ofFit(fit), basis: `${poses.length} still poses` };
}

function magFromRotation(logs: readonly LogReadings[], field: number | null, shape: NormShape): Found {
  const readings = logs.flatMap(({ mag }) =>
    mag ? Array.from(mag.t_s, (_, i) => [mag.x_uT[i]!, mag.y_uT[i]!, mag.z_uT[i]!] as const) : [],
  );
  if (readings.length < 30)
    throw new InputError(
      'too-few',
      `calibrate mag: the logs have ${readings.length} magnetometer readings; record a minute while turning the device about every axis`,
    );
  const axes = axesOf(readings);
  const sizes = axes[0].map((x, i) => Math.hypot(x, axes[1][i]!, axes[2][i]!)).sort();
  const fit = fitNorm(axes, field ?? sizes[sizes.length >> 1]!, shape, true);
  return {
    ...ofFit(fit),
    basis: `${readings.length} readings, field ${field === null ? 'by their median size' : `${field.toFixed(2)} uT by the model`}`,
  };
}

function ofFit(fit: NormFit): Omit<Found, 'basis'> {
  return { calibration: { bias: fit.bias, matrix: fit.matrix }, biasSd: fit.biasSd, fit };
}

function axesOf(
  rows: readonly (readonly [number, number, number])[],
): [Float64Array, Float64Array, Float64Array] {
  const axis = (a: 0 | 1 | 2) => Float64Array.from(rows, (row) => row[a]);
  return [axis(0), axis(1), axis(2)];
}

/** Delay of a device's magnetometer against its gyroscope. */
export interface DelayFit {
  device: string;
  /** To be added to the magnetometer's times, s, with the standard error from walk to walk (NaN of one walk). */
  delay_s: number;
  delaySd: number;
  walks: { walk: string; delay_s: number; correlation: number }[];
  path: string;
}

/** Below this the two look too little alike to tell a delay. */
const LEAST_CORRELATION = 0.6;
const GRID_S = 0.01;

/**
 * Sensor-to-sensor delay from logs in which the device turns, by cross-correlation; walks count by their correlation.
 *
 * @throws InputError where the logs are of several devices, or in none of them field and rotation look alike.
 */
export async function calibrateDelay(campaignDir: string, options: CalibrateOptions): Promise<DelayFit> {
  const { campaign, walks, device } = deviceWalks(campaignDir, 'delay', options);
  const found: DelayFit['walks'] = [];
  for (const walk of walks) {
    const { gyro, mag } = await readLog(campaign.dir, walk, layoutOf(campaign, walk));
    if (!gyro || !mag) continue;
    const n = Math.floor(Math.min(gyro.t_s.at(-1)!, mag.t_s.at(-1)!) / GRID_S);
    const onGrid = (t: Float64Array, columns: Float64Array[]) =>
      columns.map((column) => interpolateCubic(t, column, 0, GRID_S, n));
    const delay = vectorDelay(
      onGrid(gyro.t_s, [gyro.x_radps, gyro.y_radps, gyro.z_radps]),
      onGrid(mag.t_s, [mag.x_uT, mag.y_uT, mag.z_uT]),
      GRID_S,
    );
    if (delay && delay.correlation > LEAST_CORRELATION)
      found.push({ walk: walk.walk, delay_s: -delay.delayS, correlation: delay.correlation });
  }
  if (found.length === 0)
    throw new InputError(
      'undetermined',
      'calibrate delay: in none of the logs does the magnetic field turn as the gyroscope says; record a minute of quick turns about every axis',
    );
  const total = found.reduce((sum, { correlation }) => sum + correlation, 0);
  const delay_s = found.reduce((sum, each) => sum + each.correlation * each.delay_s, 0) / total;
  const spread = found.reduce((sum, each) => sum + (each.delay_s - delay_s) ** 2, 0);
  const n = found.length;
  const delaySd = n > 1 ? Math.sqrt(spread / (n - 1) / n) : Number.NaN;
  const path = writeCalibrationPart(
    campaign.dir,
    'device',
    device,
    'delay_s',
    { mag: delay_s },
    { walks: found.map(({ walk }) => walk) },
  );
  return { device, delay_s, delaySd, walks: found, path };
}

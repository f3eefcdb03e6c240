import { quantile } from '../../stats/quantile.js';
import type { ReadingsAccel, ReadingsGyro, ReadingsMag } from '../../tables/schemas.js';
import { AXIS_MAPS, type AxisMap, axesText, IDENTITY } from './axis-maps.js';
import { binned } from './binned.js';
import type { Finding } from './finding.js';

const BIN_S = 0.02;
/** A vector is averaged over this long, and looked at again after this long. */
const MEAN_S = 0.8;
const FOLLOW_S = 2.4;
/** Only where the device turns against the vector by this much do two looks say anything. */
const LEAST_TURN = (25 * Math.PI) / 180;
/** Fewer looks tell nothing. */
const LEAST_LOOKS = 10;
/** Means of the specific force further from the usual than this have a push in them, percent. */
const QUIET_PCT = 4;
/** What is left of the turn, median: little where sensors belong together, about one where they do not. */
const AGREES = 0.55;
const DISAGREES = 0.7;
/** So little that another unit of the gyroscope is told by it. */
const CLEARLY_AGREES = 0.4;

const DEGREES: AxisMap = IDENTITY.map(({ axis, sign }) => ({ axis, sign: (sign * Math.PI) / 180 }));

/** A sensor's vector in the device, with its times. */
export interface VectorReadings {
  sensor: 'accel' | 'mag';
  t: Float64Array;
  columns: readonly Float64Array[];
}

export function forceOf({ t_s, x_mps2, y_mps2, z_mps2 }: ReadingsAccel): VectorReadings {
  return { sensor: 'accel', t: t_s, columns: [x_mps2, y_mps2, z_mps2] };
}

export function fieldOf({ t_s, x_uT, y_uT, z_uT }: ReadingsMag): VectorReadings {
  return { sensor: 'mag', t: t_s, columns: [x_uT, y_uT, z_uT] };
}

/**
 * Whether the rotation that the gyroscope measures is the one that gravity (accelerometer) or the magnetic field
 * (magnetometer) undergoes in the device.
 *
 * The gyroscope turns each reading into one frame, where the vector must stay as it is from one stretch to one 2.4 s
 * later. Where it does not, the axis signs and orders under which it would are looked for.
 */
export function checkRotation(gyro: ReadingsGyro, vector: VectorReadings): Finding[] {
  const looks = looksOf(gyro, vector);
  if (!looks) return [];
  const plain = leftOver(looks, IDENTITY);
  if (plain && plain.share < CLEARLY_AGREES) return [];
  const inDegrees = leftOver(looks, DEGREES);
  if (inDegrees && inDegrees.share < Math.min(CLEARLY_AGREES, (plain?.share ?? 1) / 2))
    return [
      {
        severity: 'fail',
        kind: 'wrong-unit',
        sensor: 'gyro',
        from_s: 0,
        to_s: gyro.t_s.at(-1) ?? 0,
        value: inDegrees.share,
        message: `gyroscope: it agrees with the ${vector.sensor === 'accel' ? 'accelerometer' : 'magnetometer'} only if its numbers are degrees a second; headings are meaningless; the layout's unit is probably degps`,
      },
    ];
  if (!plain || plain.share < DISAGREES) return [];
  let best = { share: plain.share, axes: '' };
  for (const map of AXIS_MAPS) {
    const share = leftOver(looks, map)?.share ?? 1;
    if (share < best.share) best = { share, axes: axesText(map) };
  }
  const isForce = vector.sensor === 'accel';
  const mended = best.share < AGREES;
  const other = isForce
    ? 'they may be of different phones, or their clocks apart; look at how the log was put together'
    : 'a magnet may be on the phone (case, clip, purse), or the two be of different phones; headings rest on the gyroscope where the field is told apart';
  return [
    {
      severity: isForce || mended ? 'fail' : 'warn',
      kind: mended ? 'wrong-axes' : 'sensors-disagree',
      sensor: isForce || mended ? 'gyro' : 'mag',
      from_s: 0,
      to_s: gyro.t_s.at(-1) ?? 0,
      value: plain.share,
      message:
        `gyroscope and ${isForce ? 'accelerometer' : 'magnetometer'}: ${isForce ? 'gravity' : 'the magnetic field'} does not turn as the ` +
        `gyroscope says (${Math.round(100 * plain.share)} % of the turn is left over in ${plain.looks} places); ` +
        `${isForce ? 'attitude and heading are meaningless' : 'magnetic headings are wrong'}; ` +
        (mended ? `they would agree with the gyroscope's axes as [${best.axes}]; mend the layout` : other),
    },
  ];
}

/** Whether a vector turns as the gyroscope says; null where too little turns to tell. */
export function rotationAgrees(gyro: ReadingsGyro, vector: VectorReadings): boolean | null {
  const looks = looksOf(gyro, vector);
  const left = looks && leftOver(looks, IDENTITY);
  return left ? left.share < AGREES : null;
}

/** Both sensors in the same bins. */
interface Looks {
  rate: readonly Float64Array[];
  vector: readonly Float64Array[];
  bins: number;
  /** Only stretches whose mean is about as long as usual count: the others have a push in them. */
  onlyQuiet: boolean;
}

function looksOf(gyro: ReadingsGyro, { sensor, t, columns }: VectorReadings): Looks | null {
  const bins = Math.floor((gyro.t_s.at(-1) ?? 0) / BIN_S);
  if (bins * BIN_S < 4 * FOLLOW_S) return null;
  return {
    rate: filled(binned(gyro.t_s, [gyro.x_radps, gyro.y_radps, gyro.z_radps], BIN_S, bins)),
    vector: filled(binned(t, columns, BIN_S, bins)),
    bins,
    onlyQuiet: sensor === 'accel',
  };
}

/** Empty bins take the last known value, so that short gaps and slow sensors do no harm. */
function filled(columns: Float64Array[]): Float64Array[] {
  return columns.map((column) => {
    let last = 0;
    return column.map((value) => (Number.isNaN(value) ? last : (last = value)));
  });
}

/** Median share of the turn that the gyroscope does not explain; null where too little turns. */
function leftOver(
  { rate, vector, bins, onlyQuiet }: Looks,
  map: AxisMap,
): { share: number; looks: number } | null {
  const mean = Math.round(MEAN_S / BIN_S);
  const follow = Math.round(FOLLOW_S / BIN_S);
  const turned = turnedIntoOneFrame(rate, vector, bins, map);
  const stretches = Math.floor(bins / mean);
  const means = Array.from({ length: stretches }, (_, s) => meanOf(turned.vector, s * mean, mean));
  const usual = quantile(Float64Array.from(means, size), 0.5);
  const isQuiet = (v: Vector) => !onlyQuiet || 100 * Math.abs(size(v) / usual - 1) < QUIET_PCT;
  const shares: number[] = [];
  const hop = Math.round(follow / mean);
  for (let s = 0; s + hop < stretches; s++) {
    const [before, after] = [means[s]!, means[s + hop]!];
    if (!isQuiet(before) || !isQuiet(after)) continue;
    // How far the device turned against the vector between the two.
    let turn = 0;
    const from = turned.intoDevice(before, s * mean + (mean >> 1));
    for (let b = s * mean + mean; b <= s * mean + follow + (mean >> 1); b += mean >> 1)
      turn = Math.max(turn, angle(from, turned.intoDevice(before, Math.min(b, bins - 1))));
    turn = Math.max(turn, angle(before, after));
    if (turn > LEAST_TURN) shares.push(angle(before, after) / turn);
  }
  if (shares.length < LEAST_LOOKS) return null;
  return { share: quantile(Float64Array.from(shares), 0.5), looks: shares.length };
}

type Vector = readonly [number, number, number];

function turnedIntoOneFrame(
  rate: readonly Float64Array[],
  vector: readonly Float64Array[],
  bins: number,
  map: AxisMap,
) {
  const q = new Float64Array(4 * bins);
  const out = [new Float64Array(bins), new Float64Array(bins), new Float64Array(bins)] as const;
  const [vx, vy, vz] = vector as readonly [Float64Array, Float64Array, Float64Array];
  const [rx, ry, rz] = map.map(({ axis }) => rate[axis]!) as [Float64Array, Float64Array, Float64Array];
  const [kx, ky, kz] = map.map(({ sign }) => (sign * BIN_S) / 2) as [number, number, number];
  let w = 1;
  let x = 0;
  let y = 0;
  let z = 0;
  for (let b = 0; b < bins; b++) {
    q[4 * b] = w;
    q[4 * b + 1] = x;
    q[4 * b + 2] = y;
    q[4 * b + 3] = z;
    const tx = 2 * (y * vz[b]! - z * vy[b]!);
    const ty = 2 * (z * vx[b]! - x * vz[b]!);
    const tz = 2 * (x * vy[b]! - y * vx[b]!);
    out[0][b] = vx[b]! + w * tx + y * tz - z * ty;
    out[1][b] = vy[b]! + w * ty + z * tx - x * tz;
    out[2][b] = vz[b]! + w * tz + x * ty - y * tx;
    const hx = kx * rx[b]!;
    const hy = ky * ry[b]!;
    const hz = kz * rz[b]!;
    const half = Math.sqrt(hx * hx + hy * hy + hz * hz);
    const c = Math.cos(half);
    const s = half > 0 ? Math.sin(half) / half : 1;
    const dx = s * hx;
    const dy = s * hy;
    const dz = s * hz;
    const nw = w * c - x * dx - y * dy - z * dz;
    const nx = x * c + w * dx + y * dz - z * dy;
    const ny = y * c + w * dy + z * dx - x * dz;
    z = z * c + w * dz + x * dy - y * dx;
    w = nw;
    x = nx;
    y = ny;
  }
  return { vector: out, intoDevice: (v: Vector, bin: number) => rotated(q, bin, v, -1) };
}

/** A vector turned by the quaternion of a bin (direction 1), or back (-1). */
function rotated(q: Float64Array, bin: number, [vx, vy, vz]: Vector, direction: 1 | -1): Vector {
  const w = q[4 * bin]!;
  const x = direction * q[4 * bin + 1]!;
  const y = direction * q[4 * bin + 2]!;
  const z = direction * q[4 * bin + 3]!;
  const tx = 2 * (y * vz - z * vy);
  const ty = 2 * (z * vx - x * vz);
  const tz = 2 * (x * vy - y * vx);
  return [vx + w * tx + y * tz - z * ty, vy + w * ty + z * tx - x * tz, vz + w * tz + x * ty - y * tx];
}

function meanOf(columns: readonly Float64Array[], from: number, count: number): Vector {
  const [x, y, z] = columns.map((column) => {
    let sum = 0;
    for (let b = from; b < from + count; b++) sum += column[b]!;
    return sum / count;
  });
  return [x!, y!, z!];
}

function size([x, y, z]: Vector): number {
  return Math.hypot(x, y, z);
}

function angle(a: Vector, b: Vector): number {
  const cross = Math.hypot(a[1] * b[2] - a[2] * b[1], a[2] * b[0] - a[0] * b[2], a[0] * b[1] - a[1] * b[0]);
  return Math.atan2(cross, a[0] * b[0] + a[1] * b[1] + a[2] * b[2]);
}

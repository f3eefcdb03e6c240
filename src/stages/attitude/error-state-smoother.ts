import type { PlaceContext } from '../../campaign/context.js';
import { Measurements, type SmoothedChain, smoothChain } from '../../stats/fixed-interval-smoother.js';
import type { InertialSamples } from './inertial-samples.js';
import { followBranch, type MagneticHeading, magneticHeading, meanAngle } from './magnetic-heading.js';
import { MagneticWeights } from './magnetic-weights.js';
import type { SmootherSettings } from './methods/fixed-interval-smoother.js';
import { restIntervals } from './rest.js';
import { Trajectory } from './trajectory.js';

/** Places of the state: attitude error (earth frame), gyroscope bias, velocity, accelerometer bias, scale. */
const SIZE = 15;
const ATTITUDE = 0;
const GYRO_BIAS = 3;
const VELOCITY = 6;
const ACCEL_BIAS = 9;
const SCALE = 12;

/** Entries of the cross-product matrix that tilt takes part in. */
const CROSS: readonly (readonly [number, number])[] = [
  [0, 1],
  [1, 0],
  [2, 0],
  [2, 1],
];

/** Entries of the transition beside the identity, in the order in which `fillTransition` writes them. */
const PATTERN = transitionPattern();

/** Variance of a yaw that nothing is known of: uniform over a turn. */
const UNKNOWN_YAW_VARIANCE = Math.PI ** 2 / 3;

/** Standard deviation of a tilt told by a few seconds of accelerometer, rad: a hand's motion is in it. */
const FIRST_TILT_SD = 0.3;

/** Gyroscope noise while at rest, rad/s per sqrt(hz), for the bias measured there. */
const REST_RATE_NOISE = 0.002;

/**
 * First guess of how fast a phone turns that seems at rest, rad/s, before it is estimated: a hand that is held still
 * turns slowly, and too evenly to tell from a bias by the gyroscope alone. Taking that for the bias would turn the
 * whole walk.
 */
const FIRST_REST_TURNING = 0.02;

/** How long such a turn keeps its sense, s. */
const REST_TURNING_MEMORY_S = 1;

/** Velocity of a phone at rest, m/s. */
const REST_VELOCITY_SD = 0.02;

/** Random walk of attitude and velocity inside a gap: a turn of a radian, a change of 5 m/s in a second. */
const GAP_ATTITUDE_WALK = 1;
const GAP_VELOCITY_WALK = 5;

/** Seconds on either side that make the slow course of magnetic heading when its branch is chosen. */
const BRANCH_WINDOW_S = 5;

export interface SmoothedAttitude {
  trajectory: Trajectory;
  chain: SmoothedChain;
  size: number;
  /** Weight of the magnetometer per node interval, 0 to 1; all 0 without one. */
  magTrust: Float64Array;
  usedMagnetometer: boolean;
}

/** Estimates the errors of the integrated gyroscope and takes them out; see the method's docstring. */
export function smoothAttitude(
  samples: InertialSamples,
  settings: SmootherSettings,
  place: PlaceContext,
): SmoothedAttitude {
  const trajectory = new Trajectory(samples, settings.node_s);
  const { nodes } = trajectory;
  const rest = restIntervals(samples, trajectory.perNode, nodes, settings);
  const restRate = startFromRest(samples, trajectory, rest);
  for (let j = 0; j < nodes - 1; j++) trajectory.integrate(j);
  levelByAccelerometer(samples, trajectory);

  const usedMagnetometer = settings.magnetometer && samples.mag !== null;
  const weights = new MagneticWeights(nodes - 1, settings);
  const scatter: Scatter = { horizontal: 1, vertical: 1, restTurning: FIRST_REST_TURNING };
  let biasVariance = 0.03 ** 2;
  let chain: SmoothedChain | null = null;
  for (let round = 0; round < settings.rounds; round++) {
    trajectory.accumulate();
    let heading: MagneticHeading | null = null;
    // The first round settles tilt and bias without the magnetometer, the second finds its branch of yaw.
    if (usedMagnetometer && round > 0) {
      heading = magneticHeading(trajectory, place.declination_rad, settings);
      if (round === 1) {
        const turn = meanAngle(heading.angle, trajectory.fieldCount);
        trajectory.turnAll(0, 0, turn);
        trajectory.accumulate();
        heading = magneticHeading(trajectory, place.declination_rad, settings);
        followBranch(heading.angle, trajectory.fieldCount, Math.round(BRANCH_WINDOW_S / settings.node_s));
      }
      weights.update(heading, trajectory, round > 1);
    }
    chain = smoothChain({
      nodes,
      size: SIZE,
      pattern: PATTERN,
      ...dynamics(trajectory, settings, place.gravity_mps2),
      ...prior(trajectory, settings, biasVariance, scatter.horizontal),
      measurements: measurements(trajectory, rest, restRate, settings, scatter, heading, weights),
    });
    reestimate(chain, trajectory, rest, restRate, settings, scatter);
    applyCorrections(chain, trajectory);
    biasVariance = biasVarianceOf(chain, trajectory, settings);
  }
  return { trajectory, chain: chain!, size: SIZE, magTrust: weights.trust, usedMagnetometer };
}

/** What the walk itself shows of its motion: standard deviations of the velocity, m/s, and of turning at rest, rad/s. */
interface Scatter {
  horizontal: number;
  vertical: number;
  restTurning: number;
}

/** Sets the bias to the mean rate at rest, where there is rest; returns the mean rate of each resting interval. */
function startFromRest(samples: InertialSamples, trajectory: Trajectory, rest: Uint8Array): Float64Array {
  const rate = new Float64Array(3 * rest.length);
  const sum = [0, 0, 0];
  let intervals = 0;
  for (let j = 0; j < rest.length; j++) {
    if (!rest[j]) continue;
    const from = trajectory.sampleOf(j);
    const to = trajectory.sampleOf(j + 1);
    for (let a = 0; a < 3; a++) {
      let total = 0;
      for (let i = from; i < to; i++) total += samples.gyro[a]![i]!;
      rate[3 * j + a] = total / (to - from);
      sum[a]! += rate[3 * j + a]!;
    }
    intervals++;
  }
  if (intervals > 0)
    for (let k = 0; k < trajectory.bias.length; k++) trajectory.bias[k] = sum[k % 3]! / intervals;
  return rate;
}

/** Turns the trajectory so that the mean specific force of its first five seconds points up. */
function levelByAccelerometer(samples: InertialSamples, trajectory: Trajectory): void {
  const count = Math.min(samples.count, Math.max(1, Math.round(5 / samples.stepS)));
  const [ax, ay, az] = samples.accel;
  const q = trajectory.q;
  let east = 0;
  let north = 0;
  let up = 0;
  for (let i = 0; i < count; i++) {
    const w = q[4 * i]!;
    const x = q[4 * i + 1]!;
    const y = q[4 * i + 2]!;
    const z = q[4 * i + 3]!;
    const tx = 2 * (y * az[i]! - z * ay[i]!);
    const ty = 2 * (z * ax[i]! - x * az[i]!);
    const tz = 2 * (x * ay[i]! - y * ax[i]!);
    east += ax[i]! + w * tx + y * tz - z * ty;
    north += ay[i]! + w * ty + z * tx - x * tz;
    up += az[i]! + w * tz + x * ty - y * tx;
  }
  const horizontal = Math.sqrt(east * east + north * north);
  const angle = Math.atan2(horizontal, up);
  if (horizontal > 0) trajectory.turnAll((angle * north) / horizontal, (-angle * east) / horizontal, 0);
  else if (up < 0) trajectory.turnAll(Math.PI, 0, 0);
}

function transitionPattern(): Int32Array {
  const entries: number[] = [];
  for (let r = 0; r < 3; r++)
    for (let c = 0; c < 3; c++) {
      entries.push((ATTITUDE + r) * SIZE + GYRO_BIAS + c);
      entries.push((VELOCITY + r) * SIZE + ACCEL_BIAS + c);
      entries.push((ATTITUDE + r) * SIZE + SCALE + c);
    }
  for (const [r, c] of CROSS) entries.push((VELOCITY + r) * SIZE + ATTITUDE + c);
  return Int32Array.from(entries);
}

function dynamics(trajectory: Trajectory, settings: SmootherSettings, gravity: number) {
  const intervals = trajectory.nodes - 1;
  const width = PATTERN.length;
  const transition = new Float64Array(intervals * width);
  const drive = new Float64Array(intervals * SIZE);
  const process = new Float64Array(intervals * SIZE);
  const { rotation, turning, impulse, turned, bias, mismatch, gapS } = trajectory;
  for (let j = 0; j < intervals; j++) {
    const seconds = trajectory.intervalS(j);
    let e = j * width;
    for (let k = 0; k < 9; k++) {
      transition[e++] = -rotation[9 * j + k]!;
      transition[e++] = -rotation[9 * j + k]!;
      transition[e++] = turning[9 * j + k]!;
    }
    const sx = impulse[3 * j]!;
    const sy = impulse[3 * j + 1]!;
    const sz = impulse[3 * j + 2]!;
    // Tilt error times impulse. A yaw error would turn the velocity as well, but the scatter of the velocity is the same
    // in all horizontal directions and cannot tell it: the linear term would only feign knowledge of yaw.
    transition[e++] = sz;
    transition[e++] = -sz;
    transition[e++] = sy;
    transition[e++] = -sx;
    const at = j * SIZE;
    for (let a = 0; a < 3; a++) {
      drive[at + ATTITUDE + a] = mismatch[3 * j + a]!;
      if (j + 1 < intervals) drive[at + GYRO_BIAS + a] = bias[3 * j + a]! - bias[3 * (j + 1) + a]!;
      drive[at + VELOCITY + a] = impulse[3 * j + a]! - (a === 2 ? gravity * seconds : 0);
      process[at + ATTITUDE + a] =
        settings.angle_random_walk_radps ** 2 * seconds +
        (settings.turning_error * turned[j]!) ** 2 +
        GAP_ATTITUDE_WALK ** 2 * gapS[j]!;
      process[at + GYRO_BIAS + a] = settings.bias_random_walk_radps ** 2 * seconds;
      process[at + VELOCITY + a] =
        settings.velocity_random_walk_mps ** 2 * seconds + GAP_VELOCITY_WALK ** 2 * gapS[j]!;
    }
  }
  return { transition, drive, process };
}

function prior(trajectory: Trajectory, settings: SmootherSettings, biasVariance: number, velocitySd: number) {
  const priorMean = new Float64Array(SIZE);
  const priorVariance = new Float64Array(SIZE);
  for (let a = 0; a < 3; a++) {
    priorVariance[ATTITUDE + a] = a === 2 ? UNKNOWN_YAW_VARIANCE : FIRST_TILT_SD ** 2;
    priorMean[GYRO_BIAS + a] = -trajectory.bias[a]!;
    priorVariance[GYRO_BIAS + a] = biasVariance;
    priorVariance[VELOCITY + a] = velocitySd ** 2;
    priorVariance[ACCEL_BIAS + a] = settings.accel_bias_sd_mps2 ** 2;
    priorMean[SCALE + a] = -trajectory.scale[a]!;
    priorVariance[SCALE + a] = settings.scale_sd ** 2;
  }
  return { priorMean, priorVariance };
}

function measurements(
  trajectory: Trajectory,
  rest: Uint8Array,
  restRate: Float64Array,
  settings: SmootherSettings,
  scatter: Scatter,
  heading: MagneticHeading | null,
  weights: MagneticWeights,
): Measurements {
  const { nodes, bias, field, fieldCount } = trajectory;
  const out = new Measurements(7 * nodes);
  // One value per node, though the velocity keeps its sign longer than a node: so much less each one counts.
  const repeat = Math.max(1, settings.velocity_memory_s / settings.node_s);
  const restVariance =
    REST_RATE_NOISE ** 2 / settings.node_s +
    scatter.restTurning ** 2 * Math.max(1, REST_TURNING_MEMORY_S / settings.node_s);
  for (let j = 0; j < nodes; j++) {
    const interval = Math.min(j, nodes - 2);
    if (rest[interval]) {
      for (let a = 0; a < 3; a++) {
        out.addDirect(j, VELOCITY + a, 0, REST_VELOCITY_SD ** 2);
        const rate = restRate[3 * interval + a]! - bias[3 * interval + a]!;
        out.addDirect(j, GYRO_BIAS + a, rate, restVariance);
      }
    } else {
      out.addDirect(j, VELOCITY, 0, scatter.horizontal ** 2 * repeat);
      out.addDirect(j, VELOCITY + 1, 0, scatter.horizontal ** 2 * repeat);
      out.addDirect(j, VELOCITY + 2, 0, scatter.vertical ** 2 * repeat);
    }
    if (!heading || j >= nodes - 1 || fieldCount[j] === 0) continue;
    const east = field[3 * j]!;
    const north = field[3 * j + 1]!;
    const up = field[3 * j + 2]!;
    const h2 = east * east + north * north;
    // A turn t moves the field by t x m; its part across the horizontal field, clockwise, over the length.
    out.add(
      j,
      ATTITUDE,
      (east * up) / h2,
      ATTITUDE + 1,
      (north * up) / h2,
      ATTITUDE + 2,
      -1,
      -heading.angle[j]!,
      weights.variance[j]!,
    );
  }
  return out;
}

/** Expectation-maximisation step for the scatter of the velocity in motion and of turning at rest. */
function reestimate(
  chain: SmoothedChain,
  trajectory: Trajectory,
  rest: Uint8Array,
  restRate: Float64Array,
  settings: SmootherSettings,
  scatter: Scatter,
): void {
  let horizontal = 0;
  let vertical = 0;
  let moving = 0;
  let turning = 0;
  let resting = 0;
  for (let j = 0; j < trajectory.nodes - 1; j++) {
    if (rest[j]) {
      for (let a = 0; a < 3; a++) {
        const at = j * SIZE + GYRO_BIAS + a;
        const left = restRate[3 * j + a]! - trajectory.bias[3 * j + a]! - chain.mean[at]!;
        turning += left ** 2 + chain.variance[at]!;
      }
      resting += 3;
      continue;
    }
    const at = j * SIZE + VELOCITY;
    for (let a = 0; a < 2; a++) horizontal += (chain.mean[at + a]! ** 2 + chain.variance[at + a]!) / 2;
    vertical += chain.mean[at + 2]! ** 2 + chain.variance[at + 2]!;
    moving++;
  }
  if (moving > 0) {
    scatter.horizontal = Math.max(settings.velocity_sd_mps, Math.sqrt(horizontal / moving));
    scatter.vertical = Math.max(settings.velocity_sd_mps, Math.sqrt(vertical / moving));
  }
  if (resting > 0)
    scatter.restTurning = Math.sqrt(Math.max(0, turning / resting - REST_RATE_NOISE ** 2 / settings.node_s));
}

function applyCorrections(chain: SmoothedChain, trajectory: Trajectory): void {
  const { nodes } = trajectory;
  const attitude = new Float64Array(3 * nodes);
  const bias = new Float64Array(trajectory.bias.length);
  const scale = new Float64Array(3);
  for (let j = 0; j < nodes; j++)
    for (let a = 0; a < 3; a++) {
      attitude[3 * j + a] = chain.mean[j * SIZE + ATTITUDE + a]!;
      if (j < nodes - 1) bias[3 * j + a] = chain.mean[j * SIZE + GYRO_BIAS + a]!;
      scale[a] = chain.mean[SCALE + a]!;
    }
  trajectory.correct(attitude, bias, scale);
}

/**
 * Prior variance of the bias by what the three axes show: gravity tells the bias of the axes that tilt, and they
 * tell what to expect of the one that nothing else watches.
 */
function biasVarianceOf(chain: SmoothedChain, trajectory: Trajectory, settings: SmootherSettings): number {
  let sum = settings.bias_sd_radps ** 2;
  for (let a = 0; a < 3; a++) sum += trajectory.bias[a]! ** 2 + chain.variance[GYRO_BIAS + a]!;
  return Math.max(settings.bias_sd_radps ** 2, sum / 4);
}

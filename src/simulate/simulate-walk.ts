import { randomStream } from '../stats/random.js';
import type { CarrySpell } from './carry-plan.js';
import {
  type DeviceMotion,
  intoDevice,
  type MotionModel,
  motionAt,
  motionModel,
  specificForce,
} from './device-motion.js';
import { SENSORS, type Sensor } from './device-schema.js';
import type { WalkPlan } from './expand-walks.js';
import { type LogClock, logClock, lostSpells, type Sampling, sample } from './log-clock.js';
import { fieldAt, type PlaceModel, pressureAt } from './magnetic-map.js';
import type { Route } from './routes.js';
import { type DeviceModel, sense } from './sensor-errors.js';
import { instantAt } from './timeline.js';
import { walkTimeline } from './walk-timeline.js';
import type { WalkerModel } from './walker-model.js';

/** One sensor's readings of a walk, in order of time; nothing lost, doubled or disordered yet. */
export interface SensorStream extends Sampling {
  sensor: Sensor;
  rateHz: number;
  values: Float64Array[];
  bias: Float64Array[];
}

/** A simulated walk: its true motion, and what the phone measured. */
export interface SimulatedWalk {
  plan: WalkPlan;
  walker: WalkerModel;
  device: DeviceModel;
  route: Route;
  model: MotionModel;
  clock: LogClock;
  /** The first reading's stamp, in the log's unit. */
  firstStamp: number;
  streams: readonly SensorStream[];
  /** No reading is written between these true times (pairs). */
  lost: Float64Array;
}

/** What all walks of a plan have in common. */
export interface WalkSetting {
  seed: number;
  place: PlaceModel;
  heightM: number;
}

/** Simulates one walk; all that is random is drawn from streams of the walk's, walker's and device's own. */
export function simulateWalk(
  setting: WalkSetting,
  plan: WalkPlan,
  walker: WalkerModel,
  device: DeviceModel,
  route: Route,
): SimulatedWalk {
  const { seed } = setting;
  const { walk } = plan;
  const timeline = walkTimeline(walker, route, randomStream(seed, 'walk', walk, 'steps'));
  const carries: CarrySpell[] = [
    { carry: plan.carry, fromS: Number.NEGATIVE_INFINITY },
    ...plan.changes.map(({ at_m, carry }) => ({ carry, fromS: instantAt(timeline, at_m) })),
  ];
  const model = motionModel(seed, walk, {
    walker,
    curve: route.curve,
    timeline,
    upM: route.plan.up_m,
    carries,
    wander: plan.wander,
  });
  const rates = ratesOf(device);
  const together = device.plan.shape === 'wide';
  // In a wide log all sensors are measured at the same instants: the motion is computed once.
  let shared: { sampling: Sampling; motion: DeviceMotion } | null = null;
  const streams: SensorStream[] = [];
  for (const [sensor, rateHz] of rates) {
    const sampling = sample(seed, walk, device, sensor, rateHz, timeline.durationS, together);
    const sameTimes = shared !== null && same(shared.sampling.measuredS, sampling.measuredS);
    const motion: DeviceMotion = sameTimes ? shared!.motion : motionAt(model, sampling.measuredS);
    if (together) shared = { sampling, motion };
    const truth = measured(sensor, motion, setting);
    const { values, bias } = sense(seed, walk, device, sensor, truth, sampling.measuredS, rateHz);
    streams.push({ sensor, rateHz, ...sampling, values, bias });
  }
  const clock = logClock(seed, walk, device);
  const firstStamp = Math.min(...streams.map(({ stampedS }) => clock.stamp(stampedS[0]!)));
  const lost = lostSpells(seed, walk, device, timeline.durationS);
  return { plan, walker, device, route, model, clock, firstStamp, streams, lost };
}

function same(a: Float64Array, b: Float64Array): boolean {
  return a.length === b.length && a.every((value, i) => value === b[i]);
}

function ratesOf({ plan }: DeviceModel): [Sensor, number][] {
  const { rate_hz } = plan;
  if (typeof rate_hz === 'number')
    return [
      ['accel', rate_hz],
      ['gyro', rate_hz],
      ['mag', rate_hz],
    ];
  return SENSORS.flatMap((sensor): [Sensor, number][] =>
    rate_hz[sensor] === undefined ? [] : [[sensor, rate_hz[sensor]]],
  );
}

/** What a perfect sensor would read. */
function measured(
  sensor: Sensor,
  motion: DeviceMotion,
  { place, heightM }: WalkSetting,
): readonly Float64Array[] {
  switch (sensor) {
    case 'accel':
      return specificForce(motion, place.gravityMps2);
    case 'gyro':
      return motion.rate;
    case 'mag':
      return intoDevice(motion.attitude, fieldAt(place, motion.position));
    case 'baro':
      return [motion.position[2].map((upM) => pressureAt(heightM + upM))];
    default:
      return sensor satisfies never;
  }
}

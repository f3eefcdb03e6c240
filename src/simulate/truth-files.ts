import { join } from 'node:path';
import { writeNumberCsv } from '../campaign/write-campaign.js';
import { HANDLING_S } from './carry-plan.js';
import { motionAt } from './device-motion.js';
import { fieldAt, type PlaceModel } from './magnetic-map.js';
import type { SensorStream, SimulatedWalk } from './simulate-walk.js';
import { instantAt, isWalking } from './timeline.js';

/** Seconds since the walk's first reading, on the phone's own clock, of a true instant. */
export function truthTime(walk: SimulatedWalk, trueS: number): number {
  return walk.clock.sinceStamp(trueS, walk.firstStamp);
}

/** True instants of a walk's steps and passes with their truth times. */
export function stepRows(walk: SimulatedWalk): (string | number)[][] {
  const at = new Float64Array(5);
  return walk.model.timeline.bouts.flatMap(({ contacts }) =>
    contacts.map(({ tS, foot, lengthM, alongM }) => {
      walk.route.curve.at(alongM, at);
      const headingDeg = ((((at[2]! * 180) / Math.PI) % 360) + 360) % 360;
      return [
        walk.plan.walk,
        truthTime(walk, tS).toFixed(6),
        foot,
        lengthM.toFixed(6),
        headingDeg.toFixed(4),
      ];
    }),
  );
}

/** The true instant at which the walker passes a place along the route. */
export function passInstant(walk: SimulatedWalk, alongM: number): number {
  return instantAt(walk.model.timeline, alongM);
}

/**
 * Writes path-truth, attitude-truth and truth-sensors of a walk, all at the same instants: readings of
 * the gyroscope (of the accelerometer where there is none), thinned to about `rateHz`.
 */
export function writeTruth(dir: string, walk: SimulatedWalk, place: PlaceModel, rateHz: number): void {
  const clocked = walk.streams.find(({ sensor }) => sensor === 'gyro') ?? walk.streams[0]!;
  const every = Math.max(1, Math.round(clocked.rateHz / rateHz));
  const pick = (column: Float64Array) => column.filter((_, i) => i % every === 0);
  const times = pick(clocked.measuredS);
  const motion = motionAt(walk.model, times);
  const t = times.map((trueS) => truthTime(walk, trueS));
  const file = (folder: string) => join(dir, folder, `${walk.plan.walk}.csv`);
  writeNumberCsv(file('path-truth'), ['t_s', 'east_m', 'north_m', 'up_m'], [t, ...motion.body], [9, 6, 6, 6]);
  const { timeline, spells } = walk.model;
  const moving = times.map((trueS) =>
    isWalking(timeline, trueS) || spells.some(({ fromS }) => trueS >= fromS && trueS <= fromS + HANDLING_S)
      ? 1
      : 0,
  );
  writeNumberCsv(
    file('attitude-truth'),
    ['t_s', 'qw', 'qx', 'qy', 'qz', 'moving'],
    [t, ...motion.attitude, moving],
    [9, 9, 9, 9, 9, 0],
  );
  const gyro = clocked.sensor === 'gyro' ? clocked : null;
  writeNumberCsv(
    file('truth-sensors'),
    [
      't_s',
      ...(gyro ? ['bgx_radps', 'bgy_radps', 'bgz_radps'] : []),
      'field_east_uT',
      'field_north_uT',
      'field_up_uT',
      'device_east_m',
      'device_north_m',
      'device_up_m',
    ],
    [t, ...biasOf(gyro, pick), ...fieldAt(place, motion.position), ...motion.position],
    [9, ...(gyro ? [9, 9, 9] : []), 6, 6, 6, 6, 6, 6],
  );
}

function biasOf(gyro: SensorStream | null, pick: (column: Float64Array) => Float64Array): Float64Array[] {
  return gyro ? gyro.bias.map(pick) : [];
}

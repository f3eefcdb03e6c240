import { InputError } from '../errors.js';
import { parseStamp, secondsBetween } from './exact-time.js';
import type { TimeUnit } from './types.js';

/**
 * A truth's time in seconds since the walk's first reading.
 *
 * Taken from the digits as written, so nothing is lost between epoch stamps: `1574570929.6` against a
 * start of `1574570929727` ms is exactly -0.127.
 *
 * @param time - as written in passes.csv or a truth file; always seconds.
 * @param truthTime - `log`: in the log's time base; `relative`: since the first reading already.
 * @param t0 - the first reading's stamp as written, and its unit.
 * @throws InputError `not-a-time` where either is not a decimal number.
 */
export function secondsSinceStart(
  time: string,
  truthTime: 'log' | 'relative',
  t0: { value: string; unit: TimeUnit },
): number {
  const stamp = parseStamp(time, 's');
  if (!stamp) throw new InputError('not-a-time', `time "${time}" is not a number of seconds`);
  if (truthTime === 'relative') return secondsBetween(stamp.seconds, stamp.femtos, 0, 0);
  const start = parseStamp(t0.value, t0.unit);
  if (!start) throw new InputError('not-a-time', `log start "${t0.value}" is not a number of ${t0.unit}`);
  return secondsBetween(stamp.seconds, stamp.femtos, start.seconds, start.femtos);
}

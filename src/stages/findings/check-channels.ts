import { type Finding, SENSOR_WORDS } from './finding.js';

const AXES = ['x', 'y', 'z'];

export interface ChannelLimits {
  /** A channel that keeps one value this long, while its sensor's others move, is stuck, s. */
  stuckS: number;
  /** A channel at its largest size for this many readings in a row has hit its range. */
  saturatedReadings: number;
}

/**
 * Channels that are stuck at a value or clipped at the end of their range.
 *
 * @param columns - the sensor's axes, each of shape (t.length).
 */
export function checkChannels(
  sensor: string,
  t: Float64Array,
  columns: readonly Float64Array[],
  limits: ChannelLimits,
): Finding[] {
  const out: Finding[] = [];
  const name = SENSOR_WORDS[sensor] ?? sensor;
  for (const [a, column] of columns.entries()) {
    const others = columns.filter((_, k) => k !== a);
    const stuck = longestStill(t, column, others);
    if (stuck && stuck.to_s - stuck.from_s > limits.stuckS)
      out.push({
        severity: 'fail',
        kind: 'stuck',
        sensor,
        ...stuck,
        value: stuck.to_s - stuck.from_s,
        message: `${name}: ${AXES[a]} keeps one value for ${(stuck.to_s - stuck.from_s).toFixed(1)} s while the other axes move; what is made of that time is wrong; leave the walk out or cut it`,
      });
    const clipped = longestClipped(t, column, limits.saturatedReadings);
    if (clipped)
      out.push({
        severity: 'warn',
        kind: 'saturated',
        sensor,
        from_s: clipped.from_s,
        to_s: clipped.to_s,
        value: clipped.limit,
        message: `${name}: ${AXES[a]} stays at ${clipped.limit.toPrecision(4)}, the end of its range, for ${clipped.readings} readings; shocks and quick turns are cut off; choose a wider range in the logger`,
      });
  }
  return out;
}

/** The longest run of one value in which another axis changes; null where there is none. */
function longestStill(
  t: Float64Array,
  column: Float64Array,
  others: readonly Float64Array[],
): { from_s: number; to_s: number } | null {
  let best: { from_s: number; to_s: number } | null = null;
  for (let from = 0; from < column.length; ) {
    let to = from + 1;
    while (to < column.length && column[to] === column[from]) to++;
    const long = t[to - 1]! - t[from]!;
    if (long > (best ? best.to_s - best.from_s : 0) && others.some((other) => changes(other, from, to)))
      best = { from_s: t[from]!, to_s: t[to - 1]! };
    from = to;
  }
  return best;
}

/** Whether a channel takes more than a handful of values: quantisation alone lets one toggle between two. */
function changes(column: Float64Array, from: number, to: number): boolean {
  const values = new Set<number>();
  for (let i = from; i < to && values.size < 8; i++) values.add(column[i]!);
  return values.size >= 8;
}

/** Just below the end of the range, as a part of the channel's span: rare when clipped, common at a natural crest. */
const NEAR_SHARE = 0.05;
/** How much oftener the end itself is read than all that is just below it, where a channel is clipped. */
const CLIPPED_RATIO = 2;

/** The longest run at the channel's largest or smallest value, where it is the end of the range and no crest. */
function longestClipped(
  t: Float64Array,
  column: Float64Array,
  least: number,
): { from_s: number; to_s: number; readings: number; limit: number } | null {
  let high = Number.NEGATIVE_INFINITY;
  let low = Number.POSITIVE_INFINITY;
  for (const x of column) {
    if (x > high) high = x;
    if (x < low) low = x;
  }
  if (!(high > low)) return null;
  const near = NEAR_SHARE * (high - low);
  let best: { from_s: number; to_s: number; readings: number; limit: number } | null = null;
  for (const limit of [high, low]) {
    let at = 0;
    let below = 0;
    for (const x of column) {
      if (x === limit) at++;
      else if (Math.abs(x - limit) < near) below++;
    }
    if (at < least || at < CLIPPED_RATIO * below) continue;
    for (let from = 0; from < column.length; ) {
      let to = from + 1;
      if (column[from] === limit) {
        while (to < column.length && column[to] === limit) to++;
        if (to - from >= least && to - from > (best?.readings ?? 0))
          best = { from_s: t[from]!, to_s: t[to - 1]!, readings: to - from, limit };
      }
      from = to;
    }
  }
  return best;
}

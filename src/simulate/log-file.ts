import { type WrittenColumn, writeNumberCsv } from '../campaign/write-campaign.js';
import { randomStream } from '../stats/random.js';
import type { Sensor } from './device-schema.js';
import { STAMP_DIGITS } from './log-clock.js';
import type { DeviceModel } from './sensor-errors.js';
import type { SensorStream, SimulatedWalk } from './simulate-walk.js';

/** Column names of each sensor in a wide log. */
const WIDE: Readonly<Record<Sensor, readonly string[]>> = {
  accel: ['ax', 'ay', 'az'],
  gyro: ['gx', 'gy', 'gz'],
  mag: ['mx', 'my', 'mz'],
  baro: ['p'],
};

const UNIT = { accel: 'mps2', gyro: 'radps', mag: 'uT', baro: 'hPa' } as const;

/** The log layout of a device, as campaign.yaml says it. */
export function layoutOf(device: DeviceModel): Record<string, unknown> {
  const { shape, time_unit, rate_hz } = device.plan;
  const sensors = (typeof rate_hz === 'number' ? ['accel', 'gyro', 'mag'] : Object.keys(rate_hz)) as Sensor[];
  const tagged = shape === 'tagged';
  return {
    shape,
    time: { column: 't', unit: time_unit },
    ...(tagged ? { tag: 'sensor' } : {}),
    ...Object.fromEntries(
      sensors.map((sensor) => [
        sensor,
        {
          ...(tagged ? { tag: sensor } : {}),
          columns: tagged ? ['x', 'y', 'z'].slice(0, WIDE[sensor].length) : WIDE[sensor],
          unit: UNIT[sensor],
          ...(sensor === 'accel' ? { sign: 'specific-force' } : {}),
        },
      ]),
    ),
  };
}

/** Decimals that keep a quantised value's step, or nine for unquantised ones. */
function decimals(step: number): number {
  return step > 0 ? Math.min(9, Math.ceil(-Math.log10(step)) + 3) : 9;
}

/**
 * Writes a walk's log: rows in order of their stamps, without those lost, some twice, some out of place.
 *
 * The first row stays the first reading, for truths are timed from it.
 *
 * @returns the number of rows.
 */
export function writeLog(path: string, seed: number, walk: SimulatedWalk): number {
  const { streams, device } = walk;
  const wide = device.plan.shape === 'wide';
  const sources = wide ? streams.slice(0, 1) : streams;
  const { from, at } = rowOrder(seed, walk, sources);
  const n = from.length;
  const stamps = new Float64Array(n);
  for (let row = 0; row < n; row++) stamps[row] = walk.clock.stamp(sources[from[row]!]!.stampedS[at[row]!]!);
  const header = ['t'];
  const columns: WrittenColumn[] = [stamps];
  const digits: number[] = [STAMP_DIGITS[device.plan.time_unit]];
  if (wide)
    for (const { sensor, values } of streams)
      for (const [axis, column] of values.entries()) {
        header.push(WIDE[sensor][axis]!);
        columns.push(Float64Array.from(at, (index) => column[index]!));
        digits.push(decimals(device[sensor].step));
      }
  else {
    header.push('sensor', 'x', 'y', 'z');
    columns.push(Array.from(from, (source) => streams[source]!.sensor));
    digits.push(0);
    for (let axis = 0; axis < 3; axis++) {
      columns.push(
        Float64Array.from(at, (index, row) => streams[from[row]!]!.values[axis]?.[index] ?? Number.NaN),
      );
      digits.push(Math.max(...streams.map(({ sensor }) => decimals(device[sensor].step))));
    }
  }
  writeNumberCsv(path, header, columns, digits);
  return n;
}

/** For each row the stream it is of and the reading's index there. */
function rowOrder(
  seed: number,
  walk: SimulatedWalk,
  sources: readonly SensorStream[],
): { from: Int32Array; at: Int32Array } {
  const { device, lost } = walk;
  const random = randomStream(seed, 'walk', walk.plan.walk, 'rows');
  const total = sources.reduce((sum, { stampedS }) => sum + stampedS.length, 0);
  const from = new Int32Array(2 * total);
  const at = new Int32Array(2 * total);
  const next = new Int32Array(sources.length);
  let rows = 0;
  let spell = 0;
  for (let read = 0; read < total; read++) {
    let earliest = -1;
    let tS = Number.POSITIVE_INFINITY;
    for (let source = 0; source < sources.length; source++) {
      const candidate = sources[source]!.stampedS[next[source]!];
      if (candidate !== undefined && candidate < tS) {
        tS = candidate;
        earliest = source;
      }
    }
    const index = next[earliest]!++;
    while (spell < lost.length && lost[spell + 1]! < tS) spell += 2;
    if (rows > 0 && spell < lost.length && tS >= lost[spell]!) continue;
    const copies = random.uniform() < device.duplicates ? 2 : 1;
    for (let copy = 0; copy < copies; copy++) {
      from[rows] = earliest;
      at[rows] = index;
      rows++;
    }
  }
  for (let row = 1; row + 1 < rows; row++)
    if (random.uniform() < device.disorder) {
      [from[row], from[row + 1]] = [from[row + 1]!, from[row]!];
      [at[row], at[row + 1]] = [at[row + 1]!, at[row]!];
      row++;
    }
  return { from: from.slice(0, rows), at: at.slice(0, rows) };
}

import { quantile } from '../../stats/quantile.js';
import { type Finding, SENSOR_WORDS } from './finding.js';
import { vectorSize } from './vector-size.js';

/** Sizes that a sensor's vector has in a unit, with what to write in the layout. */
interface UnitGuess {
  low: number;
  high: number;
  unit: string;
}

/**
 * What the median size of a walk's readings would be in units that loggers write; the ranges do not overlap with the
 * right one, [5, 20] m/s2 and [10, 200] uT. Common practice, no source: gravity is 9.8 m/s2 everywhere, the earth's
 * field 22 to 67 uT.
 */
const GUESSES: Readonly<Record<'accel' | 'mag', readonly UnitGuess[]>> = {
  accel: [
    { low: 0.5, high: 2, unit: 'g' },
    { low: 500, high: 2000, unit: 'thousandths of g (divide by 1000 and say g)' },
  ],
  mag: [
    { low: 0.1, high: 2, unit: 'gauss' },
    { low: 10_000, high: 200_000, unit: 'nT' },
    { low: 0.01, high: 0.1, unit: 'mT' },
  ],
};

const RIGHT: Readonly<Record<'accel' | 'mag', readonly [number, number, string]>> = {
  accel: [5, 20, 'mps2'],
  mag: [10, 200, 'uT'],
};

/** A gyroscope on a walker reads more than this at one time in twenty only in degrees: 10 rad/s is 570 degrees a second. */
const FASTEST_RADPS = 10;

/** As many readings tell a walk's median as well as all. */
const SAMPLES = 20_000;

/** Whether a sensor's numbers have the size that its unit lets expect. */
export function checkUnits(
  sensor: 'accel' | 'gyro' | 'mag',
  t: Float64Array,
  x: Float64Array,
  y: Float64Array,
  z: Float64Array,
): Finding[] {
  const size = vectorSize(x, y, z, Math.max(1, Math.floor(x.length / SAMPLES)));
  const known = size.filter(Number.isFinite);
  if (known.length < 10) return [];
  const whole = { sensor, from_s: t[0]!, to_s: t.at(-1)! };
  const name = SENSOR_WORDS[sensor]!;
  if (sensor === 'gyro') {
    const high = quantile(known, 0.95);
    if (!(high > FASTEST_RADPS)) return [];
    return [
      {
        severity: 'fail',
        kind: 'wrong-unit',
        ...whole,
        value: high,
        message: `${name}: one reading in twenty is above ${high.toFixed(0)} rad/s, more than any walker turns; headings are meaningless; the layout's unit is probably degps`,
      },
    ];
  }
  const middle = quantile(known, 0.5);
  const [low, high, unit] = RIGHT[sensor];
  if (middle >= low && middle <= high) return [];
  const guess = GUESSES[sensor].find((each) => middle >= each.low && middle <= each.high);
  return [
    {
      severity: 'fail',
      kind: guess ? 'wrong-unit' : 'wrong-size',
      ...whole,
      value: middle,
      message: `${name}: the median size is ${middle.toPrecision(3)} ${unit}, expected ${low} to ${high}; ${
        guess ? `the layout's unit is probably ${guess.unit}` : "look at the layout's unit and columns"
      }`,
    },
  ];
}

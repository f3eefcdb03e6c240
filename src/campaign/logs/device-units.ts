import type { LogLayout, SensorLayout, SensorName } from '../types.js';

/** Standard gravity, exact by definition: 3rd General Conference on Weights and Measures (1901). */
const STANDARD_GRAVITY_MPS2 = 9.80665;

/** To m/s², rad/s, uT and hPa: multiply by the first, divide by the second, so that whole powers of ten stay exact. */
const CONVERSIONS: Readonly<Record<string, readonly [number, number]>> = {
  mps2: [1, 1],
  g: [STANDARD_GRAVITY_MPS2, 1],
  radps: [1, 1],
  degps: [Math.PI, 180],
  uT: [1, 1],
  mT: [1000, 1],
  nT: [1, 1000],
  gauss: [100, 1],
  hPa: [1, 1],
  Pa: [1, 100],
  kPa: [10, 1],
};

/**
 * A sensor's columns in the device's axes and the tables' units.
 *
 * An accelerometer that is `gravity-directed` (reads -g where specific force is +g) is negated.
 *
 * @param columns - the file's, one per axis; not changed.
 */
export function inDeviceUnits(
  columns: readonly Float64Array[],
  sensor: SensorName,
  part: SensorLayout,
  layout: LogLayout,
): Float64Array[] {
  const conversion = CONVERSIONS[part.unit];
  if (!conversion) throw new Error(`${sensor}: unit ${part.unit} has no conversion`);
  const [factor, divisor] = conversion;
  const turned = sensor === 'accel' && part.sign === 'gravity-directed' ? -1 : 1;
  return columns.map((_, device) => {
    const { axis, sign } = columns.length === 3 ? layout.axes[device]! : { axis: 0, sign: 1 };
    const signed = sign * turned * factor;
    const column = columns[axis]!;
    if (signed === 1 && divisor === 1) return column;
    const converted = new Float64Array(column.length);
    // Adding 0 makes the -0 of a negated zero the plain 0.
    for (let row = 0; row < column.length; row++) converted[row] = (column[row]! * signed) / divisor + 0;
    return converted;
  });
}

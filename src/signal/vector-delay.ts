import { butterworthLowPass } from './butterworth.js';
import { zeroPhase } from './zero-phase.js';

/** How much later a vector's readings are stamped than the gyroscope's that belong to them. */
export interface VectorDelay {
  delayS: number;
  /** Correlation at that delay, 0 to 1. */
  correlation: number;
}

/** Delays looked through, s. */
const LARGEST_S = 0.5;
/** Faster changes are noise or a step's shock, Hz. */
const LOWPASS_HZ = 3;

/**
 * Delay between a gyroscope and a vector that is fixed in space (gravity, the magnetic field), by cross-correlation of
 * the vector's rate of change in the device with the one that the gyroscope lets expect, dv/dt = -w x v.
 *
 * @param rate - three arrays of shape (n), rad/s, on a uniform grid.
 * @param vector - three arrays of shape (n), same grid, any unit.
 * @param stepS - of the grid.
 * @param from - first sample used; default 0.
 * @param to - end of the samples used; default n.
 * @returns null where the vector hardly turns.
 * @see Knapp & Carter (1976), IEEE Trans. Acoustics, Speech, and Signal Processing 24(4), 320-327 (delay by
 *   cross-correlation, parabola through its top).
 */
export function vectorDelay(
  rate: readonly Float64Array[],
  vector: readonly Float64Array[],
  stepS: number,
  from = 0,
  to = rate[0]!.length,
): VectorDelay | null {
  const sections = butterworthLowPass(2, Math.min(LOWPASS_HZ, 0.4 / stepS), 1 / stepS);
  const smooth = (column: Float64Array) => zeroPhase(sections, column.subarray(from, to));
  const n = to - from;
  const largest = Math.round(LARGEST_S / stepS);
  if (n < 8 * largest) return null;
  const v = vector.map(smooth);
  const w = rate.map(smooth);
  const unit = v.map((column) => column.map((x, i) => x / Math.hypot(v[0]![i]!, v[1]![i]!, v[2]![i]!)));
  const seen = unit.map((column) =>
    column.map((_, i) => (i > 0 && i + 1 < n ? (column[i + 1]! - column[i - 1]!) / (2 * stepS) : 0)),
  );
  const [x, y, z] = unit as [Float64Array, Float64Array, Float64Array];
  const [wx, wy, wz] = w as [Float64Array, Float64Array, Float64Array];
  const told = [
    x.map((_, i) => wz[i]! * y[i]! - wy[i]! * z[i]!),
    x.map((_, i) => wx[i]! * z[i]! - wz[i]! * x[i]!),
    x.map((_, i) => wy[i]! * x[i]! - wx[i]! * y[i]!),
  ];
  const at = (lag: number): number => {
    let product = 0;
    let a = 0;
    let b = 0;
    for (let c = 0; c < 3; c++)
      for (let i = Math.max(0, -lag); i < n - Math.max(0, lag); i++) {
        const s = seen[c]![i + lag]!;
        const t = told[c]![i]!;
        product += s * t;
        a += s * s;
        b += t * t;
      }
    return a > 0 && b > 0 ? product / Math.sqrt(a * b) : 0;
  };
  const correlation = Float64Array.from({ length: 2 * largest + 1 }, (_, k) => at(k - largest));
  let best = 0;
  for (let k = 1; k < correlation.length; k++) if (correlation[k]! > correlation[best]!) best = k;
  if (best === 0 || best === correlation.length - 1 || !(correlation[best]! > 0)) return null;
  const [before, top, after] = [correlation[best - 1]!, correlation[best]!, correlation[best + 1]!];
  const bend = before - 2 * top + after;
  const offset = bend < 0 ? (0.5 * (before - after)) / bend : 0;
  return { delayS: (best - largest + offset) * stepS, correlation: top };
}

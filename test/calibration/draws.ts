import { randomStream } from '../../src/stats/random.js';

export const TRUE_BIAS = [0.4, -0.2, 0.7];
/** Symmetric: scales and half angles of a few percent. */
export const TRUE_MATRIX = [1.02, 0.006, -0.004, 0.006, 0.985, 0.003, -0.004, 0.003, 1.01];

/** Raw readings of a vector of the given size in random directions: raw = M^-1 v + bias + noise. */
export function drawnReadings(
  seed: number,
  count: number,
  radius: number,
  noise: number,
): [Float64Array, Float64Array, Float64Array] {
  const random = randomStream(seed, 'calibration');
  const out = [new Float64Array(count), new Float64Array(count), new Float64Array(count)] as const;
  const inverse = inverted(TRUE_MATRIX);
  for (let i = 0; i < count; i++) {
    const v = [random.normal(), random.normal(), random.normal()];
    const length = Math.hypot(...v);
    for (let a = 0; a < 3; a++) {
      let raw = TRUE_BIAS[a]! + noise * random.normal();
      for (let b = 0; b < 3; b++) raw += (inverse[3 * a + b]! * v[b]! * radius) / length;
      out[a]![i] = raw;
    }
  }
  return [...out];
}

function inverted(m: readonly number[]): number[] {
  const [a, b, c, d, e, f, g, h, i] = m as [
    number,
    number,
    number,
    number,
    number,
    number,
    number,
    number,
    number,
  ];
  const det = a * (e * i - f * h) - b * (d * i - f * g) + c * (d * h - e * g);
  return [
    e * i - f * h,
    c * h - b * i,
    b * f - c * e,
    f * g - d * i,
    a * i - c * g,
    c * d - a * f,
    d * h - e * g,
    b * g - a * h,
    a * e - b * d,
  ].map((x) => x / det);
}

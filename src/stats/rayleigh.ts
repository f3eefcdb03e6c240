import { InputError } from '../errors.js';
import { normalCdf } from './normal.js';
import { solveIncreasing } from './solve-increasing.js';

/** A plane error: standard deviations along its two principal axes, and the offset of its mean on them. */
export interface PlanarError {
  sdX: number;
  sdY: number;
  biasX?: number;
  biasY?: number;
}

/**
 * Radius that holds a share of circular Gaussian errors, in standard deviations of one axis.
 *
 * 0.5 gives CE50 (CEP) 1.1774, 0.95 gives CE95 2.4477; the distance root mean square is √2.
 *
 * @param probability - 0..1, 1 gives Infinity.
 * @throws InputError `probability`.
 */
export function circularErrorFactor(probability: number): number {
  if (!(probability >= 0 && probability <= 1))
    throw new InputError(
      'probability',
      `circularErrorFactor: probability must be in 0..1, got ${probability}`,
    );
  return Math.sqrt(-2 * Math.log1p(-probability) + 0);
}

/**
 * Share of plane Gaussian errors within a radius about the truth; axes may be unequal and biased.
 *
 * The density integrated over the disc in strips, to about 1e-12.
 *
 * @param radius - at least 0, the unit of the standard deviations.
 * @throws InputError `range` where the radius is negative, a standard deviation not above 0, or NaN.
 */
export function radialErrorCdf(radius: number, error: PlanarError): number {
  const { sdX, sdY, biasX = 0, biasY = 0 } = error;
  if (!(radius >= 0))
    throw new InputError('range', `radialErrorCdf: radius must be at least 0, got ${radius}`);
  if (!(sdX > 0 && sdY > 0) || !Number.isFinite(sdX + sdY + biasX + biasY))
    throw new InputError(
      'range',
      `radialErrorCdf: standard deviations must be finite and above 0 and biases finite, got ${sdX}, ${sdY}, ${biasX}, ${biasY}`,
    );
  if (radius === Number.POSITIVE_INFINITY) return 1;
  // Strips across x; beyond 9 standard deviations of it nothing is left.
  const from = Math.max(-radius, biasX - 9 * sdX);
  const to = Math.min(radius, biasX + 9 * sdX);
  if (!(from < to)) return 0;
  // Substituting x by a sine smooths the ends of the disc, where a strip's length has a vertical tangent.
  const [start, end] = [Math.asin(Math.max(-1, from / radius)), Math.asin(Math.min(1, to / radius))];
  const strip = (angle: number) => {
    const x = radius * Math.sin(angle);
    const half = radius * Math.cos(angle);
    const z = (x - biasX) / sdX;
    const held = normalCdf((half - biasY) / sdY) - normalCdf((-half - biasY) / sdY);
    return (Math.exp(-0.5 * z * z) / (sdX * Math.sqrt(2 * Math.PI))) * held * half;
  };
  // Enough panels that each is short beside both standard deviations.
  const panels = Math.ceil(8 + ((end - start) * radius) / Math.min(sdX, sdY));
  let sum = 0;
  const width = (end - start) / panels;
  for (let p = 0; p < panels; p++) {
    const middle = start + (p + 0.5) * width;
    for (let k = 0; k < GAUSS_NODES.length; k++)
      sum +=
        GAUSS_WEIGHTS[k]! *
        (strip(middle + 0.5 * width * GAUSS_NODES[k]!) + strip(middle - 0.5 * width * GAUSS_NODES[k]!));
  }
  return Math.min(1, 0.5 * width * sum);
}

/**
 * Radius about the truth that holds a share of plane Gaussian errors: CE50, CE95 and so on of unequal
 * or biased axes.
 *
 * @param probability - at least 0, below 1.
 * @throws InputError `probability`, `range`.
 */
export function radialErrorQuantile(probability: number, error: PlanarError): number {
  if (!(probability >= 0 && probability < 1))
    throw new InputError(
      'probability',
      `radialErrorQuantile: probability must be at least 0 and below 1, got ${probability}`,
    );
  const { sdX, sdY, biasX = 0, biasY = 0 } = error;
  const cdf = (r: number) => radialErrorCdf(r, error);
  cdf(0); // refuses what is no error
  if (probability === 0) return 0;
  // The larger circle about the biased mean holds at least as much.
  let high = Math.hypot(biasX, biasY) + circularErrorFactor(probability) * Math.max(sdX, sdY) + 1e-300;
  while (cdf(high) < probability) high *= 1.01;
  const step = 1e-5 * high;
  const slope = (r: number) => (cdf(r + step) - cdf(Math.max(0, r - step))) / (2 * step);
  return solveIncreasing(cdf, slope, probability, 0.7 * high, 0, high);
}

/** Gauss-Legendre nodes above 0 and weights for 8 points on [-1, 1]: Abramowitz & Stegun (1964), table 25.4. */
const GAUSS_NODES = [0.1834346424956498, 0.525532409916329, 0.7966664774136267, 0.9602898564975362];
const GAUSS_WEIGHTS = [0.362683783378362, 0.31370664587788727, 0.22238103445337448, 0.10122853629037626];

/**
 * Exponent of the spectrum f^alpha of a rate: 2 white phase (also quantisation), 1 flicker phase,
 * 0 white rate (random walk of the angle), -1 flicker rate (bias instability), -2 random walk of the rate,
 * -3 and -4 steeper.
 */
export type NoiseExponent = 2 | 1 | 0 | -1 | -2 | -3 | -4;

/**
 * Generalised autocovariance of the integral of power-law noise, up to a factor, at lag t.
 *
 * Not a covariance by itself where the integral is not stationary; sums of it over finite differences of
 * a high enough order are.
 *
 * @param t - lag, any sign.
 * @param exponent - 4 to -4, of the spectrum f^(exponent - 2) of the integral; 4 is the second integral's
 *   companion of white phase noise.
 * @see Greenhall & Riley (2003), Uncertainty of stability variances based on finite differences, 35th
 *   PTTI meeting, 267-280, equation for s_w.
 */
export function integralCovariance(t: number, exponent: NoiseExponent): number {
  const a = Math.abs(t);
  switch (exponent) {
    case 2:
      return -a;
    case 1:
      return a === 0 ? 0 : a * a * Math.log(a);
    case 0:
      return a * a * a;
    case -1:
      return a === 0 ? 0 : -(a ** 4) * Math.log(a);
    case -2:
      return -(a ** 5);
    case -3:
      return a === 0 ? 0 : a ** 6 * Math.log(a);
    case -4:
      return a ** 7;
    default:
      return exponent satisfies never;
  }
}

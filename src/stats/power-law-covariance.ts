/**
 * Exponent of the spectrum f^alpha of a rate: 2 white phase (also quantisation), 1 flicker phase,
 * 0 white rate (random walk of the angle), -1 flicker rate (bias instability), -2 random walk of the rate,
 * -3 and -4 steeper.
 */
export type NoiseExponent = 2 | 1 | 0 | -1 | -2 | -3 | -4;

/**
 * Generalised autocovariance, up to a factor, of noise with the spectrum f^(exponent - 4): the second
 * integral of rate noise of this exponent, or the first integral of rate noise of exponent - 2.
 *
 * Not a covariance by itself, as such noise is not stationary; sums of it over finite differences of a high
 * enough order are.
 *
 * @param t - lag, any sign.
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

/** Value and first two derivatives of a function of one number. */
export type Curve2 = [value: number, slope: number, curvature: number];

/**
 * Rises from 0 to 1 over u in 0..1, with three derivatives that vanish at both ends.
 *
 * @param out - receives value and two derivatives with respect to u.
 */
export function smoothStep(u: number, out: Curve2): void {
  if (!(u > 0 && u < 1)) {
    out[0] = u > 0 ? 1 : 0;
    out[1] = 0;
    out[2] = 0;
    return;
  }
  const u2 = u * u;
  const rest = 1 - u;
  out[0] = u2 * u2 * (35 + u * (-84 + u * (70 - 20 * u)));
  out[1] = 140 * u2 * u * rest * rest * rest;
  out[2] = 420 * u2 * rest * rest * (1 - 2 * u);
}

/**
 * A hill of height 1 over u in 0..1, (4u(1-u))^power; power - 1 derivatives vanish at both ends.
 *
 * @param power - a whole number from 3 on; the second derivative at the top is -8 power.
 */
export function smoothHill(u: number, power: number, out: Curve2): void {
  if (!(u > 0 && u < 1)) {
    out[0] = 0;
    out[1] = 0;
    out[2] = 0;
    return;
  }
  const w = 4 * u * (1 - u);
  const slope = 4 - 8 * u;
  const low = w ** (power - 2);
  out[0] = low * w * w;
  out[1] = power * low * w * slope;
  out[2] = power * low * ((power - 1) * slope * slope - 8 * w);
}

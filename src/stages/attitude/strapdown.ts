/**
 * Rotation vector of the turn between two gyroscope samples, written to `out`.
 *
 * Trapezoid plus the first coning term, exact to third order for a rate that changes linearly in between.
 *
 * @see Bortz (1971), IEEE Trans. Aerospace and Electronic Systems 7(1), 61-66: the rotation-vector equation.
 */
export function turnBetween(
  ax: number,
  ay: number,
  az: number,
  bx: number,
  by: number,
  bz: number,
  dt: number,
  out: Float64Array,
): void {
  const c = (dt * dt) / 12;
  out[0] = 0.5 * dt * (ax + bx) + c * (ay * bz - az * by);
  out[1] = 0.5 * dt * (ay + by) + c * (az * bx - ax * bz);
  out[2] = 0.5 * dt * (az + bz) + c * (ax * by - ay * bx);
}

/** Multiplies the quaternion at `q[i..i+3]` from the right by the turn `v` (rotation vector), in place, kept at unit length. */
export function turnInPlace(q: Float64Array, i: number, v: Float64Array): void {
  const x = v[0]!;
  const y = v[1]!;
  const z = v[2]!;
  const angle2 = x * x + y * y + z * z;
  let c: number;
  let s: number;
  if (angle2 < 1e-4) {
    // Series to the sixth order: error below 1e-17 here.
    c = 1 - angle2 / 8 + (angle2 * angle2) / 384;
    s = 0.5 - angle2 / 48 + (angle2 * angle2) / 3840;
  } else {
    const angle = Math.sqrt(angle2);
    c = Math.cos(angle / 2);
    s = Math.sin(angle / 2) / angle;
  }
  const bx = s * x;
  const by = s * y;
  const bz = s * z;
  const w0 = q[i]!;
  const x0 = q[i + 1]!;
  const y0 = q[i + 2]!;
  const z0 = q[i + 3]!;
  const w1 = w0 * c - x0 * bx - y0 * by - z0 * bz;
  const x1 = w0 * bx + x0 * c + y0 * bz - z0 * by;
  const y1 = w0 * by - x0 * bz + y0 * c + z0 * bx;
  const z1 = w0 * bz + x0 * by - y0 * bx + z0 * c;
  const n = 1 / Math.sqrt(w1 * w1 + x1 * x1 + y1 * y1 + z1 * z1);
  q[i] = w1 * n;
  q[i + 1] = x1 * n;
  q[i + 2] = y1 * n;
  q[i + 3] = z1 * n;
}

/** Multiplies the quaternion at `q[i..i+3]` from the left by the small or large turn (x, y, z), in place. */
export function turnInEarthFrame(q: Float64Array, i: number, x: number, y: number, z: number): void {
  const angle = Math.sqrt(x * x + y * y + z * z);
  const c = Math.cos(angle / 2);
  const s = angle < 1e-6 ? 0.5 : Math.sin(angle / 2) / angle;
  const bx = s * x;
  const by = s * y;
  const bz = s * z;
  const w0 = q[i]!;
  const x0 = q[i + 1]!;
  const y0 = q[i + 2]!;
  const z0 = q[i + 3]!;
  const w1 = c * w0 - bx * x0 - by * y0 - bz * z0;
  const x1 = c * x0 + bx * w0 + by * z0 - bz * y0;
  const y1 = c * y0 + by * w0 + bz * x0 - bx * z0;
  const z1 = c * z0 + bz * w0 + bx * y0 - by * x0;
  const n = 1 / Math.sqrt(w1 * w1 + x1 * x1 + y1 * y1 + z1 * z1);
  q[i] = w1 * n;
  q[i + 1] = x1 * n;
  q[i + 2] = y1 * n;
  q[i + 3] = z1 * n;
}

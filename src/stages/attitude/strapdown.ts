/**
 * Rotation vectors between consecutive gyroscope samples, written to `out`.
 *
 * The integral of the cubic through the four samples around each interval, plus the first coning term; at the ends of
 * the range the outermost sample stands in for the one beyond it. Bias and scale are those of the whole range.
 *
 * @param gyro - x, y, z rates, rad/s, each of shape (n).
 * @param from - first interval: between samples `from` and `from + 1`.
 * @param to - the interval before which to stop; at most n - 1.
 * @param bias - rad/s, to be subtracted first; three values from `biasAt` on.
 * @param gain - factors of x, y, z, applied to what is left.
 * @param dt - spacing of the samples, s.
 * @param out - shape (>= 3 (to - from)): rotation vector of each interval, rad.
 * @see Bortz (1971), IEEE Trans. Aerospace and Electronic Systems 7(1), 61-66: the rotation-vector equation.
 */
export function turnsBetween(
  gyro: readonly [Float64Array, Float64Array, Float64Array],
  from: number,
  to: number,
  bias: Float64Array,
  biasAt: number,
  gain: readonly [number, number, number],
  dt: number,
  out: Float64Array,
): void {
  const [gx, gy, gz] = gyro;
  const [sx, sy, sz] = gain;
  const bx = bias[biasAt]!;
  const by = bias[biasAt + 1]!;
  const bz = bias[biasAt + 2]!;
  const last = gx.length - 1;
  const coning = (dt * dt) / 12;
  const w = dt / 24;
  for (let i = from, o = 0; i < to; i++, o += 3) {
    const before = i > 0 ? i - 1 : 0;
    const after = Math.min(i + 2, last);
    const ax = sx * (gx[i]! - bx);
    const ay = sy * (gy[i]! - by);
    const az = sz * (gz[i]! - bz);
    const cx = sx * (gx[i + 1]! - bx);
    const cy = sy * (gy[i + 1]! - by);
    const cz = sz * (gz[i + 1]! - bz);
    out[o] = w * (13 * (ax + cx) - sx * (gx[before]! + gx[after]! - 2 * bx)) + coning * (ay * cz - az * cy);
    out[o + 1] =
      w * (13 * (ay + cy) - sy * (gy[before]! + gy[after]! - 2 * by)) + coning * (az * cx - ax * cz);
    out[o + 2] =
      w * (13 * (az + cz) - sz * (gz[before]! + gz[after]! - 2 * bz)) + coning * (ax * cy - ay * cx);
  }
}

/** Multiplies the quaternion at `q[i..i+3]` from the right by the rotation vector at `v[k..k+2]`, in place, kept at unit length. */
export function turnInPlace(q: Float64Array, i: number, v: Float64Array, k: number): void {
  const x = v[k]!;
  const y = v[k + 1]!;
  const z = v[k + 2]!;
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

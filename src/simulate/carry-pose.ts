import type { Quaternion } from '../geometry/quaternion.js';
import { addProduct, combine, cosine, type Jet, product, sine, zeroJet } from './jet.js';

/**
 * Where a phone is on the walker and how it is turned, as functions of time.
 *
 * The walker's frame has x to the right, y forward, z up, and its origin in the pelvis's even course.
 * The phone is turned by `base` (device -> walker), then by roll about forward, pitch about right and
 * yaw about up. Angles in rad, right-handed; lengths in m.
 */
export interface CarryPose {
  right: Jet;
  forward: Jet;
  up: Jet;
  yaw: Jet;
  pitch: Jet;
  roll: Jet;
  base: Quaternion;
}

export type QuaternionJet = [w: Jet, x: Jet, y: Jet, z: Jet];

/** Device -> ENU, with time derivatives: the carry's turn, then the walker's heading (clockwise from north). */
export function attitudeOf(pose: CarryPose, heading: Jet): QuaternionJet {
  const half = (angle: Jet) => [cosine(angle, 0.5), sine(angle, 0.5)] as const;
  const [cz, sz] = half(combine(0, 1, pose.yaw, -1, heading));
  const [cx, sx] = half(pose.pitch);
  const [cy, sy] = half(pose.roll);
  // About x, then y: the product of (cx, sx, 0, 0) and (cy, 0, sy, 0).
  const [w, x, y, z] = [product(cx, cy), product(sx, cy), product(cx, sy), product(sx, sy)];
  const total: QuaternionJet = [
    addProduct(product(cz, w), -1, sz, z),
    addProduct(product(cz, x), -1, sz, y),
    addProduct(product(cz, y), 1, sz, x),
    addProduct(product(cz, z), 1, sz, w),
  ];
  return timesConstant(total, pose.base);
}

function timesConstant([w, x, y, z]: QuaternionJet, q: Quaternion): QuaternionJet {
  const sum = (kw: number, kx: number, ky: number, kz: number): Jet => {
    const out = zeroJet(w.v.length);
    for (const key of ['v', 'd', 'dd'] as const) {
      const [o, a, b, c, e] = [out[key], w[key], x[key], y[key], z[key]];
      for (let i = 0; i < o.length; i++) o[i] = kw * a[i]! + kx * b[i]! + ky * c[i]! + kz * e[i]!;
    }
    return out;
  };
  return [
    sum(q[0], -q[1], -q[2], -q[3]),
    sum(q[1], q[0], q[3], -q[2]),
    sum(q[2], -q[3], q[0], q[1]),
    sum(q[3], q[2], -q[1], q[0]),
  ];
}

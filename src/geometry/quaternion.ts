/**
 * Unit Hamilton quaternions w x y z in structure-of-arrays form, and single ones as 4-tuples.
 * A quaternion rotates device vectors into east, north, up.
 */
export type Quaternion = [w: number, x: number, y: number, z: number];
export type Vector3 = [x: number, y: number, z: number];

/** Hamilton product a b. */
export function multiply(a: Quaternion, b: Quaternion): Quaternion {
  return [
    a[0] * b[0] - a[1] * b[1] - a[2] * b[2] - a[3] * b[3],
    a[0] * b[1] + a[1] * b[0] + a[2] * b[3] - a[3] * b[2],
    a[0] * b[2] - a[1] * b[3] + a[2] * b[0] + a[3] * b[1],
    a[0] * b[3] + a[1] * b[2] - a[2] * b[1] + a[3] * b[0],
  ];
}

/** The inverse rotation. */
export function conjugate(q: Quaternion): Quaternion {
  return [q[0], -q[1], -q[2], -q[3]];
}

/** q v q*: the vector turned by the quaternion. */
export function rotate(q: Quaternion, v: Vector3): Vector3 {
  const [w, x, y, z] = q;
  const tx = 2 * (y * v[2] - z * v[1]);
  const ty = 2 * (z * v[0] - x * v[2]);
  const tz = 2 * (x * v[1] - y * v[0]);
  return [v[0] + w * tx + y * tz - z * ty, v[1] + w * ty + z * tx - x * tz, v[2] + w * tz + x * ty - y * tx];
}

/** The quaternion of a rotation vector (axis times angle, rad); exact for every length, also 0. */
export function fromRotationVector(v: Vector3): Quaternion {
  const angle = Math.hypot(v[0], v[1], v[2]);
  // sin(a/2)/a by its series where the quotient would lose digits.
  const s = angle < 1e-4 ? 0.5 - (angle * angle) / 48 : Math.sin(angle / 2) / angle;
  return [Math.cos(angle / 2), s * v[0], s * v[1], s * v[2]];
}

/** Scaled to length 1, with w >= 0. */
export function normalized(q: Quaternion): Quaternion {
  const n = (q[0] < 0 ? -1 : 1) / Math.hypot(q[0], q[1], q[2], q[3]);
  return [q[0] * n, q[1] * n, q[2] * n, q[3] * n];
}

/**
 * The quaternion of a rotation matrix, row-major, device -> earth.
 *
 * @see Shepperd (1978), J. Guidance and Control 1(3), 223-224: the largest component first, so no
 *   division by a small number.
 */
export function fromMatrix(m: readonly number[]): Quaternion {
  const [m00, m01, m02, m10, m11, m12, m20, m21, m22] = m as [
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
  const trace = m00 + m11 + m22;
  if (trace >= m00 && trace >= m11 && trace >= m22)
    return normalized([1 + trace, m21 - m12, m02 - m20, m10 - m01]);
  if (m00 >= m11 && m00 >= m22) return normalized([m21 - m12, 1 + m00 - m11 - m22, m01 + m10, m02 + m20]);
  if (m11 >= m22) return normalized([m02 - m20, m01 + m10, 1 - m00 + m11 - m22, m12 + m21]);
  return normalized([m10 - m01, m02 + m20, m12 + m21, 1 - m00 - m11 + m22]);
}

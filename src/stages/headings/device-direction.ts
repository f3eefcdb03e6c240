import type { Attitude } from '../../tables/schemas.js';

/**
 * Where the device points over the ground at each row, as a horizontal unit vector (east, north).
 *
 * The top of the screen, and as it is raised beyond 55 degrees more and more the back of the device, which from 75
 * degrees on alone counts: near upright the top's horizontal part is too short to tell a direction. As the top is
 * lowered below level the screen takes the back's place.
 *
 * @returns two arrays of shape (rows).
 */
export function deviceDirection(attitude: Attitude): { east: Float64Array; north: Float64Array } {
  const n = attitude.qw.length;
  const east = new Float64Array(n);
  const north = new Float64Array(n);
  for (let i = 0; i < n; i++) {
    const w = attitude.qw[i]!;
    const x = attitude.qx[i]!;
    const y = attitude.qy[i]!;
    const z = attitude.qz[i]!;
    const topUp = 2 * (y * z + w * x);
    const raised = Math.max(0, Math.min(1, (Math.abs(topUp) - RAISED_FROM) / (RAISED_TO - RAISED_FROM)));
    const back = topUp < 0 ? -raised : raised;
    let e = (1 - raised) * 2 * (x * y - w * z) - back * 2 * (x * z + w * y);
    let nn = (1 - raised) * (1 - 2 * (x * x + z * z)) - back * 2 * (y * z - w * x);
    const length = Math.sqrt(e * e + nn * nn);
    e = length > 0 ? e / length : 0;
    nn = length > 0 ? nn / length : 1;
    east[i] = e;
    north[i] = nn;
  }
  return { east, north };
}

const RAISED_FROM = Math.sin((55 * Math.PI) / 180);
const RAISED_TO = Math.sin((75 * Math.PI) / 180);

import type { Attitude } from '../../tables/schemas.js';

/** Standard deviation of the yaw in the row nearest to a time, rad. */
export function yawSdAt(attitude: Attitude, t: number): number {
  const rows = attitude.t_s.length;
  const stepS = rows > 1 ? (attitude.t_s[rows - 1]! - attitude.t_s[0]!) / (rows - 1) : 1;
  const row = Math.round((t - attitude.t_s[0]!) / stepS);
  return attitude.yaw_sd_rad[Math.max(0, Math.min(rows - 1, row))]!;
}

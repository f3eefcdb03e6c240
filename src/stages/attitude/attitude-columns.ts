import type { Attitude, Motion } from '../../tables/schemas.js';
import type { SmoothedAttitude } from './error-state-smoother.js';
import type { InertialSamples } from './inertial-samples.js';

/**
 * The stage's table from a smoothed trajectory: one row per row of `motion`, standard deviations straight between
 * nodes, `qw` never negative.
 */
export function attitudeColumns(
  motion: Motion,
  samples: InertialSamples,
  smoothed: SmoothedAttitude,
  settings: { magnetic_offset_sd_deg: number },
): Attitude {
  const { trajectory, chain, size, magTrust, usedMagnetometer } = smoothed;
  const n = samples.count;
  const out = {
    t_s: motion.t_s.slice(),
    qw: new Float64Array(n),
    qx: new Float64Array(n),
    qy: new Float64Array(n),
    qz: new Float64Array(n),
    bgx_radps: new Float64Array(n),
    bgy_radps: new Float64Array(n),
    bgz_radps: new Float64Array(n),
    mag_trust: new Float64Array(n),
    tilt_sd_rad: new Float64Array(n),
    yaw_sd_rad: new Float64Array(n),
  };
  const offset = usedMagnetometer ? ((settings.magnetic_offset_sd_deg * Math.PI) / 180) ** 2 : 0;
  const { q, bias, perNode, nodes } = trajectory;
  for (let i = 0; i < n; i++) {
    const sign = q[4 * i]! < 0 ? -1 : 1;
    out.qw[i] = sign * q[4 * i]!;
    out.qx[i] = sign * q[4 * i + 1]!;
    out.qy[i] = sign * q[4 * i + 2]!;
    out.qz[i] = sign * q[4 * i + 3]!;
    const j = Math.min(Math.floor(i / perNode), nodes - 2);
    out.bgx_radps[i] = bias[3 * j]!;
    out.bgy_radps[i] = bias[3 * j + 1]!;
    out.bgz_radps[i] = bias[3 * j + 2]!;
    out.mag_trust[i] = magTrust[j]!;
    const from = trajectory.sampleOf(j);
    const u = (i - from) / (trajectory.sampleOf(j + 1) - from);
    const here = j * size;
    const next = here + size;
    const v = chain.variance;
    out.tilt_sd_rad[i] = Math.sqrt(((1 - u) * (v[here]! + v[here + 1]!) + u * (v[next]! + v[next + 1]!)) / 2);
    out.yaw_sd_rad[i] = Math.sqrt((1 - u) * v[here + 2]! + u * v[next + 2]! + offset);
  }
  return out;
}

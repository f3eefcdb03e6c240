import { type StillWindow, stillWindows } from '../signal/still-windows.js';

/** A position in which the device lay still. */
export interface StillPose extends StillWindow {
  seconds: number;
}

/** Two still stretches whose means differ by less than this share of their size are one pose. */
const SAME_POSE = 0.05;

/**
 * The positions in which a device lay still, found by itself: still seconds in a row that read the same.
 *
 * @param t - times, s, ascending.
 * @param columns - three axes.
 * @param limit - largest standard deviation of an axis within a still second.
 */
export function stillPoses(
  t: Float64Array,
  columns: readonly [Float64Array, Float64Array, Float64Array],
  limit: number,
): StillPose[] {
  const poses: StillPose[] = [];
  for (const window of stillWindows(t, columns, limit)) {
    const last = poses.at(-1);
    const seconds = window.to_s - window.from_s;
    if (last && isNear(last.mean, window.mean) && window.from_s - last.to_s < 2) {
      const share = seconds / (last.seconds + seconds);
      const mean = [0, 1, 2].map((a) => last.mean[a]! + share * (window.mean[a]! - last.mean[a]!));
      poses[poses.length - 1] = {
        from_s: last.from_s,
        to_s: window.to_s,
        seconds: last.seconds + seconds,
        mean: mean as unknown as StillPose['mean'],
      };
    } else poses.push({ ...window, seconds });
  }
  return poses;
}

function isNear(a: StillPose['mean'], b: StillPose['mean']): boolean {
  return Math.hypot(a[0] - b[0], a[1] - b[1], a[2] - b[2]) < SAME_POSE * Math.hypot(...a);
}

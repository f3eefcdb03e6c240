/**
 * Windowed-sinc low-pass of odd length, linear phase, unit gain at 0 Hz (Blackman window: stop band below -74 dB).
 *
 * @param cutoff - the middle of the transition band, in cycles per sample, in (0, 0.5).
 * @param halfLength - taps on either side of the middle, >= 1.
 * @returns shape (2 halfLength + 1), symmetric.
 * @see Oppenheim & Schafer, Discrete-Time Signal Processing, "Design of FIR filters by windowing".
 */
export function lowPassTaps(cutoff: number, halfLength: number): Float64Array {
  const taps = new Float64Array(2 * halfLength + 1);
  let sum = 0;
  for (let k = -halfLength; k <= halfLength; k++) {
    const phase = (Math.PI * (k + halfLength + 1)) / (halfLength + 1);
    const window = 0.42 - 0.5 * Math.cos(phase) + 0.08 * Math.cos(2 * phase);
    const ideal = k === 0 ? 2 * cutoff : Math.sin(2 * Math.PI * cutoff * k) / (Math.PI * k);
    taps[k + halfLength] = ideal * window;
    sum += ideal * window;
  }
  for (let i = 0; i < taps.length; i++) taps[i]! /= sum;
  return taps;
}

/**
 * Filters with symmetric taps and keeps every `keep`-th sample, the first one included. Near the ends the
 * signal is extended by point reflection.
 *
 * @param samples - shape (n), finite.
 * @param taps - shape (2h + 1), symmetric.
 * @param keep - decimation factor, >= 1.
 * @returns shape (ceil(n / keep)), no delay.
 */
export function decimate(samples: Float64Array, taps: Float64Array, keep: number): Float64Array {
  const n = samples.length;
  const half = taps.length >> 1;
  const out = new Float64Array(Math.ceil(n / keep));
  const last = n - 1;
  for (let i = 0, o = 0; i < n; i += keep, o++) {
    let sum = 0;
    if (i >= half && i + half < n) {
      for (let k = 0; k < taps.length; k++) sum += taps[k]! * samples[i - half + k]!;
    } else {
      for (let k = -half; k <= half; k++) {
        const at = i + k;
        const value =
          at < 0
            ? 2 * samples[0]! - samples[Math.min(last, -at)]!
            : at > last
              ? 2 * samples[last]! - samples[Math.max(0, 2 * last - at)]!
              : samples[at]!;
        sum += taps[k + half]! * value;
      }
    }
    out[o] = sum;
  }
  return out;
}

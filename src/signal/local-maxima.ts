/**
 * Indices of the local maxima; of a flat top the middle (rounded down). The ends are no maxima.
 *
 * @param samples - shape (n), any unit, every value finite.
 */
export function localMaxima(samples: Float64Array): Int32Array {
  const found: number[] = [];
  const last = samples.length - 1;
  let i = 1;
  while (i < last) {
    if (samples[i - 1]! < samples[i]!) {
      let ahead = i + 1;
      while (ahead < last && samples[ahead] === samples[i]) ahead++;
      if (samples[ahead]! < samples[i]!) {
        found.push((i + ahead - 1) >> 1);
        i = ahead;
      }
    }
    i++;
  }
  return Int32Array.from(found);
}

/**
 * Prominence of each peak: its height above the higher of the two lowest points that separate it from
 * a higher peak (or the end of the signal) on either side.
 *
 * @param samples - shape (n).
 * @param peaks - shape (m), indices of local maxima, ascending.
 * @returns shape (m), the signal's unit.
 */
export function peakProminences(samples: Float64Array, peaks: Int32Array): Float64Array {
  const out = new Float64Array(peaks.length);
  for (let k = 0; k < peaks.length; k++) {
    const top = samples[peaks[k]!]!;
    let leftLow = top;
    for (let i = peaks[k]! - 1; i >= 0 && samples[i]! <= top; i--)
      if (samples[i]! < leftLow) leftLow = samples[i]!;
    let rightLow = top;
    for (let i = peaks[k]! + 1; i < samples.length && samples[i]! <= top; i++)
      if (samples[i]! < rightLow) rightLow = samples[i]!;
    out[k] = top - Math.max(leftLow, rightLow);
  }
  return out;
}

/**
 * Place of the top of the parabola through a maximum and its two neighbours, in samples.
 *
 * @returns `index` plus an offset in [-0.5, 0.5]; `index` itself at the ends or on a flat top.
 */
export function parabolicTop(samples: Float64Array, index: number): number {
  if (index <= 0 || index >= samples.length - 1) return index;
  const before = samples[index - 1]!;
  const at = samples[index]!;
  const after = samples[index + 1]!;
  const bend = before - 2 * at + after;
  if (!(bend < 0)) return index;
  return index + Math.max(-0.5, Math.min(0.5, (0.5 * (before - after)) / bend));
}

import type { Sections } from './butterworth.js';

/** Runs the sections over `x` in place, from one end to the other, in the steady state of the first value. */
function runSections(sections: Sections, x: Float64Array, backwards: boolean): void {
  const n = x.length;
  let level = backwards ? x[n - 1]! : x[0]!;
  for (let s = 0; s < sections.length; s += 5) {
    const b0 = sections[s]!;
    const b1 = sections[s + 1]!;
    const b2 = sections[s + 2]!;
    const a1 = sections[s + 3]!;
    const a2 = sections[s + 4]!;
    const gain = (b0 + b1 + b2) / (1 + a1 + a2);
    let z1 = (gain - b0) * level;
    let z2 = (b2 - a2 * gain) * level;
    if (backwards) {
      for (let i = n - 1; i >= 0; i--) {
        const u = x[i]!;
        const y = b0 * u + z1;
        z1 = b1 * u - a1 * y + z2;
        z2 = b2 * u - a2 * y;
        x[i] = y;
      }
    } else {
      for (let i = 0; i < n; i++) {
        const u = x[i]!;
        const y = b0 * u + z1;
        z1 = b1 * u - a1 * y + z2;
        z2 = b2 * u - a2 * y;
        x[i] = y;
      }
    }
    level *= gain;
  }
}

/**
 * Filters forwards and backwards: no phase shift, the magnitude response squared.
 *
 * The ends are extended by point reflection, as is usual, so that the filter's transient falls outside.
 *
 * @param sections - second-order sections.
 * @param samples - shape (n), any unit, every value finite; not changed. Signals shorter than the
 *   extension are extended by as much as they have (n - 1); an empty one gives an empty result.
 * @returns shape (n), the same unit.
 * @see Gustafsson (1996), IEEE Trans. Signal Processing 44(4), 988-992, on the choice of the ends.
 */
export function zeroPhase(sections: Sections, samples: Float64Array): Float64Array {
  const n = samples.length;
  if (n < 2) return samples.slice();
  let firstOrder = 0;
  for (let s = 0; s < sections.length; s += 5)
    if (sections[s + 2] === 0 && sections[s + 4] === 0) firstOrder++;
  const pad = Math.min(n - 1, 3 * ((2 * sections.length) / 5 + 1 - firstOrder));
  const extended = new Float64Array(n + 2 * pad);
  const first = samples[0]!;
  const last = samples[n - 1]!;
  for (let i = 0; i < pad; i++) {
    extended[i] = 2 * first - samples[pad - i]!;
    extended[n + pad + i] = 2 * last - samples[n - 2 - i]!;
  }
  extended.set(samples, pad);
  runSections(sections, extended, false);
  runSections(sections, extended, true);
  return extended.slice(pad, pad + n);
}

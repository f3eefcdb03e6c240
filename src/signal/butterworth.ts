import { InputError } from '../errors.js';

/** Second-order sections, five numbers each: b0 b1 b2 a1 a2 (a0 is 1). */
export type Sections = Float64Array;

function sectionCount(order: number): number {
  return Math.floor(order / 2) + (order % 2);
}

function checkDesign(order: number, cutoffHz: number, sampleRateHz: number): void {
  if (!(Number.isInteger(order) && order >= 1))
    throw new InputError('bad-order', `butterworth: order must be a whole number from 1, got ${order}`);
  if (!(cutoffHz > 0 && cutoffHz < sampleRateHz / 2))
    throw new InputError(
      'bad-cutoff',
      `butterworth: cut-off must lie between 0 and ${sampleRateHz / 2} Hz (half the sampling rate), got ${cutoffHz}`,
    );
}

/**
 * Butterworth low-pass by the bilinear transform with the cut-off pre-warped.
 *
 * @param order - filter order, a whole number from 1.
 * @param cutoffHz - frequency at -3 dB, hertz, in (0, sampleRateHz / 2).
 * @param sampleRateHz - sampling rate, hertz.
 * @returns second-order sections (a last one of first order for odd orders).
 * @throws InputError `bad-order`, `bad-cutoff`.
 * @see Oppenheim & Schafer, Discrete-Time Signal Processing, section on bilinear design.
 */
export function butterworthLowPass(order: number, cutoffHz: number, sampleRateHz: number): Sections {
  checkDesign(order, cutoffHz, sampleRateHz);
  const w = Math.tan((Math.PI * cutoffHz) / sampleRateHz);
  const sections = new Float64Array(5 * sectionCount(order));
  let at = 0;
  for (let k = 0; k < Math.floor(order / 2); k++) {
    const q = 2 * Math.sin((Math.PI * (2 * k + 1)) / (2 * order));
    const n = 1 / (1 + q * w + w * w);
    sections.set([w * w * n, 2 * w * w * n, w * w * n, 2 * (w * w - 1) * n, (1 - q * w + w * w) * n], at);
    at += 5;
  }
  if (order % 2) {
    const n = 1 / (1 + w);
    sections.set([w * n, w * n, 0, (w - 1) * n, 0], at);
  }
  return sections;
}

/**
 * Butterworth high-pass by the bilinear transform with the cut-off pre-warped.
 *
 * Parameters, result and errors as {@link butterworthLowPass}.
 */
export function butterworthHighPass(order: number, cutoffHz: number, sampleRateHz: number): Sections {
  checkDesign(order, cutoffHz, sampleRateHz);
  const w = Math.tan((Math.PI * cutoffHz) / sampleRateHz);
  const sections = new Float64Array(5 * sectionCount(order));
  let at = 0;
  for (let k = 0; k < Math.floor(order / 2); k++) {
    const q = 2 * Math.sin((Math.PI * (2 * k + 1)) / (2 * order));
    const n = 1 / (1 + q * w + w * w);
    sections.set([n, -2 * n, n, 2 * (w * w - 1) * n, (1 - q * w + w * w) * n], at);
    at += 5;
  }
  if (order % 2) {
    const n = 1 / (1 + w);
    sections.set([n, -n, 0, (w - 1) * n, 0], at);
  }
  return sections;
}

import type { PlaceContext } from '../../campaign/context.js';
import { quantile } from '../../stats/quantile.js';
import type { ReadingsMag } from '../../tables/schemas.js';
import { binned } from './binned.js';
import type { Finding } from './finding.js';

export interface FieldLimits {
  /** Largest part by which the walk's median field may differ from the model's, percent. */
  fieldPct: number;
  /** A stretch further than this from the walk's median is disturbed, percent. */
  disturbedPct: number;
  /** Shorter ones are passed over: they turn no heading for long, s. */
  disturbedS: number;
}

const BIN_S = 0.5;

/** The magnetic field against what the place lets expect, and where it is disturbed. */
export function checkField(mag: ReadingsMag, place: PlaceContext, limits: FieldLimits): Finding[] {
  const end_s = mag.t_s.at(-1) ?? 0;
  const bins = Math.max(1, Math.ceil(end_s / BIN_S));
  const [x, y, z] = binned(mag.t_s, [mag.x_uT, mag.y_uT, mag.z_uT], BIN_S, bins);
  const size = Float64Array.from(x!, (_, b) => Math.hypot(x![b]!, y![b]!, z![b]!));
  const known = size.filter(Number.isFinite);
  if (known.length < 4) return [];
  const usual = quantile(known, 0.5);
  // A wrong unit is told by itself.
  if (!(usual > 10 && usual < 200)) return [];
  const out: Finding[] = [];
  const whole = { sensor: 'mag', from_s: mag.t_s[0]!, to_s: end_s };
  if (place.field_uT !== null) {
    const off = (100 * (usual - place.field_uT)) / place.field_uT;
    if (Math.abs(off) > limits.fieldPct)
      out.push({
        severity: 'warn',
        kind: 'field-off',
        ...whole,
        value: off,
        message: `magnetometer: the field's median is ${usual.toFixed(1)} uT, the model says ${place.field_uT.toFixed(1)} at this place; magnetic headings may be turned for the whole walk; calibrate hard and soft iron`,
      });
  }
  for (const { from, to, most } of disturbedStretches(size, usual, limits))
    out.push({
      severity: 'note',
      kind: 'magnetic-disturbance',
      sensor: 'mag',
      from_s: from * BIN_S,
      to_s: to * BIN_S,
      value: most,
      message: `magnetometer: from ${(from * BIN_S).toFixed(1)} to ${(to * BIN_S).toFixed(1)} s the field differs by up to ${most.toFixed(0)} % from the walk's median; headings rest on the gyroscope there`,
    });
  return out;
}

function disturbedStretches(
  size: Float64Array,
  usual: number,
  limits: FieldLimits,
): { from: number; to: number; most: number }[] {
  const out: { from: number; to: number; most: number }[] = [];
  const off = (b: number) => (100 * Math.abs(size[b]! - usual)) / usual;
  for (let from = 0; from < size.length; from++) {
    if (!(off(from) > limits.disturbedPct)) continue;
    let to = from;
    let most = 0;
    while (to < size.length && off(to) > limits.disturbedPct) most = Math.max(most, off(to++));
    if ((to - from) * BIN_S >= limits.disturbedS) out.push({ from, to, most });
    from = to;
  }
  return out;
}

import type { PlaceContext } from '../../campaign/context.js';
import { quantile } from '../../stats/quantile.js';
import type { ReadingsAccel, ReadingsMag } from '../../tables/schemas.js';
import { binned } from './binned.js';
import type { Finding } from './finding.js';

const BIN_S = 1;

/** Where the field is flatter than this, its up part does not tell the accelerometer's sign. */
const LEAST_DIP = (25 * Math.PI) / 180;

/**
 * Whether the accelerometer reads specific force (up at rest) or its negative: the magnetic field points down in
 * the northern and up in the southern magnetic hemisphere.
 */
export function checkSign(accel: ReadingsAccel, mag: ReadingsMag, place: PlaceContext): Finding[] {
  if (place.dip_rad === null || Math.abs(place.dip_rad) < LEAST_DIP) return [];
  const end_s = Math.min(accel.t_s.at(-1) ?? 0, mag.t_s.at(-1) ?? 0);
  const bins = Math.floor(end_s / BIN_S);
  if (bins < 5) return [];
  const f = binned(accel.t_s, [accel.x_mps2, accel.y_mps2, accel.z_mps2], BIN_S, bins);
  const m = binned(mag.t_s, [mag.x_uT, mag.y_uT, mag.z_uT], BIN_S, bins);
  const dips = new Float64Array(bins).map((_, b) => {
    const dot = f[0]![b]! * m[0]![b]! + f[1]![b]! * m[1]![b]! + f[2]![b]! * m[2]![b]!;
    const sizes = Math.hypot(f[0]![b]!, f[1]![b]!, f[2]![b]!) * Math.hypot(m[0]![b]!, m[1]![b]!, m[2]![b]!);
    return Math.asin(Math.max(-1, Math.min(1, -dot / sizes)));
  });
  const known = dips.filter(Number.isFinite);
  if (known.length < 5) return [];
  const dip = quantile(known, 0.5);
  // Half-way to the mirror image: a disturbed field is nearer to the right sign than to the wrong one.
  if (!(Math.sign(dip) === -Math.sign(place.dip_rad) && Math.abs(dip) > 0.5 * Math.abs(place.dip_rad)))
    return [];
  const degrees = (rad: number) => ((rad * 180) / Math.PI).toFixed(0);
  return [
    {
      severity: 'fail',
      kind: 'wrong-sign',
      sensor: 'accel',
      from_s: 0,
      to_s: end_s,
      value: dip,
      message: `accelerometer: the magnetic field's dip comes out at ${degrees(dip)} degrees where the place has ${degrees(place.dip_rad)}: up and down are exchanged; headings are mirrored; set sign: gravity-directed in the layout, or mend the magnetometer's axes`,
    },
  ];
}

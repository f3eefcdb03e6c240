import { decimalYear, geomagneticField } from '../geometry/geomagnetic-field.js';
import { normalGravity } from '../geometry/normal-gravity.js';
import type { PlaceContext } from './context.js';
import type { Grid } from './types.js';

/** Standard gravity, exact by definition: 3rd General Conference on Weights and Measures (1901). */
const STANDARD_GRAVITY_MPS2 = 9.80665;

/**
 * Field and gravity where a campaign took place, and magnetic north against its grid.
 *
 * A given declination, like the model's, is magnetic against true north; the grid's rotation is taken
 * off. Without either, grid north is taken to be magnetic north and `declination_source` is `assumed`.
 */
export function placeOf(grid: Grid): PlaceContext {
  const { origin, rotationDeg, date, declinationDeg } = grid;
  const field = origin && date ? geomagneticField({ ...origin, decimalYear: decimalYear(date) }) : null;
  const rotationRad = (rotationDeg * Math.PI) / 180;
  const known = {
    field_uT: field ? field.total_nT / 1000 : null,
    dip_rad: field ? field.inclinationRad : null,
    gravity_mps2: origin ? normalGravity(origin.latDeg, origin.heightM) : STANDARD_GRAVITY_MPS2,
  };
  if (declinationDeg !== null)
    return {
      declination_rad: (declinationDeg * Math.PI) / 180 - rotationRad,
      declination_source: 'given',
      ...known,
    };
  if (field)
    return {
      declination_rad: field.declinationRad - rotationRad,
      declination_source: 'model',
      ...known,
    };
  return { declination_rad: 0, declination_source: 'assumed', ...known };
}

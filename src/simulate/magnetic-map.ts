import { placeOf } from '../campaign/place.js';
import type { Grid } from '../campaign/types.js';
import type { Triple } from './device-motion.js';
import type { DisturbancePlan, PlanYaml } from './plan-schema.js';

/** Field and gravity of a simulated place. */
export interface PlaceModel {
  /** Undisturbed field in the grid: east, north, up, uT. */
  fieldUT: readonly [number, number, number];
  gravityMps2: number;
  disturbances: readonly DisturbancePlan[];
}

/** The geomagnetic model's field turned into the grid where the grid has origin and date, else the plan's. */
export function placeModel(grid: Grid, magnetic: PlanYaml['magnetic']): PlaceModel {
  const place = placeOf(grid);
  const known = place.field_uT !== null && place.dip_rad !== null;
  const horizontal = known ? place.field_uT! * Math.cos(place.dip_rad!) : magnetic.horizontal_uT;
  const down = known ? place.field_uT! * Math.sin(place.dip_rad!) : magnetic.down_uT;
  const { declination_rad } = place;
  return {
    fieldUT: [horizontal * Math.sin(declination_rad), horizontal * Math.cos(declination_rad), -down],
    gravityMps2: place.gravity_mps2,
    disturbances: magnetic.disturbances,
  };
}

/**
 * The field at n positions, ENU, uT.
 *
 * A disturbance is a dipole whose centre is smeared over its radius, so that the field stays finite
 * where a walker passes through: k (3 (m.r) r / (r² + a²)^(5/2) - m / (r² + a²)^(3/2)), with the peak at
 * its centre.
 *
 * @see Jackson (1999), Classical Electrodynamics, eq. 5.56 (the dipole).
 */
export function fieldAt(place: PlaceModel, position: Triple): Triple {
  const n = position[0].length;
  const out: Triple = [new Float64Array(n), new Float64Array(n), new Float64Array(n)];
  for (let axis = 0; axis < 3; axis++) out[axis]!.fill(place.fieldUT[axis]!);
  for (const { east_m, north_m, up_m, radius_m, peak_uT, azimuth_deg, dip_deg } of place.disturbances) {
    const azimuth = (azimuth_deg * Math.PI) / 180;
    const dip = (dip_deg * Math.PI) / 180;
    // The centre's field is against the moment; written so that azimuth and dip are the field's there.
    const mx = -Math.cos(dip) * Math.sin(azimuth);
    const my = -Math.cos(dip) * Math.cos(azimuth);
    const mz = Math.sin(dip);
    const k = peak_uT * radius_m ** 3;
    for (let i = 0; i < n; i++) {
      const x = position[0][i]! - east_m;
      const y = position[1][i]! - north_m;
      const z = position[2][i]! - up_m;
      const square = x * x + y * y + z * z + radius_m * radius_m;
      const fall = k / (square * Math.sqrt(square));
      const along = (3 * (mx * x + my * y + mz * z)) / square;
      out[0][i]! += fall * (along * x - mx);
      out[1][i]! += fall * (along * y - my);
      out[2][i]! += fall * (along * z - mz);
    }
  }
  return out;
}

/**
 * Air pressure at a height in the standard atmosphere, hPa.
 *
 * @see ICAO Doc 7488, International Standard Atmosphere (constants from memory).
 */
export function pressureAt(heightM: number): number {
  return 1013.25 * (1 - 2.25577e-5 * heightM) ** 5.25588;
}

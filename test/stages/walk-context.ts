import type { WalkContext } from '../../src/campaign/context.js';

/** A context with nothing known but standard gravity; parts may be given. */
export function walkContext(parts: Partial<WalkContext> = {}): WalkContext {
  return {
    carry: 'hand',
    walker: { walker: 'w1', group: 'adult', height_m: null, leg_m: null, mass_kg: null, step_constants: {} },
    place: {
      declination_rad: 0,
      declination_source: 'given',
      field_uT: null,
      dip_rad: null,
      gravity_mps2: 9.80665,
    },
    start: null,
    passes: [],
    device: null,
    ...parts,
  };
}

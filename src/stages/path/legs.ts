import type { Headings, Steps, Strides } from '../../tables/schemas.js';

/** The steps that the path is made of: those that end after the start, the one at the start cut there. */
export interface Legs {
  step: Int32Array;
  start_s: Float64Array;
  end_s: Float64Array;
  length_m: Float64Array;
  lengthSd_m: Float64Array;
  heading_rad: Float64Array;
  headingSd_rad: Float64Array;
}

/**
 * @param from_s - when the walker stood at the start; steps before it are left out, a step that spans it gives the
 *   share of its length that came after. Null: all steps count.
 */
export function legsFrom(steps: Steps, strides: Strides, headings: Headings, from_s: number | null): Legs {
  const n = steps.step.length;
  let first = 0;
  if (from_s !== null) while (first < n && steps.end_s[first]! <= from_s) first++;
  const legs: Legs = {
    step: steps.step.slice(first),
    start_s: steps.start_s.slice(first),
    end_s: steps.end_s.slice(first),
    length_m: strides.length_m.slice(first),
    lengthSd_m: strides.sd_m.slice(first),
    heading_rad: headings.heading_rad.slice(first),
    headingSd_rad: headings.sd_rad.slice(first),
  };
  if (from_s !== null && first < n && legs.start_s[0]! < from_s) {
    legs.length_m[0]! *= (legs.end_s[0]! - from_s) / (legs.end_s[0]! - legs.start_s[0]!);
    legs.start_s[0] = from_s;
  }
  return legs;
}

import type { MagneticHeading } from './magnetic-heading.js';
import type { SmootherSettings } from './methods/fixed-interval-smoother.js';
import type { Trajectory } from './trajectory.js';

/** Degrees of freedom of the Student-t weights: heavy tails, variance still finite (common practice, no source). */
const DEGREES_OF_FREEDOM = 4;

/** First guess of the magnetic heading's scatter, rad, before it is estimated, and its floor. */
const FIRST_MAGNETIC_SD = 0.5;
const LEAST_MAGNETIC_SD = 0.01;

/** What is fitted to the magnetic headings of a walk: yaw, bias and a scale, in effect. */
const FITTED = 3;

/** Variance of each magnetic heading by the walk's own scatter, the field's deviation and Student-t weights. */
export class MagneticWeights {
  readonly variance: Float64Array;
  readonly trust: Float64Array;
  private scatter2 = FIRST_MAGNETIC_SD ** 2;
  private readonly repeat: number;

  constructor(intervals: number, settings: SmootherSettings) {
    this.variance = new Float64Array(intervals);
    this.trust = new Float64Array(intervals);
    this.repeat = Math.max(1, (2 * settings.magnetic_memory_s) / settings.node_s);
  }

  /** @param isSettled - whether the angles are residuals of a yaw that a round before has settled. */
  update(heading: MagneticHeading, trajectory: Trajectory, isSettled: boolean): void {
    const { fieldCount } = trajectory;
    const intervals = fieldCount.length;
    const tails = new Float64Array(intervals).fill(1);
    if (isSettled) {
      let sum = 0;
      let used = 0;
      for (let j = 0; j < intervals; j++) {
        if (fieldCount[j] === 0) continue;
        const r2 = heading.angle[j]! ** 2 / (this.scatter2 * heading.deviation[j]!);
        tails[j] = (DEGREES_OF_FREEDOM + 1) / (DEGREES_OF_FREEDOM + r2);
        const weight = tails[j]! / heading.deviation[j]!;
        sum += weight * heading.angle[j]! ** 2;
        used++;
      }
      const stretches = used / this.repeat;
      if (used > 0)
        this.scatter2 = Math.max(
          LEAST_MAGNETIC_SD ** 2,
          ((sum / used) * stretches) / Math.max(1, stretches - FITTED),
        );
    }
    for (let j = 0; j < intervals; j++) {
      if (fieldCount[j] === 0) continue;
      const relative = heading.deviation[j]! / tails[j]!;
      this.variance[j] = this.scatter2 * relative * this.repeat;
      this.trust[j] = Math.min(1, 1 / relative);
    }
  }
}

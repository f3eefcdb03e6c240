import { type Curve2, smoothHill, smoothStep } from './smooth-step.js';

/** Points and weights of Gauss-Legendre quadrature with 8 points on -1..1. Abramowitz & Stegun, table 25.4. */
const NODES = [0.1834346424956498, 0.525532409916329, 0.7966664774136267, 0.9602898564975363];
const WEIGHTS = [0.362683783378362, 0.3137066458778873, 0.2223810344533745, 0.1012285362903763];
const PANELS = 16;

/**
 * A rounded corner that passes through its vertex.
 *
 * The heading turns by a smooth step over the corner's length; before it the walker swings a little to
 * the outside, just so much that the middle of the curve lies on the vertex, and after it the same
 * mirrored. So a marker on the vertex is walked over, whatever the angle, a turn about included.
 */
export class Corner {
  readonly turnRad: number;
  readonly lengthM: number;
  /** From where the corner begins to the vertex, along the leg. */
  readonly reachM: number;
  readonly #swingRad: number;
  /** Integrals of the sine and cosine of the relative heading up to each panel's start. */
  readonly #across = new Float64Array(PANELS + 1);
  readonly #along = new Float64Array(PANELS + 1);
  readonly #scratch: Curve2 = [0, 0, 0];
  readonly #heading: Curve2 = [0, 0, 0];

  /**
   * @param turnRad - -pi..pi, clockwise positive.
   * @param lengthM - of the curve, above 0.
   */
  constructor(turnRad: number, lengthM: number) {
    this.turnRad = turnRad;
    this.lengthM = lengthM;
    this.#swingRad = turnRad === 0 ? 0 : this.#findSwing();
    const sums: [number, number] = [0, 0];
    for (let panel = 0; panel < PANELS; panel++) {
      this.#integrate(panel / PANELS, (panel + 1) / PANELS, this.#swingRad, sums);
      this.#across[panel + 1] = this.#across[panel]! + sums[0];
      this.#along[panel + 1] = this.#along[panel]! + sums[1];
    }
    this.reachM = this.#along[PANELS / 2]! * lengthM;
  }

  /** Heading against the incoming leg, and its first two derivatives by arc length, at u = part of the length. */
  heading(u: number, out: Curve2): void {
    this.#headingWith(u, this.#swingRad, out);
    out[1] /= this.lengthM;
    out[2] /= this.lengthM * this.lengthM;
  }

  /** Metres to the right of and along the incoming leg, from the corner's start. */
  position(u: number, out: [number, number]): void {
    const panel = Math.min(PANELS - 1, Math.floor(u * PANELS));
    this.#integrate(panel / PANELS, u, this.#swingRad, out);
    out[0] = (this.#across[panel]! + out[0]) * this.lengthM;
    out[1] = (this.#along[panel]! + out[1]) * this.lengthM;
  }

  #headingWith(u: number, swingRad: number, out: Curve2): void {
    smoothHill(u < 0.5 ? 2 * u : 2 * u - 1, 4, this.#scratch);
    const sign = u < 0.5 ? -1 : 1;
    smoothStep(u, out);
    out[0] = this.turnRad * out[0] + sign * swingRad * this.#scratch[0];
    out[1] = this.turnRad * out[1] + sign * 2 * swingRad * this.#scratch[1];
    out[2] = this.turnRad * out[2] + sign * 4 * swingRad * this.#scratch[2];
  }

  #integrate(from: number, to: number, swingRad: number, out: [number, number]): void {
    const half = (to - from) / 2;
    const middle = (to + from) / 2;
    let across = 0;
    let along = 0;
    for (let i = 0; i < NODES.length; i++)
      for (let side = -1; side <= 1; side += 2) {
        this.#headingWith(middle + side * half * NODES[i]!, swingRad, this.#heading);
        across += WEIGHTS[i]! * Math.sin(this.#heading[0]);
        along += WEIGHTS[i]! * Math.cos(this.#heading[0]);
      }
    out[0] = across * half;
    out[1] = along * half;
  }

  /** The swing for which the first half ends on the line of the incoming leg, by bisection. */
  #findSwing(): number {
    const sums: [number, number] = [0, 0];
    const missAt = (swingRad: number) => {
      let miss = 0;
      for (let panel = 0; panel < PANELS / 2; panel++) {
        this.#integrate(panel / PANELS, (panel + 1) / PANELS, swingRad, sums);
        miss += sums[0];
      }
      return miss * Math.sign(this.turnRad);
    };
    let low = 0;
    let high = Math.PI / 2;
    for (let round = 0; round < 60; round++) {
      const middle = (low + high) / 2;
      if (missAt(middle * Math.sign(this.turnRad)) > 0) low = middle;
      else high = middle;
    }
    return ((low + high) / 2) * Math.sign(this.turnRad);
  }
}

/**
 * The spline of degree five through given points, with four continuous derivatives.
 *
 * Its first and second derivative at both ends are given, so that a movement can begin and end at rest
 * without a jump in acceleration. Before the first and after the last knot the value stands still.
 *
 * @see de Boor (1978), A Practical Guide to Splines, Springer (complete spline interpolation, from memory).
 */
export class QuinticSpline {
  readonly #t: Float64Array;
  readonly #y: Float64Array;
  readonly #slope: Float64Array;
  readonly #bend: Float64Array;

  /**
   * @param t - shape (n), n >= 2, increasing, s.
   * @param y - shape (n), any unit u.
   * @param ends - slope in u/s and second derivative in u/s² at the first and last knot; 0 each.
   */
  constructor(
    t: ArrayLike<number>,
    y: ArrayLike<number>,
    ends: { slope: [number, number]; bend?: [number, number] } = { slope: [0, 0] },
  ) {
    const n = t.length;
    this.#t = Float64Array.from(t);
    this.#y = Float64Array.from(y);
    this.#slope = new Float64Array(n);
    this.#bend = new Float64Array(n);
    [this.#slope[0], this.#slope[n - 1]] = ends.slope;
    [this.#bend[0], this.#bend[n - 1]] = ends.bend ?? [0, 0];
    this.#solve();
  }

  get start(): number {
    return this.#t[0]!;
  }

  get end(): number {
    return this.#t[this.#t.length - 1]!;
  }

  /**
   * Continuity of the third and fourth derivative at every inner knot: a system with 2 x 2 blocks in
   * three diagonals for slope and second derivative there, eliminated from the left.
   */
  #solve(): void {
    const [t, y, slope, bend] = [this.#t, this.#y, this.#slope, this.#bend];
    const n = t.length;
    // After elimination, unknowns i = right[i] - upper[i] times unknowns i + 1.
    const upper = new Float64Array(4 * n);
    const right = new Float64Array(2 * n);
    right[0] = slope[0]!;
    right[1] = bend[0]!;
    for (let i = 1; i < n - 1; i++) {
      const a = t[i]! - t[i - 1]!;
      const b = t[i + 1]! - t[i]!;
      const riseA = y[i]! - y[i - 1]!;
      const riseB = y[i + 1]! - y[i]!;
      const l00 = -24 / a ** 2;
      const l01 = -3 / a;
      const l10 = -168 / a ** 3;
      const l11 = -24 / a ** 2;
      const u00 = 24 / b ** 2;
      const u01 = -3 / b;
      const u10 = -168 / b ** 3;
      const u11 = 24 / b ** 2;
      const [p00, p01, p10, p11] = [
        upper[4 * i - 4]!,
        upper[4 * i - 3]!,
        upper[4 * i - 2]!,
        upper[4 * i - 1]!,
      ];
      const m00 = 36 / b ** 2 - 36 / a ** 2 - (l00 * p00 + l01 * p10);
      const m01 = 9 / a + 9 / b - (l00 * p01 + l01 * p11);
      const m10 = -192 / a ** 3 - 192 / b ** 3 - (l10 * p00 + l11 * p10);
      const m11 = 36 / a ** 2 - 36 / b ** 2 - (l10 * p01 + l11 * p11);
      const [q0, q1] = [right[2 * i - 2]!, right[2 * i - 1]!];
      const r0 = 60 * (riseB / b ** 3 - riseA / a ** 3) - (l00 * q0 + l01 * q1);
      const r1 = -360 * (riseB / b ** 4 + riseA / a ** 4) - (l10 * q0 + l11 * q1);
      const det = m00 * m11 - m01 * m10;
      upper[4 * i] = (m11 * u00 - m01 * u10) / det;
      upper[4 * i + 1] = (m11 * u01 - m01 * u11) / det;
      upper[4 * i + 2] = (m00 * u10 - m10 * u00) / det;
      upper[4 * i + 3] = (m00 * u11 - m10 * u01) / det;
      right[2 * i] = (m11 * r0 - m01 * r1) / det;
      right[2 * i + 1] = (m00 * r1 - m10 * r0) / det;
    }
    for (let i = n - 2; i > 0; i--) {
      slope[i] = right[2 * i]! - upper[4 * i]! * slope[i + 1]! - upper[4 * i + 1]! * bend[i + 1]!;
      bend[i] = right[2 * i + 1]! - upper[4 * i + 2]! * slope[i + 1]! - upper[4 * i + 3]! * bend[i + 1]!;
    }
  }

  /** The last interval that begins at or before t, looked for from `from` on. */
  interval(t: number, from = 0): number {
    const last = this.#t.length - 2;
    let low = from > last || this.#t[from]! > t ? 0 : from;
    if (low < last && this.#t[low + 1]! > t) return low;
    let high = last + 1;
    while (high - low > 1) {
      const middle = (low + high) >> 1;
      if (this.#t[middle]! <= t) low = middle;
      else high = middle;
    }
    return low;
  }

  /** Writes value and two derivatives at t into `out`; `interval` as {@link interval} gives. */
  evaluate(t: number, interval: number, out: [number, number, number]): void {
    if (t <= this.start || t >= this.end) {
      out[0] = t <= this.start ? this.#y[0]! : this.#y[this.#y.length - 1]!;
      out[1] = 0;
      out[2] = 0;
      return;
    }
    const i = interval;
    const h = this.#t[i + 1]! - this.#t[i]!;
    const x = t - this.#t[i]!;
    const rise = this.#y[i + 1]! - this.#y[i]!;
    const [m0, m1] = [this.#slope[i]! * h, this.#slope[i + 1]! * h];
    const [k0, k1] = [this.#bend[i]! * h * h, this.#bend[i + 1]! * h * h];
    const c2 = this.#bend[i]! / 2;
    const c3 = (20 * rise - 12 * m0 - 8 * m1 - 3 * k0 + k1) / (2 * h * h * h);
    const c4 = (-30 * rise + 16 * m0 + 14 * m1 + 3 * k0 - 2 * k1) / (2 * h ** 4);
    const c5 = (12 * rise - 6 * m0 - 6 * m1 - k0 + k1) / (2 * h ** 5);
    out[0] = this.#y[i]! + x * (this.#slope[i]! + x * (c2 + x * (c3 + x * (c4 + x * c5))));
    out[1] = this.#slope[i]! + x * (2 * c2 + x * (3 * c3 + x * (4 * c4 + x * 5 * c5)));
    out[2] = 2 * c2 + x * (6 * c3 + x * (12 * c4 + x * 20 * c5));
  }

  /** Value at one instant. */
  at(t: number): number {
    const out: [number, number, number] = [0, 0, 0];
    this.evaluate(t, this.interval(t), out);
    return out[0];
  }
}

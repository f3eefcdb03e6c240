/**
 * A linear chain of small states with scalar measurements, and its smoother.
 *
 * x[j+1] = F[j] x[j] + c[j] + w,  w ~ N(0, diag(q[j]));   z = h x + e at any node.
 */
export interface Chain {
  /** Number of nodes, >= 1. */
  nodes: number;
  /** Length of the state. */
  size: number;
  /** Entries of F beside the identity: which (row * size + column), the same for all nodes. */
  pattern: Int32Array;
  /** Their values, shape (nodes - 1, pattern.length). */
  transition: Float64Array;
  /** c, shape (nodes - 1, size). */
  drive: Float64Array;
  /** Variances q, shape (nodes - 1, size). */
  process: Float64Array;
  /** Mean and variances of the state at node 0, shape (size). */
  priorMean: Float64Array;
  priorVariance: Float64Array;
  /** In the order of their nodes. */
  measurements: Measurements;
  /** Two states whose covariance is wanted as well. */
  pair?: readonly [number, number];
}

/** Scalar measurements, each with at most three coefficients. */
export class Measurements {
  count = 0;
  readonly node: Int32Array;
  /** Shape (count, 3): which states; coefficient 0 where fewer are needed. */
  readonly index: Int32Array;
  readonly coefficient: Float64Array;
  readonly value: Float64Array;
  readonly variance: Float64Array;

  constructor(capacity: number) {
    this.node = new Int32Array(capacity);
    this.index = new Int32Array(3 * capacity);
    this.coefficient = new Float64Array(3 * capacity);
    this.value = new Float64Array(capacity);
    this.variance = new Float64Array(capacity);
  }

  /** Adds z = x[state] + e. */
  addDirect(node: number, state: number, value: number, variance: number): void {
    this.add(node, state, 1, state, 0, state, 0, value, variance);
  }

  /** Adds z = h0 x[i0] + h1 x[i1] + h2 x[i2] + e. */
  add(
    node: number,
    i0: number,
    h0: number,
    i1: number,
    h1: number,
    i2: number,
    h2: number,
    value: number,
    variance: number,
  ): void {
    const k = this.count++;
    this.node[k] = node;
    this.index[3 * k] = i0;
    this.index[3 * k + 1] = i1;
    this.index[3 * k + 2] = i2;
    this.coefficient[3 * k] = h0;
    this.coefficient[3 * k + 1] = h1;
    this.coefficient[3 * k + 2] = h2;
    this.value[k] = value;
    this.variance[k] = variance;
  }
}

export interface SmoothedChain {
  /** Smoothed means, shape (nodes, size). */
  mean: Float64Array;
  /** Smoothed variances, shape (nodes, size). */
  variance: Float64Array;
  /** Smoothed covariance of the chain's `pair`, shape (nodes); empty where no pair was asked for. */
  covariance: Float64Array;
}

/**
 * Means and variances of all states given all measurements.
 *
 * Kalman filter forwards, modified Bryson-Frazier recursion backwards: unlike the more common
 * Rauch-Tung-Striebel form it inverts no covariance, so a state without process noise does no harm.
 *
 * @see Bierman (1973), "Fixed interval smoothing with discrete measurements", Int. J. Control 18(1), 65-75.
 */
export function smoothChain(chain: Chain): SmoothedChain {
  const { nodes, size: n, measurements: z } = chain;
  const nn = n * n;
  const mean = new Float64Array(nodes * n);
  const filtered = new Float64Array(nodes * nn);
  // Per measurement, for the way back: its gain times innovation variance (P hᵀ), that variance, the innovation.
  const gains = new Float64Array(z.count * n);
  const spread = new Float64Array(z.count);
  const innovations = new Float64Array(z.count);
  filterForwards(chain, mean, filtered, gains, spread, innovations);
  const variance = new Float64Array(nodes * n);
  const covariance = new Float64Array(chain.pair ? nodes : 0);
  smoothBackwards(chain, { mean, variance, covariance }, filtered, gains, spread, innovations);
  return { mean, variance, covariance };
}

function filterForwards(
  chain: Chain,
  mean: Float64Array,
  filtered: Float64Array,
  gains: Float64Array,
  spread: Float64Array,
  innovations: Float64Array,
): void {
  const { nodes, size: n, pattern, transition, drive, process, measurements: z } = chain;
  const nn = n * n;
  const x = chain.priorMean.slice();
  const p = new Float64Array(nn);
  for (let i = 0; i < n; i++) p[i * n + i] = chain.priorVariance[i]!;
  const xNext = new Float64Array(n);
  const spare = new Float64Array(nn);
  let m = 0;
  for (let j = 0; j < nodes; j++) {
    if (j > 0) {
      const at = (j - 1) * pattern.length;
      for (let i = 0; i < n; i++) xNext[i] = x[i]! + drive[(j - 1) * n + i]!;
      for (let e = 0; e < pattern.length; e++) {
        const row = Math.floor(pattern[e]! / n);
        xNext[row]! += transition[at + e]! * x[pattern[e]! - row * n]!;
      }
      x.set(xNext);
      sandwich(p, spare, pattern, transition, at, n, false);
      for (let i = 0; i < n; i++) p[i * n + i]! += process[(j - 1) * n + i]!;
    }
    for (; m < z.count && z.node[m] === j; m++) {
      const i0 = z.index[3 * m]!;
      const i1 = z.index[3 * m + 1]!;
      const i2 = z.index[3 * m + 2]!;
      const h0 = z.coefficient[3 * m]!;
      const h1 = z.coefficient[3 * m + 1]!;
      const h2 = z.coefficient[3 * m + 2]!;
      const g = m * n;
      for (let i = 0; i < n; i++)
        gains[g + i] = p[i0 * n + i]! * h0 + p[i1 * n + i]! * h1 + p[i2 * n + i]! * h2;
      const s = h0 * gains[g + i0]! + h1 * gains[g + i1]! + h2 * gains[g + i2]! + z.variance[m]!;
      const innovation = z.value[m]! - h0 * x[i0]! - h1 * x[i1]! - h2 * x[i2]!;
      spread[m] = s;
      innovations[m] = innovation;
      for (let i = 0; i < n; i++) {
        x[i]! += (gains[g + i]! * innovation) / s;
        const gi = gains[g + i]! / s;
        for (let k = 0; k <= i; k++) {
          const v = p[i * n + k]! - gi * gains[g + k]!;
          p[i * n + k] = v;
          p[k * n + i] = v;
        }
      }
    }
    mean.set(x, j * n);
    filtered.set(p, j * nn);
  }
}

function smoothBackwards(
  chain: Chain,
  out: SmoothedChain,
  filtered: Float64Array,
  gains: Float64Array,
  spread: Float64Array,
  innovations: Float64Array,
): void {
  const { nodes, size: n, pattern, transition, measurements: z } = chain;
  const nn = n * n;
  const lambda = new Float64Array(n);
  const big = new Float64Array(nn);
  const spare = new Float64Array(nn);
  const column = new Float64Array(n);
  let m = z.count - 1;
  for (let j = nodes - 1; j >= 0; j--) {
    // Here lambda and big hold what the nodes after j say of node j's filtered state.
    const p = filtered.subarray(j * nn, (j + 1) * nn);
    for (let i = 0; i < n; i++) {
      let shift = 0;
      let quadratic = 0;
      for (let k = 0; k < n; k++) {
        const pik = p[i * n + k]!;
        shift += pik * lambda[k]!;
        let inner = 0;
        for (let l = 0; l < n; l++) inner += big[k * n + l]! * p[i * n + l]!;
        quadratic += pik * inner;
      }
      out.mean[j * n + i]! -= shift;
      out.variance[j * n + i] = Math.max(0, p[i * n + i]! - quadratic);
    }
    if (chain.pair) out.covariance[j] = smoothedEntry(p, big, n, chain.pair[0], chain.pair[1]);
    for (; m >= 0 && z.node[m] === j; m--)
      absorb(z, m, n, lambda, big, column, gains, spread[m]!, innovations[m]!);
    if (j > 0) {
      const at = (j - 1) * pattern.length;
      for (let i = 0; i < n; i++) column[i] = lambda[i]!;
      for (let e = 0; e < pattern.length; e++) {
        const row = Math.floor(pattern[e]! / n);
        column[pattern[e]! - row * n]! += transition[at + e]! * lambda[row]!;
      }
      lambda.set(column);
      sandwich(big, spare, pattern, transition, at, n, true);
    }
  }
}

/** Entry (a, b) of P - P big P. */
function smoothedEntry(p: Float64Array, big: Float64Array, n: number, a: number, b: number): number {
  let sum = 0;
  for (let k = 0; k < n; k++) {
    let inner = 0;
    for (let l = 0; l < n; l++) inner += big[k * n + l]! * p[b * n + l]!;
    sum += p[a * n + k]! * inner;
  }
  return p[a * n + b]! - sum;
}

/** Takes one measurement into the backward recursion: lambda and big before its update. */
function absorb(
  z: Measurements,
  m: number,
  n: number,
  lambda: Float64Array,
  big: Float64Array,
  column: Float64Array,
  gains: Float64Array,
  s: number,
  innovation: number,
): void {
  const g = m * n;
  let along = 0;
  for (let i = 0; i < n; i++) along += gains[g + i]! * lambda[i]!;
  let quadratic = 0;
  for (let i = 0; i < n; i++) {
    let sum = 0;
    for (let k = 0; k < n; k++) sum += big[i * n + k]! * gains[g + k]!;
    column[i] = sum / s;
    quadratic += gains[g + i]! * sum;
  }
  const scale = 1 / s + quadratic / (s * s);
  const pull = (innovation + along) / s;
  for (let c = 0; c < 3; c++) {
    const h = z.coefficient[3 * m + c]!;
    if (h === 0) continue;
    const i = z.index[3 * m + c]!;
    lambda[i]! -= h * pull;
    for (let k = 0; k < n; k++) {
      big[i * n + k]! -= h * column[k]!;
      big[k * n + i]! -= h * column[k]!;
    }
    for (let d = 0; d < 3; d++) {
      const hd = z.coefficient[3 * m + d]!;
      if (hd !== 0) big[i * n + z.index[3 * m + d]!]! += h * hd * scale;
    }
  }
}

/** p := F p Fᵀ, or Fᵀ p F when `transposed`, for F = identity plus the pattern's entries. */
function sandwich(
  p: Float64Array,
  spare: Float64Array,
  pattern: Int32Array,
  transition: Float64Array,
  at: number,
  n: number,
  transposed: boolean,
): void {
  spare.set(p);
  for (let e = 0; e < pattern.length; e++) {
    const f = transition[at + e]!;
    const row = Math.floor(pattern[e]! / n);
    const col = pattern[e]! - row * n;
    const to = (transposed ? col : row) * n;
    const from = (transposed ? row : col) * n;
    for (let k = 0; k < n; k++) spare[to + k]! += f * p[from + k]!;
  }
  p.set(spare);
  for (let e = 0; e < pattern.length; e++) {
    const f = transition[at + e]!;
    const row = Math.floor(pattern[e]! / n);
    const col = pattern[e]! - row * n;
    const to = transposed ? col : row;
    const from = transposed ? row : col;
    for (let k = 0; k < n; k++) p[k * n + to]! += f * spare[k * n + from]!;
  }
}

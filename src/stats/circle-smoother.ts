import { wrapToPi } from './circular.js';

/** How an angle moves from one node to the next. */
export interface CircleMove {
  /** What is added to it, rad. */
  shiftRad: number;
  /** Scatter of what is added, rad. */
  sdRad: number;
  /** Probability that the angle is drawn anew from `fresh` instead, 0 to 1. */
  freshShare: number;
  /** Probability of each bin for an angle drawn anew, sum 1. */
  fresh: Float64Array;
}

export interface CircleChain {
  /** Cells that the turn is parted into; cell b is around b 2 pi / bins. */
  bins: number;
  /** Natural logarithm of how likely the evidence at each node is for each cell, shape (nodes, bins); any constant. */
  logLikelihood: Float64Array;
  /** Probability of each cell at the first node, sum 1. */
  prior: Float64Array;
  /** Shape (nodes - 1). */
  moves: readonly CircleMove[];
}

export interface SmoothedCircle {
  /** Mean direction of the likelier half turn at each node, rad, -pi to pi. */
  mean: Float64Array;
  /**
   * Standard deviation as a normal belief of this reach would have it, rad: half the width around the mean that holds
   * 68.27 % of the belief, or a quarter of that which holds 95.45 %, whichever is more. So a thousandth of belief in the
   * opposite direction does not swell it, and a tenth does.
   */
  sd: Float64Array;
}

/**
 * An angle that moves in steps, estimated from evidence before and after: forward-backward recursions over the
 * cells of a turn. It holds any shape of belief: an axis whose sense is open is two peaks.
 *
 * The mean is taken over the half turn around the best cell, since the mean of two opposite peaks is neither.
 *
 * @see Rabiner (1989), Proceedings of the IEEE 77(2), 257-286; cells of a turn: Bucy & Senne (1971), Automatica 7,
 *   287-298 (point masses).
 */
export function smoothOnCircle(chain: CircleChain): SmoothedCircle {
  const { bins, prior, moves } = chain;
  const nodes = chain.logLikelihood.length / bins;
  const likelihood = exponentials(chain.logLikelihood, nodes, bins);
  const forward = new Float64Array(nodes * bins);
  const kernels = new Map<string, Float64Array>();
  const kernelOf = (move: CircleMove) => {
    const key = `${move.shiftRad} ${move.sdRad}`;
    let kernel = kernels.get(key);
    if (!kernel) kernels.set(key, (kernel = wrappedNormal(bins, move.shiftRad, move.sdRad)));
    return kernel;
  };
  const now = Float64Array.from(prior);
  for (let i = 0; i < nodes; i++) {
    if (i > 0) {
      const { freshShare, fresh } = moves[i - 1]!;
      const moved = convolve(forward.subarray((i - 1) * bins, i * bins), kernelOf(moves[i - 1]!), 1);
      for (let b = 0; b < bins; b++) now[b] = (1 - freshShare) * moved[b]! + freshShare * fresh[b]!;
    }
    for (let b = 0; b < bins; b++) forward[i * bins + b] = now[b]! * likelihood[i * bins + b]!;
    normalize(forward.subarray(i * bins, (i + 1) * bins));
  }
  const mean = new Float64Array(nodes);
  const sd = new Float64Array(nodes);
  const backward = new Float64Array(bins).fill(1);
  const belief = new Float64Array(bins);
  for (let i = nodes - 1; i >= 0; i--) {
    for (let b = 0; b < bins; b++) belief[b] = forward[i * bins + b]! * backward[b]!;
    normalize(belief);
    [mean[i], sd[i]] = centreOf(belief);
    if (i === 0) break;
    const { freshShare, fresh } = moves[i - 1]!;
    for (let b = 0; b < bins; b++) backward[b]! *= likelihood[i * bins + b]!;
    normalize(backward);
    const moved = convolve(backward, kernelOf(moves[i - 1]!), -1);
    let anew = 0;
    for (let b = 0; b < bins; b++) anew += fresh[b]! * backward[b]!;
    for (let b = 0; b < bins; b++) backward[b] = (1 - freshShare) * moved[b]! + freshShare * anew;
  }
  return { mean, sd };
}

/** Likelihoods scaled so that the best cell of each node has 1. */
function exponentials(logarithms: Float64Array, nodes: number, bins: number): Float64Array {
  const out = new Float64Array(logarithms.length);
  for (let i = 0; i < nodes; i++) {
    let top = Number.NEGATIVE_INFINITY;
    for (let b = 0; b < bins; b++) top = Math.max(top, logarithms[i * bins + b]!);
    for (let b = 0; b < bins; b++) out[i * bins + b] = Math.exp(logarithms[i * bins + b]! - top);
  }
  return out;
}

/**
 * Probabilities of a normal angle in cells. Narrower than a cell, they are those of the three nearest cells that have
 * its mean exactly, and its variance where the mean is a whole number of cells: many small moves add up to the right
 * spread.
 */
function wrappedNormal(bins: number, meanRad: number, sdRad: number): Float64Array {
  const cell = (2 * Math.PI) / bins;
  const out = new Float64Array(bins);
  if (sdRad < cell) {
    const near = Math.round(meanRad / cell);
    const rest = meanRad / cell - near;
    // Between two cells a mean cannot be had with less spread than that of the two.
    const second = Math.max((sdRad / cell) ** 2 + rest * rest, Math.abs(rest));
    const at = (b: number) => (((near + b) % bins) + bins) % bins;
    out[at(0)] = 1 - second;
    out[at(1)]! += (second + rest) / 2;
    out[at(-1)]! += (second - rest) / 2;
  } else for (let b = 0; b < bins; b++) out[b] = Math.exp(-0.5 * (wrapToPi(b * cell - meanRad) / sdRad) ** 2);
  normalize(out);
  return out;
}

/** Circular convolution; sense -1 is the adjoint. */
function convolve(values: Float64Array, kernel: Float64Array, sense: 1 | -1): Float64Array {
  const bins = values.length;
  const out = new Float64Array(bins);
  for (let k = 0; k < bins; k++) {
    const weight = kernel[k]!;
    if (weight < 1e-12) continue;
    let to = sense === 1 ? k : bins - k;
    if (to >= bins) to -= bins;
    for (let b = 0; b < bins; b++) {
      out[to]! += weight * values[b]!;
      if (++to === bins) to = 0;
    }
  }
  return out;
}

function normalize(values: Float64Array): void {
  let sum = 0;
  for (const value of values) sum += value;
  const scale = sum > 0 ? 1 / sum : 0;
  for (let b = 0; b < values.length; b++) values[b] = sum > 0 ? values[b]! * scale : 1 / values.length;
}

function centreOf(belief: Float64Array): [mean: number, sd: number] {
  const bins = belief.length;
  const cell = (2 * Math.PI) / bins;
  // The half turn with the most in it, found through its sum.
  const half = Math.floor(bins / 4);
  let sum = 0;
  for (let b = -half; b <= half; b++) sum += belief[(b + bins) % bins]!;
  let best = 0;
  let most = sum;
  for (let b = 1; b < bins; b++) {
    sum += belief[(b + half) % bins]! - belief[(b - 1 - half + bins) % bins]!;
    if (sum > most + 1e-12) [most, best] = [sum, b];
  }
  let offset = 0;
  for (let round = 0; round < 2; round++) {
    let moment = 0;
    let mass = 0;
    const around = best + Math.round(offset / cell);
    for (let b = -half; b <= half; b++) {
      const p = belief[(((around + b) % bins) + bins) % bins]!;
      mass += p;
      moment += p * ((around - best + b) * cell);
    }
    offset = mass > 0 ? moment / mass : 0;
  }
  const mean = best * cell + offset;
  return [wrapToPi(mean), Math.max(reach(belief, mean, ONE_SD), reach(belief, mean, TWO_SD) / 2)];
}

/** Parts of a normal distribution within one and two standard deviations. */
const ONE_SD = 0.682689492137086;
const TWO_SD = 0.954499736103642;

/** Distance to both sides of a direction that holds a part of the belief, which is even within each cell. */
function reach(belief: Float64Array, direction: number, part: number): number {
  const bins = belief.length;
  const cell = (2 * Math.PI) / bins;
  /** Belief below an angle counted from the lower edge of cell 0, of any size. */
  const below = (angle: number): number => {
    const place = angle / cell + 0.5;
    const turns = Math.floor(place / bins);
    const rest = place - turns * bins;
    const whole = Math.min(bins - 1, Math.floor(rest));
    return turns + cumulative[whole]! + (rest - whole) * belief[whole]!;
  };
  const cumulative = new Float64Array(bins + 1);
  for (let b = 0; b < bins; b++) cumulative[b + 1] = cumulative[b]! + belief[b]!;
  let low = 0;
  let high = Math.PI;
  for (let round = 0; round < 40; round++) {
    const middle = (low + high) / 2;
    if (below(direction + middle) - below(direction - middle) < part) low = middle;
    else high = middle;
  }
  return high;
}

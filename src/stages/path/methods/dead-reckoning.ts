import { z } from 'zod';
import type { PassContext, StartContext } from '../../../campaign/context.js';
import { wrapToTurn } from '../../../stats/circular.js';
import { Measurements, type SmoothedChain, smoothChain } from '../../../stats/fixed-interval-smoother.js';
import { median } from '../../../stats/quantile.js';
import type { Path } from '../../../tables/schemas.js';
import { defineMethod } from '../../stage.js';
import type { PathInputs } from '../index.js';
import { type Legs, legsFrom } from '../legs.js';

const settingsSchema = z.strictObject({
  /** `start`: only the start is known; `all`: later passes with the role anchor correct the path as well. */
  anchors: z.enum(['start', 'all']).default('start'),
  /** Share of the step length that scatters from step to step; the rest of its sd is the walker's constant error. */
  length_scatter: z.number().positive().default(0.06),
  /** Scatter of the heading from step to step; the rest of its sd is the walk's constant error. */
  heading_scatter_deg: z.number().positive().default(4),
  /** Random walk of the heading error, degrees per square root of a step: a few degrees in some hundred steps. */
  heading_walk_deg: z.number().min(0).default(0.3),
});

/** State of the error chain: east, north, heading error, relative length error. */
const SIZE = 4;
const PATTERN = Int32Array.from([0 * SIZE + 2, 0 * SIZE + 3, 1 * SIZE + 2, 1 * SIZE + 3]);

/** Walking speed that turns an uncertain pass time into an uncertain place, m/s (common practice, no source). */
const SPEED_MPS = 1.3;

/** Rounds of linearisation with later anchors; one is exact without them. */
const ROUNDS = 4;

/**
 * Dead reckoning: each step's displacement added to the start, with the covariance that its errors make.
 *
 * Errors: the start; a heading error and a relative length error common to the whole walk; a slow random walk of the
 * heading; independent scatter of each step. With `anchors: all` a fixed-interval smoother spreads the closing errors
 * at later anchors over the whole walk by these covariances, and heading and length errors are estimated with them.
 */
export const deadReckoning = defineMethod<PathInputs, Path, typeof settingsSchema>({
  name: 'dead-reckoning',
  source: 'dead reckoning: common practice, no source; anchors: Bierman (1973), Int. J. Control 18(1), 65-75',
  version: 1,
  settings: settingsSchema,
  uses: ({ anchors }) => (anchors === 'all' ? ['start', 'passes'] : ['start']),
  run({ steps, strides, headings }, settings, context) {
    const start = context.start;
    const legs = legsFrom(steps, strides, headings, start?.t_s ?? null);
    const anchors = settings.anchors === 'all' ? laterAnchors(context.passes, start) : [];
    const n = legs.step.length;
    const headingError = new Float64Array(n + 1);
    let lengthError = 0;
    let chain = estimate(legs, start, anchors, headingError, lengthError, settings);
    for (let round = 1; round < ROUNDS && anchors.length > 0; round++) {
      for (let k = 0; k <= n; k++) headingError[k] = chain.mean[k * SIZE + 2]!;
      lengthError = chain.mean[3]!;
      chain = estimate(legs, start, anchors, headingError, lengthError, settings);
    }
    return columns(legs, start, chain);
  },
});

function laterAnchors(passes: readonly PassContext[], start: StartContext | null): PassContext[] {
  const from = start?.t_s ?? Number.NEGATIVE_INFINITY;
  return passes.filter((pass) => pass.role === 'anchor' && pass.t_s > from);
}

function estimate(
  legs: Legs,
  start: StartContext | null,
  anchors: readonly PassContext[],
  headingError: Float64Array,
  lengthError: number,
  settings: z.output<typeof settingsSchema>,
): SmoothedChain {
  const n = legs.step.length;
  const transition = new Float64Array(4 * n);
  const drive = new Float64Array(SIZE * n);
  const process = new Float64Array(SIZE * n);
  const scatter = (settings.heading_scatter_deg * Math.PI) / 180;
  const walk = (settings.heading_walk_deg * Math.PI) / 180;
  for (let k = 0; k < n; k++) {
    const part = partOf(legs, k, 1, headingError[k]!, lengthError);
    transition.set([part.eastByHeading, part.eastByLength, part.northByHeading, part.northByLength], 4 * k);
    drive[SIZE * k] = part.east;
    drive[SIZE * k + 1] = part.north;
    // Length scatters along the step, heading across it, by nearly the same amount: taken as equal in all directions.
    const variance = (legs.length_m[k]! ** 2 * (settings.length_scatter ** 2 + scatter ** 2)) / 2;
    process[SIZE * k] = variance;
    process[SIZE * k + 1] = variance;
    process[SIZE * k + 2] = walk ** 2;
  }
  const place = start ? start.sigma_m ** 2 + (SPEED_MPS * start.sigma_s) ** 2 : 0;
  return smoothChain({
    nodes: n + 1,
    size: SIZE,
    pattern: PATTERN,
    transition,
    drive,
    process,
    priorMean: Float64Array.from([start?.east_m ?? 0, start?.north_m ?? 0, 0, 0]),
    priorVariance: Float64Array.from([place, place, ...commonVariances(legs, settings)]),
    measurements: anchorMeasurements(legs, anchors, headingError, lengthError),
    pair: [0, 1],
  });
}

/** Variances of the errors common to the walk: what the sds hold beyond a step's own scatter. */
function commonVariances(
  legs: Legs,
  settings: z.output<typeof settingsSchema>,
): [heading: number, length: number] {
  if (legs.step.length === 0) return [0, 0];
  const relative = legs.length_m.map((length, k) => (length > 0 ? legs.lengthSd_m[k]! / length : 0));
  const scatter = (settings.heading_scatter_deg * Math.PI) / 180;
  return [
    Math.max(0, median(legs.headingSd_rad) ** 2 - scatter ** 2),
    Math.max(0, median(relative) ** 2 - settings.length_scatter ** 2),
  ];
}

interface Part {
  east: number;
  north: number;
  eastByHeading: number;
  northByHeading: number;
  eastByLength: number;
  northByLength: number;
}

/** Displacement of a share of leg k, linear in the errors around their estimates: constant part and derivatives. */
function partOf(legs: Legs, k: number, share: number, headingError: number, lengthError: number): Part {
  const heading = legs.heading_rad[k]! + headingError;
  const length = share * legs.length_m[k]!;
  const scaled = length * (1 + lengthError);
  const s = Math.sin(heading);
  const c = Math.cos(heading);
  return {
    east: scaled * s - scaled * c * headingError - length * s * lengthError,
    north: scaled * c + scaled * s * headingError - length * c * lengthError,
    eastByHeading: scaled * c,
    northByHeading: -scaled * s,
    eastByLength: length * s,
    northByLength: length * c,
  };
}

function anchorMeasurements(
  legs: Legs,
  anchors: readonly PassContext[],
  headingError: Float64Array,
  lengthError: number,
): Measurements {
  const n = legs.step.length;
  const out = new Measurements(2 * anchors.length);
  const placed = anchors.map((pass) => {
    // The node before the pass: all legs that end by then are behind it, of the next a share.
    let node = 0;
    while (node < n && legs.end_s[node]! <= pass.t_s) node++;
    const inside =
      node < n ? (pass.t_s - legs.start_s[node]!) / (legs.end_s[node]! - legs.start_s[node]!) : 0;
    return { pass, node, share: Math.max(0, Math.min(1, inside)) };
  });
  placed.sort((a, b) => a.node - b.node);
  for (const { pass, node, share } of placed) {
    const variance = pass.sigma_m ** 2 + (SPEED_MPS * pass.sigma_s) ** 2;
    const part =
      node < n
        ? partOf(legs, node, share, headingError[node]!, lengthError)
        : { east: 0, north: 0, eastByHeading: 0, northByHeading: 0, eastByLength: 0, northByLength: 0 };
    out.add(node, 0, 1, 2, part.eastByHeading, 3, part.eastByLength, pass.east_m - part.east, variance);
    out.add(node, 1, 1, 2, part.northByHeading, 3, part.northByLength, pass.north_m - part.north, variance);
  }
  return out;
}

function columns(legs: Legs, start: StartContext | null, chain: SmoothedChain): Path {
  const n = legs.step.length;
  const path = {
    step: new Int32Array(n + 1),
    t_s: new Float64Array(n + 1),
    east_m: new Float64Array(n + 1),
    north_m: new Float64Array(n + 1),
    heading_rad: new Float64Array(n + 1),
    length_m: new Float64Array(n + 1),
    cov_ee_m2: new Float64Array(n + 1),
    cov_en_m2: new Float64Array(n + 1),
    cov_nn_m2: new Float64Array(n + 1),
  };
  path.step.set(legs.step, 1);
  path.t_s[0] = start?.t_s ?? (n > 0 ? legs.start_s[0]! : 0);
  path.t_s.set(legs.end_s, 1);
  for (let k = 0; k <= n; k++) {
    path.east_m[k] = chain.mean[k * SIZE]!;
    path.north_m[k] = chain.mean[k * SIZE + 1]!;
    path.cov_ee_m2[k] = chain.variance[k * SIZE]!;
    path.cov_nn_m2[k] = chain.variance[k * SIZE + 1]!;
    path.cov_en_m2[k] = chain.covariance[k]!;
    const leg = Math.max(0, k - 1);
    if (n > 0) path.heading_rad[k] = wrapToTurn(legs.heading_rad[leg]! + chain.mean[leg * SIZE + 2]!);
    if (k > 0) path.length_m[k] = legs.length_m[k - 1]! * (1 + chain.mean[3]!);
  }
  return path;
}

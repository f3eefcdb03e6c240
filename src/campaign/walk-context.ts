import { InputError } from '../errors.js';
import { edgeDirections } from '../geometry/edge-directions.js';
import type { FloorContext, PassContext, StartContext, WalkContext, WalkerContext } from './context.js';
import { placeOf } from './place.js';
import { readDeviceCalibration, readStepConstants } from './read-calibration.js';
import { secondsSinceStart } from './seconds-since-start.js';
import type { Campaign, TimeUnit, Walk } from './types.js';

/** A pass this far outside the log still counts, at the log's edge: people tap a moment before they record. */
const EDGE_S = 1;

/** What a walk's log says about its own time. */
export interface LogSpan {
  t0: { value: string; unit: TimeUnit };
  /** Last reading of any sensor, seconds since the first. */
  end_s: number;
}

/**
 * All that stages may know of a walk.
 *
 * The start is the walk's `start` checkpoint at the walk's first pass of it; without one, the first
 * anchor pass; else null. The pass that gives the start is an anchor whatever the file calls it: an error
 * that is zero by construction must not count.
 *
 * @throws InputError where a calibration file, the date or a time cannot be used.
 */
export function walkContext(campaign: Campaign, walk: Walk, span: LogSpan): WalkContext {
  const passes = passesOf(campaign, walk, span);
  const start = startOf(campaign, walk, passes.inside, passes.outside);
  const floor = floorOf(campaign, walk, start);
  const device = walk.device === null ? undefined : campaign.deviceCalibrations.get(walk.device);
  return {
    carry: walk.carry,
    walker: walkerOf(campaign, walk),
    place: placeOf(campaign.grid),
    start,
    passes: passes.inside.map((pass) => (isPassOf(start, pass) ? { ...pass, role: 'anchor' } : pass)),
    ...(passes.outside.length > 0 ? { passes_outside: passes.outside } : {}),
    ...(floor ? { floor } : {}),
    device: device === undefined ? null : readDeviceCalibration(device),
  };
}

/** How far around its start a walk meets walls: the shorter ones of a trial stay within some fifty metres. */
const WALLS_REACH_M = 30;

function floorOf(campaign: Campaign, walk: Walk, start: StartContext | null): FloorContext | null {
  // Floors of one building mostly run alike: a level that the plan does not have takes them together.
  const edges = campaign.wallEdges.get(walk.level ?? '') ?? campaign.wallEdges.get('');
  const near = start && { east: start.east_m, north: start.north_m };
  const wall_share = edges ? edgeDirections(edges, near, WALLS_REACH_M) : null;
  return wall_share && { wall_share };
}

function walkerOf(campaign: Campaign, walk: Walk): WalkerContext {
  const walker = campaign.walkers.find((candidate) => candidate.walker === walk.walker);
  if (!walker)
    throw new InputError(
      'no-walker',
      `walks.csv:${walk.line}: walker "${walk.walker}" is not in walkers.csv; add a row for it`,
    );
  const constants = campaign.walkerCalibrations.get(walk.walker);
  return {
    walker: walker.walker,
    group: walker.group,
    height_m: walker.heightM,
    leg_m: walker.legM,
    mass_kg: walker.massKg,
    step_constants: constants === undefined ? {} : readStepConstants(constants),
  };
}

/** Passes of surveyed checkpoints in time order, parted into those that the log covers and the rest. */
function passesOf(
  campaign: Campaign,
  walk: Walk,
  span: LogSpan,
): { inside: PassContext[]; outside: PassContext[] } {
  const inside: PassContext[] = [];
  const outside: PassContext[] = [];
  for (const pass of campaign.passes ?? []) {
    const point = pass.walk === walk.walk ? campaign.survey?.get(pass.checkpoint) : undefined;
    if (!point) continue;
    const t_s = secondsSinceStart(pass.time, campaign.truthTime, span.t0);
    const at = {
      checkpoint: pass.checkpoint,
      t_s: Math.min(Math.max(t_s, 0), span.end_s),
      sigma_s: pass.sigmaS,
      role: pass.role,
      east_m: point.eastM,
      north_m: point.northM,
      sigma_m: point.sigmaM,
    };
    if (t_s >= -EDGE_S && t_s <= span.end_s + EDGE_S) inside.push(at);
    else outside.push({ ...at, t_s });
  }
  const byTime = (a: PassContext, b: PassContext) => a.t_s - b.t_s;
  return { inside: inside.sort(byTime), outside: outside.sort(byTime) };
}

function startOf(
  campaign: Campaign,
  walk: Walk,
  inside: readonly PassContext[],
  outside: readonly PassContext[],
): StartContext | null {
  const heading_rad = walk.startHeadingDeg === null ? null : turnOf(walk.startHeadingDeg);
  const named = walk.start === null ? undefined : campaign.survey?.get(walk.start);
  if (!named) {
    const anchor = inside.find((pass) => pass.role === 'anchor');
    return anchor ? { ...placeAndTime(anchor), heading_rad } : null;
  }
  const isNamed = (pass: PassContext) => pass.checkpoint === named.checkpoint;
  const pass = inside.find(isNamed);
  // With the first pass lost outside the log, a later one of the same checkpoint is a return to it.
  if (pass && !outside.some((lost) => isNamed(lost) && lost.t_s < pass.t_s))
    return { ...placeAndTime(pass), heading_rad };
  const { checkpoint, eastM, northM, sigmaM } = named;
  return {
    checkpoint,
    east_m: eastM,
    north_m: northM,
    sigma_m: sigmaM,
    t_s: null,
    sigma_s: 0,
    heading_rad,
  };
}

function placeAndTime(pass: PassContext) {
  const { checkpoint, east_m, north_m, sigma_m, t_s, sigma_s } = pass;
  return { checkpoint, east_m, north_m, sigma_m, t_s, sigma_s };
}

/** Degrees of any size to radians in [0, 2 pi). */
function turnOf(degrees: number): number {
  return ((((degrees % 360) + 360) % 360) * Math.PI) / 180;
}

function isPassOf(start: StartContext | null, pass: PassContext): boolean {
  return start !== null && pass.checkpoint === start.checkpoint && pass.t_s === start.t_s;
}

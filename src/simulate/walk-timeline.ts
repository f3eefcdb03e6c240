import type { RandomStream } from '../stats/random.js';
import type { Route } from './routes.js';
import type { Bout, Ride, Timeline } from './timeline.js';
import { walkBout } from './walk-bout.js';
import type { WalkerModel } from './walker-model.js';

/** Speed falls in a bend by curvature: to 2/3 at a radius of 0.8 m. Common practice, no source. */
const BEND_SLOWDOWN_M = 0.4;

/** Stops nearer to each other or to an end than this cannot be walked between, m. */
const SHORTEST_BOUT_M = 0.5;

/** Stands, walks the route with its pauses, and stands. */
export function walkTimeline(walker: WalkerModel, route: Route, random: RandomStream): Timeline {
  const { plan, curve } = route;
  const bouts: Bout[] = [];
  const rides: Ride[] = [];
  let tS = plan.initial_still_s;
  if (route.still) return { durationS: tS + plan.final_still_s, bouts, rides };
  const at = new Float64Array(5);
  const speedFactor = (alongM: number): number => {
    const s = Math.min(alongM, curve.lengthM);
    curve.at(s, at);
    let factor = 1 / (1 + BEND_SLOWDOWN_M * Math.abs(at[3]!));
    for (const pace of plan.paces) if (s >= pace.from_m && s < pace.to_m) factor *= pace.factor;
    return factor;
  };
  const stops = plan.pauses
    .map((pause) => ({
      ...pause,
      alongM: pause.at === undefined ? pause.at_m! : route.places.get(pause.at)!,
    }))
    .sort((a, b) => a.alongM - b.alongM);
  let fromM = 0;
  const walkTo = (toM: number) => {
    if (toM - fromM < SHORTEST_BOUT_M) return;
    const bout = walkBout(walker, tS, fromM, toM, speedFactor, random);
    bouts.push(bout);
    tS = bout.endS;
    fromM = toM;
  };
  for (const { alongM, seconds, up_m } of stops) {
    walkTo(Math.min(alongM, curve.lengthM));
    if (up_m !== 0) rides.push({ startS: tS + 0.1 * seconds, endS: tS + 0.9 * seconds, upM: up_m });
    tS += seconds;
  }
  walkTo(curve.lengthM);
  return { durationS: tS + plan.final_still_s, bouts, rides };
}

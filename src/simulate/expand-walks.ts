import { InputError } from '../errors.js';
import type { CarryName } from './carries.js';
import type { WalksPlan } from './plan-schema.js';
import type { SimulationPlan } from './read-plan.js';

/** One walk of the plan. */
export interface WalkPlan {
  walk: string;
  walker: string;
  route: string;
  device: string;
  carry: CarryName;
  changes: WalksPlan['changes'];
  wander: number;
  reverse: boolean;
}

/**
 * The plan's walks one by one: each entry is crossed, walkers outermost, then routes, carries, devices and repeats.
 *
 * @throws InputError `walk-twice` where two walks would have one name.
 */
export function expandWalks(plan: SimulationPlan): WalkPlan[] {
  const walks: WalkPlan[] = [];
  for (const entry of plan.walks) {
    const walkers = entry.walker === 'all' ? plan.walkers.map(({ walker }) => walker) : [entry.walker].flat();
    const devices = [entry.device ?? Object.keys(plan.devices)].flat();
    const own: Omit<WalkPlan, 'walk'>[] = [];
    for (const walker of walkers)
      for (const route of [entry.route].flat())
        for (const carry of [entry.carry].flat())
          for (const device of devices)
            for (let i = 0; i < entry.repeat; i++)
              own.push({
                walker,
                route,
                device,
                carry,
                changes: entry.changes,
                wander: entry.wander,
                reverse: entry.reverse,
              });
    for (const [i, each] of own.entries()) {
      const number = (n: number) => String(n).padStart(2, '0');
      const walk =
        entry.walk === undefined
          ? `w${number(walks.length + 1)}`
          : own.length === 1
            ? entry.walk
            : `${entry.walk}-${number(i + 1)}`;
      if (walks.some((before) => before.walk === walk))
        throw new InputError(
          'walk-twice',
          `${plan.file}: walks: two walks would be called "${walk}"; name them apart`,
        );
      walks.push({ walk, ...each });
    }
  }
  return walks;
}

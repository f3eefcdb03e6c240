import { InputError } from '../errors.js';

/** One walk of known length. */
export interface MeasuredWalk {
  walker: string;
  group: string;
  /** True distance, m. */
  distance_m: number;
  /** What a step-length model with constant 1 makes of the walk's steps, m. */
  unit_m: number;
}

export interface FittedConstant {
  value: number;
  sd: number;
  /** `walker`: from the walker's own walks, drawn towards the group's; `group`: the walker has none. */
  from: 'walker' | 'group';
  walks: number;
}

export interface StepConstants {
  walkers: Map<string, FittedConstant>;
  groups: Map<string, FittedConstant>;
  /** Spread of the logarithm between walkers of a group, and between walks of a walker. */
  betweenWalkers: number;
  betweenWalks: number;
}

/**
 * Step-length constants of walkers from walks of known length.
 *
 * The logarithm of each walk's constant is the group's, plus the walker's, plus the walk's; the walkers' are drawn
 * towards their group by how little their walks say (best linear unbiased prediction, variances by the method of
 * moments). A walker without such walks has the group's constant with the spread between walkers.
 *
 * @param walks - at least two, each of a positive length.
 * @param everyone - all walkers with their group.
 * @throws InputError `too-few`.
 * @see Robinson (1991), Statistical Science 6(1), 15-32 (prediction of random effects); Searle, Casella &
 *   McCulloch (1992), Variance Components, ch. 3 (moments).
 */
export function fitStepConstants(
  walks: readonly MeasuredWalk[],
  everyone: readonly { walker: string; group: string }[],
): StepConstants {
  const used = walks.filter(({ distance_m, unit_m }) => distance_m > 0 && unit_m > 0);
  if (used.length < 2)
    throw new InputError(
      'too-few',
      `calibrate walkers: needs at least 2 walks with a known length and steps, got ${used.length}; give distance_m in walks.csv`,
    );
  const logOf = ({ distance_m, unit_m }: MeasuredWalk) => Math.log(distance_m / unit_m);
  const byWalker = groupBy(used, ({ walker }) => walker);
  let within = 0;
  let withinFreedom = 0;
  const means = new Map<string, { mean: number; walks: number; group: string }>();
  for (const [walker, own] of byWalker) {
    const logs = own.map(logOf);
    const mean = logs.reduce((sum, x) => sum + x, 0) / logs.length;
    for (const x of logs) within += (x - mean) ** 2;
    withinFreedom += logs.length - 1;
    means.set(walker, { mean, walks: logs.length, group: own[0]!.group });
  }
  // Where no walker walked twice, a walk's own spread is what the literature gives for a walk of some minutes: 3 %.
  const walkVariance = withinFreedom > 0 ? within / withinFreedom : 0.03 ** 2;
  const byGroup = groupBy([...means.values()], ({ group }) => group);
  let between = 0;
  let betweenFreedom = 0;
  for (const own of byGroup.values()) {
    const mean = own.reduce((sum, { mean: x }) => sum + x, 0) / own.length;
    for (const { mean: x, walks: count } of own)
      between += (x - mean) ** 2 - ((own.length - 1) / own.length) * (walkVariance / count);
    betweenFreedom += own.length - 1;
  }
  // With one walker a group, people differ as in the literature: 8 %.
  const walkerVariance = betweenFreedom > 0 ? Math.max(0.01 ** 2, between / betweenFreedom) : 0.08 ** 2;
  const groups = new Map<string, FittedConstant>();
  const centre = new Map<string, { mean: number; variance: number }>();
  for (const [group, own] of byGroup) {
    const weights = own.map(({ walks: count }) => 1 / (walkerVariance + walkVariance / count));
    const total = weights.reduce((sum, w) => sum + w, 0);
    const mean = own.reduce((sum, { mean: x }, i) => sum + weights[i]! * x, 0) / total;
    centre.set(group, { mean, variance: 1 / total });
    groups.set(group, constant(mean, 1 / total + walkerVariance, 'group', own.length));
  }
  const walkers = new Map<string, FittedConstant>();
  for (const { walker, group } of everyone) {
    const own = means.get(walker);
    const of = centre.get(group);
    if (own && of) {
      const trust = walkerVariance / (walkerVariance + walkVariance / own.walks);
      const mean = of.mean + trust * (own.mean - of.mean);
      const variance = (trust * walkVariance) / own.walks + (1 - trust) ** 2 * of.variance;
      walkers.set(walker, constant(mean, variance, 'walker', own.walks));
    } else if (of) walkers.set(walker, groups.get(group)!);
  }
  return {
    walkers,
    groups,
    betweenWalkers: Math.sqrt(walkerVariance),
    betweenWalks: Math.sqrt(walkVariance),
  };
}

function constant(
  log: number,
  variance: number,
  from: FittedConstant['from'],
  walks: number,
): FittedConstant {
  const value = Math.exp(log);
  return { value, sd: value * Math.sqrt(variance), from, walks };
}

function groupBy<T>(rows: readonly T[], keyOf: (row: T) => string): Map<string, T[]> {
  const out = new Map<string, T[]>();
  for (const row of rows) out.set(keyOf(row), [...(out.get(keyOf(row)) ?? []), row]);
  return out;
}

import { InputError } from '../errors.js';

/** A demand on a recipe's scores, for continuous integration. */
export type Gate =
  | { text: string; statistic: string; kind: 'bound'; relation: '<=' | '<' | '>=' | '>'; value: number }
  | { text: string; statistic: string; kind: 'not-worse'; by: number };

/** Statistics of group-scores by the word a gate uses, with their unit. */
const STATISTICS: Readonly<Record<string, { column: string; unit: 'm' | '%' }>> = {
  mean: { column: 'mean_m', unit: 'm' },
  median: { column: 'median_m', unit: 'm' },
  rmse: { column: 'rmse_m', unit: 'm' },
  p75: { column: 'p75_m', unit: 'm' },
  p90: { column: 'p90_m', unit: 'm' },
  p95: { column: 'p95_m', unit: 'm' },
  max: { column: 'max_m', unit: 'm' },
  end: { column: 'end_error_pct', unit: '%' },
};

const GRAMMAR = `must be like 'p75 <= 3.0 m' or 'median not worse by 0.1 m', of ${Object.keys(STATISTICS).join(', ')} (end in %)`;

/**
 * Reads a gate.
 *
 * @throws InputError `bad-gate`.
 */
export function parseGate(text: string): Gate {
  const bound = /^\s*(\w+)\s*(<=|>=|<|>)\s*([0-9.]+)\s*(m|%)\s*$/.exec(text);
  const notWorse = /^\s*(\w+)\s+not\s+worse\s+by\s+([0-9.]+)\s*(m|%)\s*$/.exec(text);
  const [word, number, unit] = bound
    ? [bound[1]!, bound[3]!, bound[4]!]
    : [notWorse?.[1], notWorse?.[2], notWorse?.[3]];
  const known = word === undefined ? undefined : STATISTICS[word];
  const value = Number(number);
  if (!known || known.unit !== unit || !Number.isFinite(value))
    throw new InputError('bad-gate', `--gate '${text}': ${GRAMMAR}`);
  const statistic = known.column;
  return bound
    ? { text, statistic, kind: 'bound', relation: bound[2] as '<=', value }
    : { text, statistic, kind: 'not-worse', by: value };
}

/**
 * Whether a gate holds.
 *
 * @param before - the statistic of the recipe compared with; used by `not worse`.
 * @param now - of the recipe that is judged; a number that is not known fails.
 */
export function gateHolds(gate: Gate, before: number, now: number): boolean {
  if (gate.kind === 'not-worse') return now - before <= gate.by;
  switch (gate.relation) {
    case '<=':
      return now <= gate.value;
    case '<':
      return now < gate.value;
    case '>=':
      return now >= gate.value;
    case '>':
      return now > gate.value;
    default:
      return gate.relation satisfies never;
  }
}

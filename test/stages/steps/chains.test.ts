import { expect, test } from 'vitest';
import { bestChain } from '../../../src/stages/steps/best-chain.js';
import type { StepLinks } from '../../../src/stages/steps/step-links.js';
import { stepProbability } from '../../../src/stages/steps/step-probability.js';
import { randomStream } from '../../../src/stats/random.js';

/** Links between eight peaks, each with up to three before it, and random evidence. */
function randomLinks(seed: number): StepLinks {
  const random = randomStream(seed, 'links');
  const peaks = 8;
  const from: number[] = [];
  const to: number[] = [];
  const firstInto = new Int32Array(peaks + 1);
  for (let i = 0; i < peaks; i++) {
    firstInto[i] = from.length;
    for (let p = Math.max(0, i - 3); p < i; p++) {
      from.push(p);
      to.push(i);
    }
  }
  firstInto[peaks] = from.length;
  const firstJoint = new Int32Array(from.length + 1);
  for (const [l, p] of from.entries()) firstJoint[l + 1] = firstJoint[l]! + firstInto[p + 1]! - firstInto[p]!;
  const draw = (n: number) => Float64Array.from({ length: n }, () => 2 * random.normal());
  return {
    peaks,
    // Above the least evidence of an edge step everywhere, so that edges are judged like any other step.
    peak: draw(peaks).map((x) => 1 + Math.abs(x)),
    recentFrom: Int32Array.from({ length: peaks }, (_, i) => Math.max(0, i - 2)),
    firstInto,
    from: Int32Array.from(from),
    to: Int32Array.from(to),
    link: draw(from.length),
    firstJoint,
    rhythm: draw(firstJoint[from.length]!).map(Math.abs),
    likeness: draw(firstJoint[from.length]!).map(Math.abs),
  };
}

/** Every way to put bouts of at least two steps through the peaks, with its evidence. */
function* allChains(
  links: StepLinks,
  startCost: number,
  restartCost = startCost,
): Generator<{ steps: number[]; value: number }> {
  const { peaks, peak, firstInto, from, to, link, firstJoint, rhythm, likeness } = links;
  function* extend(
    last: number,
    steps: number[],
    value: number,
  ): Generator<{ steps: number[]; value: number }> {
    yield* begin(to[last]! + 1, steps, value);
    for (let l = 0; l < from.length; l++)
      if (from[l] === to[last]) {
        const j = firstJoint[l]! + last - firstInto[from[l]!]!;
        yield* extend(l, [...steps, to[l]!], value + link[l]! + rhythm[j]! + likeness[j]!);
      }
  }
  function* begin(
    earliest: number,
    steps: number[],
    value: number,
  ): Generator<{ steps: number[]; value: number }> {
    yield { steps, value };
    for (let l = 0; l < from.length; l++)
      if (from[l]! >= earliest) {
        const before = steps.at(-1);
        const isRecent = before !== undefined && before >= links.recentFrom[from[l]!]!;
        const cost = isRecent ? Math.min(startCost, restartCost) : startCost;
        yield* extend(l, [...steps, from[l]!, to[l]!], value + peak[from[l]!]! - cost + link[l]!);
      }
  }
  if (peaks > 0) yield* begin(0, [], 0);
}

test.each([1, 2, 3, 4, 5, 6])('the best chain is the best of all that there are, draw %i', (seed) => {
  const links = randomLinks(seed);
  let best = { steps: [] as number[], value: Number.NEGATIVE_INFINITY };
  let count = 0;
  for (const chain of allChains(links, 4, 2)) {
    count++;
    if (chain.value > best.value) best = chain;
  }
  expect(count).toBeGreaterThan(100);
  expect([...bestChain(links, { startCost: 4, restartCost: 2 })]).toEqual(best.steps);
});

test.each([1, 2, 3])('probabilities are sums over all chains, draw %i', (seed) => {
  const links = randomLinks(seed);
  const share = 0.4;
  const weight = new Float64Array(links.peaks);
  let total = 0;
  for (const { steps, value } of allChains(links, 4)) {
    const w = Math.exp(share * value);
    total += w;
    for (const i of steps) weight[i]! += w;
  }
  const probability = stepProbability(links, 4, share);
  for (let i = 0; i < links.peaks; i++) expect(probability[i]).toBeCloseTo(weight[i]! / total, 10);
});

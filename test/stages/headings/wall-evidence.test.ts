import { describe, expect, test } from 'vitest';
import { alongWalls, legWeights } from '../../../src/stages/headings/wall-evidence.js';

const RAD = Math.PI / 180;
const oneWay = (degree: number) => Array.from({ length: 90 }, (_, i) => (i === degree ? 1 : 0));

describe('alongWalls', () => {
  const likelihood = alongWalls(oneWay(20));

  test('has mean 1, and repeats every right angle', () => {
    let sum = 0;
    for (let i = 0; i < 3600; i++) sum += likelihood(i * 0.1 * RAD) / 3600;
    // Quarter degrees of table under tenths of sampling.
    expect(sum).toBeCloseTo(1, 3);
    for (const turn of [-180, -90, 90, 270])
      expect(likelihood((33 + turn) * RAD)).toBeCloseTo(likelihood(33 * RAD), 9);
  });

  test('is a mixture: 0.4 where nobody follows a wall, and 0.6 of a normal of 7 degrees at the wall', () => {
    expect(likelihood(65.5 * RAD)).toBeCloseTo(0.4, 3);
    expect(likelihood(20.5 * RAD)).toBeCloseTo(0.4 + (0.6 * 90) / (7 * Math.sqrt(2 * Math.PI)), 3);
    expect(likelihood(27.5 * RAD) - 0.4).toBeCloseTo((likelihood(20.5 * RAD) - 0.4) * Math.exp(-0.5), 3);
  });

  test('walls that run every way say nothing', () => {
    const flat = alongWalls(new Array(90).fill(1 / 90));
    for (let i = 0; i < 90; i++) expect(flat(i * RAD)).toBeCloseTo(1, 3);
  });
});

describe('legWeights', () => {
  const sum = (values: Float64Array) => values.reduce((total, value) => total + value, 0);

  test('a straight leg of 12 steps counts once, and a long walk as five legs', () => {
    expect(sum(legWeights(new Float64Array(12).fill(1)))).toBeCloseTo(1, 12);
    expect(sum(legWeights(new Float64Array(300).fill(1)))).toBeCloseTo(5, 12);
  });

  test('steps in a turn count for little', () => {
    const turn = Float64Array.from({ length: 31 }, (_, k) =>
      k < 15 ? 0 : k > 15 ? Math.PI / 2 : Math.PI / 4,
    );
    const weights = legWeights(turn);
    expect(weights[15]! / weights[3]!).toBeLessThan(1e-6);
  });
});

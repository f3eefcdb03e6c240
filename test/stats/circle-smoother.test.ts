import { describe, expect, test } from 'vitest';
import { type CircleMove, smoothOnCircle } from '../../src/stats/circle-smoother.js';
import { wrapToPi } from '../../src/stats/circular.js';
import { Measurements, smoothChain } from '../../src/stats/fixed-interval-smoother.js';
import { randomStream } from '../../src/stats/random.js';

const BINS = 180;
const CELL = (2 * Math.PI) / BINS;
const uniform = new Float64Array(BINS).fill(1 / BINS);
const move = (shiftRad: number, sdRad: number, freshShare = 0): CircleMove => ({
  shiftRad,
  sdRad,
  freshShare,
  fresh: uniform,
});
/** Logarithm of a normal density around an angle. */
const around = (angle: number, sd: number) =>
  Float64Array.from({ length: BINS }, (_, b) => -0.5 * (wrapToPi(b * CELL - angle) / sd) ** 2);
const nothing = new Float64Array(BINS);
const rows = (parts: readonly Float64Array[]) => Float64Array.from(parts.flatMap((part) => [...part]));

describe('smoothOnCircle', () => {
  test('of one node, evidence times prior: the precision-weighted mean', () => {
    const prior = around(0.5, 0.2).map(Math.exp);
    const { mean, sd } = smoothOnCircle({ bins: BINS, prior, logLikelihood: around(0.8, 0.1), moves: [] });
    // (0.5 / 0.04 + 0.8 / 0.01) / 125 = 0.74, sd 1 / sqrt(125). Cells of 2 degrees sum a density of that width
    // to better than 1e-6 of its moments (the trapezoid rule on a smooth periodic function).
    expect(mean[0]).toBeCloseTo(0.74, 6);
    // The belief is taken as even within each of the cells, of which 2.6 make a deviation: a hundredth.
    expect(sd[0]! * Math.sqrt(125)).toBeCloseTo(1, 1.7);
  });

  test('a narrow belief moves like a random walk on a line: the same as the linear smoother', () => {
    const random = randomStream(3, 'circle');
    const n = 60;
    const seen = Float64Array.from({ length: n }, (_, i) => 3 + CELL * i + 0.15 * random.normal());
    const [walkSd, sightSd, shift] = [0.01, 0.15, CELL];
    const measurements = new Measurements(n);
    for (let i = 0; i < n; i++) measurements.addDirect(i, 0, seen[i]!, sightSd ** 2);
    const line = smoothChain({
      nodes: n,
      size: 1,
      pattern: new Int32Array(0),
      transition: new Float64Array(0),
      drive: new Float64Array(n - 1).fill(shift),
      process: new Float64Array(n - 1).fill(walkSd ** 2),
      priorMean: Float64Array.of(seen[0]!),
      priorVariance: Float64Array.of(1e4),
      measurements,
    });
    // The angles cross the half turn: the cells wrap, the line does not.
    const circle = smoothOnCircle({
      bins: BINS,
      prior: uniform,
      logLikelihood: rows(Array.from(seen, (angle) => around(angle, sightSd))),
      moves: new Array(n - 1).fill(move(shift, walkSd)),
    });
    for (let i = 0; i < n; i++) {
      // Mean and variance of each move are exact; its fourth moment is that of three cells, not of a normal, which
      // shifts the belief by parts of a hundred of its width.
      const sd = Math.sqrt(line.variance[i]!);
      expect(Math.abs(wrapToPi(circle.mean[i]! - line.mean[i]!))).toBeLessThan(0.05 * sd);
      // A belief narrower than a cell at times, taken as even within cells.
      expect(Math.abs(circle.sd[i]! / sd - 1)).toBeLessThan(0.2);
    }
  });

  test('a wide move is a wrapped normal: variances add', () => {
    const { sd, mean } = smoothOnCircle({
      bins: BINS,
      prior: around(1, 0.15).map(Math.exp),
      logLikelihood: rows([nothing, nothing]),
      moves: [move(-0.7, 0.2)],
    });
    expect(mean[1]).toBeCloseTo(0.3, 6);
    // As above; seven cells make a deviation.
    expect(sd[1]! / 0.25).toBeCloseTo(1, 2);
  });

  test('an axis whose sense is open gives one of its ends and a deviation that says so', () => {
    const axis = Float64Array.from({ length: BINS }, (_, b) => 50 * Math.cos(2 * (b * CELL - 1)));
    const lean = axis.map((value, b) => value + 0.5 * Math.cos(b * CELL - 1));
    const { mean, sd } = smoothOnCircle({ bins: BINS, prior: uniform, logLikelihood: lean, moves: [] });
    // The odds are e to 1: the end at 1 rad, with 27 of 100 left for a half turn off; two deviations hold 95 of 100.
    expect(mean[0]).toBeCloseTo(1, 3);
    expect(sd[0]).toBeCloseTo(Math.PI / 2, 1);
  });

  test('a hundredth of belief in the opposite direction does not swell the deviation', () => {
    const belief = around(1, 0.2).map(
      (value, b) => Math.exp(value) + 0.01 * Math.exp(around(1 - Math.PI, 0.2)[b]!),
    );
    const { sd } = smoothOnCircle({ bins: BINS, prior: belief, logLikelihood: nothing, moves: [] });
    // A hundredth less of the belief is near: 68.27 / 0.99 of 100 and 95.45 / 0.99 of 100 need 1.016 and 1.05 deviations.
    expect(sd[0]! / 0.2).toBeGreaterThan(1);
    expect(sd[0]! / 0.2).toBeLessThan(1.07);
  });

  test('a sense found late is known early, and an angle drawn anew takes it no further', () => {
    const axis = Float64Array.from({ length: BINS }, (_, b) => 50 * Math.cos(2 * (b * CELL + 2)));
    const known = around(-2, 0.3);
    const linked = smoothOnCircle({
      bins: BINS,
      prior: uniform,
      logLikelihood: rows([axis, axis, known]),
      moves: [move(0, 0.01), move(0, 0.01)],
    });
    expect(linked.mean[0]).toBeCloseTo(-2, 2);
    expect(linked.sd[0]).toBeLessThan(0.1);
    const parted = smoothOnCircle({
      bins: BINS,
      prior: uniform,
      logLikelihood: rows([axis, axis, known]),
      moves: [move(0, 0.01), move(0, 0.01, 1)],
    });
    expect(parted.sd[0]).toBeGreaterThan(2);
    expect(parted.mean[2]).toBeCloseTo(-2, 6);
  });
});

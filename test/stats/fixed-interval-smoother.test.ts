import { Matrix, solve } from 'ml-matrix';
import { expect, test } from 'vitest';
import { type Chain, Measurements, smoothChain } from '../../src/stats/fixed-interval-smoother.js';
import { randomStream } from '../../src/stats/random.js';

/** The same estimate by one dense least-squares solution over all states at once (ml-matrix). */
function dense(chain: Chain): { mean: Matrix; covariance: Matrix } {
  const { nodes, size: n, measurements: z } = chain;
  const total = nodes * n;
  const information = Matrix.zeros(total, total);
  const right = Matrix.zeros(total, 1);
  const addRow = (row: Matrix, value: number, variance: number) => {
    information.add(row.transpose().mmul(row).div(variance));
    right.add(row.transpose().mul(value / variance));
  };
  for (let i = 0; i < n; i++) {
    const row = Matrix.zeros(1, total);
    row.set(0, i, 1);
    addRow(row, chain.priorMean[i]!, chain.priorVariance[i]!);
  }
  for (let j = 0; j + 1 < nodes; j++)
    for (let i = 0; i < n; i++) {
      const row = Matrix.zeros(1, total);
      row.set(0, (j + 1) * n + i, 1);
      row.set(0, j * n + i, -1);
      for (const [e, place] of chain.pattern.entries())
        if (Math.floor(place / n) === i) {
          const at = j * n + (place % n);
          row.set(0, at, row.get(0, at) - chain.transition[j * chain.pattern.length + e]!);
        }
      addRow(row, chain.drive[j * n + i]!, chain.process[j * n + i]!);
    }
  for (let m = 0; m < z.count; m++) {
    const row = Matrix.zeros(1, total);
    for (let c = 0; c < 3; c++) {
      const at = z.node[m]! * n + z.index[3 * m + c]!;
      row.set(0, at, row.get(0, at) + z.coefficient[3 * m + c]!);
    }
    addRow(row, z.value[m]!, z.variance[m]!);
  }
  return { mean: solve(information, right), covariance: solve(information, Matrix.eye(total)) };
}

test('smoothChain equals the dense least-squares solution: means, variances, covariance of a pair', () => {
  const random = randomStream(7, 'chain');
  const nodes = 12;
  const size = 4;
  const pattern = Int32Array.of(0 * size + 2, 1 * size + 3, 0 * size + 3, 2 * size + 1);
  const values = (count: number) => Float64Array.from({ length: count }, () => random.normal());
  const measurements = new Measurements(30);
  for (let j = 0; j < nodes; j++) {
    if (j % 3 !== 1)
      measurements.add(j, 0, random.normal(), 2, random.normal(), 3, random.normal(), random.normal(), 0.4);
    if (j % 2 === 0) measurements.addDirect(j, 1, random.normal(), 0.7);
  }
  const chain: Chain = {
    nodes,
    size,
    pattern,
    transition: values((nodes - 1) * pattern.length),
    drive: values((nodes - 1) * size),
    process: values((nodes - 1) * size).map((v) => 0.1 + v * v),
    priorMean: values(size),
    priorVariance: Float64Array.of(1, 2, 0.5, 3),
    measurements,
    pair: [0, 1],
  };
  const smoothed = smoothChain(chain);
  const expected = dense(chain);
  // The information matrix has a condition number of some thousands: 1e-10 leaves three digits over its rounding.
  for (let j = 0; j < nodes; j++) {
    for (let i = 0; i < size; i++) {
      const at = j * size + i;
      expect(Math.abs(smoothed.mean[at]! - expected.mean.get(at, 0))).toBeLessThan(1e-10);
      expect(Math.abs(smoothed.variance[at]! - expected.covariance.get(at, at))).toBeLessThan(1e-10);
    }
    expect(Math.abs(smoothed.covariance[j]! - expected.covariance.get(j * size, j * size + 1))).toBeLessThan(
      1e-10,
    );
  }
});

import { CholeskyDecomposition, inverse, Matrix } from 'ml-matrix';

export interface NonNegativeFit {
  values: number[];
  /** Of each value; for one held at 0, of the fit in which it is free. */
  standardErrors: number[];
  chiSquare: number;
}

/**
 * Generalised least squares with no coefficient below 0.
 *
 * Tries every subset of coefficients and keeps the best that is feasible: exact, and quick for the
 * handful of coefficients it is made for.
 *
 * @param design - n rows of k <= 10 columns, n >= k, independent.
 * @param observed - n values.
 * @param covariance - n × n, of the observations, positive definite.
 */
export function solveNonNegative(
  design: readonly (readonly number[])[],
  observed: readonly number[],
  covariance: readonly (readonly number[])[],
): NonNegativeFit {
  const k = design[0]!.length;
  const whiten = whitening(covariance);
  const columns = Array.from({ length: k }, (_, c) => whiten(design.map((row) => row[c]!)));
  const y = whiten(observed);
  let best: { values: number[]; chiSquare: number } | null = null;
  for (let subset = 0; subset < 2 ** k; subset++) {
    const used = columns.map((_, c) => c).filter((c) => (subset >> c) & 1);
    const values = new Array<number>(k).fill(0);
    if (used.length > 0) {
      const right = used.map((c) => [dot(columns[c]!, y)]);
      const solved = inverse(normalMatrix(used)).mmul(new Matrix(right));
      for (const [row, c] of used.entries()) values[c] = solved.get(row, 0);
    }
    if (values.some((v) => v < 0)) continue;
    const chiSquare = y.reduce(
      (sum, value, i) =>
        sum + (value - columns.reduce((s, column, c) => s + column[i]! * values[c]!, 0)) ** 2,
      0,
    );
    if (!best || chiSquare < best.chiSquare) best = { values, chiSquare };
  }
  const { values, chiSquare } = best!; // the empty subset is always feasible
  const free = columns.map((_, c) => c);
  const used = free.filter((c) => values[c]! > 0);
  const standardErrors = free.map((c) => {
    const inFit = used.includes(c) ? used : [...used, c];
    return Math.sqrt(inverse(normalMatrix(inFit)).get(inFit.indexOf(c), inFit.indexOf(c)));
  });
  return { values, standardErrors, chiSquare };

  function normalMatrix(of: number[]): Matrix {
    return new Matrix(of.map((a) => of.map((b) => dot(columns[a]!, columns[b]!))));
  }
}

/** Multiplication by the inverse of the covariance's Cholesky factor, rows scaled to unit variance first. */
function whitening(covariance: readonly (readonly number[])[]): (values: readonly number[]) => number[] {
  const scale = covariance.map((row, i) => Math.sqrt(row[i]!));
  const correlation = new Matrix(
    covariance.map((row, i) => row.map((value, j) => value / (scale[i]! * scale[j]!))),
  );
  // Sums over thinned lags are not exactly positive definite; a hair on the diagonal makes them so.
  for (let i = 0; i < scale.length; i++) correlation.set(i, i, 1 + 1e-6);
  const factor = new CholeskyDecomposition(correlation).lowerTriangularMatrix;
  return (values) => {
    const out: number[] = [];
    for (let i = 0; i < values.length; i++) {
      let rest = values[i]! / scale[i]!;
      for (let j = 0; j < i; j++) rest -= factor.get(i, j) * out[j]!;
      out.push(rest / factor.get(i, i));
    }
    return out;
  };
}

function dot(a: readonly number[], b: readonly number[]): number {
  return a.reduce((sum, value, i) => sum + value * b[i]!, 0);
}

import { quantileSorted, sortedCopy } from '../stats/quantile.js';
import { mean, rootMeanSquare } from '../stats/summary.js';
import type { Checkpoints } from '../tables/schemas.js';

/** Position errors of one walk over its scored passes; all NaN where none is scored. */
export interface ErrorStatistics {
  scored: number;
  mean_m: number;
  median_m: number;
  rmse_m: number;
  p75_m: number;
  p90_m: number;
  p95_m: number;
  max_m: number;
  end_error_m: number;
  end_error_pct: number;
  travelled_m: number;
}

/** Statistics of the horizontal error at the scored passes; quantiles of type 7. */
export function errorStatistics(checkpoints: Checkpoints | null): ErrorStatistics {
  const rows = checkpoints
    ? [...checkpoints.role.keys()].filter((i) => checkpoints.role[i] === 'scored')
    : [];
  if (!checkpoints || rows.length === 0) return { ...NOTHING_SCORED };
  const errors = Float64Array.from(rows, (i) => checkpoints.error_m[i]!);
  const sorted = sortedCopy(errors);
  const last = rows.at(-1)!;
  const travelled_m = checkpoints.travelled_m[last]!;
  const end_error_m = checkpoints.error_m[last]!;
  return {
    scored: rows.length,
    mean_m: mean(errors),
    median_m: quantileSorted(sorted, 0.5),
    rmse_m: rootMeanSquare(errors),
    p75_m: quantileSorted(sorted, 0.75),
    p90_m: quantileSorted(sorted, 0.9),
    p95_m: quantileSorted(sorted, 0.95),
    max_m: sorted.at(-1)!,
    end_error_m,
    end_error_pct: travelled_m > 0 ? (100 * end_error_m) / travelled_m : Number.NaN,
    travelled_m,
  };
}

const NOTHING_SCORED: ErrorStatistics = {
  scored: 0,
  mean_m: Number.NaN,
  median_m: Number.NaN,
  rmse_m: Number.NaN,
  p75_m: Number.NaN,
  p90_m: Number.NaN,
  p95_m: Number.NaN,
  max_m: Number.NaN,
  end_error_m: Number.NaN,
  end_error_pct: Number.NaN,
  travelled_m: Number.NaN,
};

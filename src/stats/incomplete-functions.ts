const LANCZOS_G = 607 / 128;
/** Coefficients of the Lanczos series for g = 607/128, n = 15. */
const LANCZOS = [
  0.9999999999999971, 57.15623566586292, -59.59796035547549, 14.136097974741746, -0.4919138160976202,
  3.399464998481189e-5, 4.652362892704858e-5, -9.837447530487956e-5, 0.0001580887032249125,
  -0.00021026444172410488, 0.00021743961811521265, -0.0001643181065367639, 8.441822398385275e-5,
  -2.6190838401581408e-5, 3.6899182659531625e-6,
];
const SMALLEST = 1e-300;
const EPSILON = 2 ** -53;
const MAX_TERMS = 100_000;

/**
 * Natural logarithm of the gamma function, relative error below 1e-14.
 *
 * @param x - above 0.
 * @see Godfrey (2001), A note on the computation of the convergent Lanczos complex gamma approximation.
 */
export function logGamma(x: number): number {
  let sum = LANCZOS[0]!;
  for (let i = 1; i < LANCZOS.length; i++) sum += LANCZOS[i]! / (x - 1 + i);
  const t = x - 0.5 + LANCZOS_G;
  return 0.5 * Math.log(2 * Math.PI) + Math.log(sum) + (x - 0.5) * Math.log(t) - t;
}

/**
 * Both halves of the regularised incomplete gamma function: `lower` is P(a, x), `upper` 1 - P without
 * the loss of digits of a subtraction.
 *
 * @param a - above 0; relative error about 1e-13 up to a = 1e4, growing with a.
 * @param x - 0..Infinity.
 * @see Press et al. (2007), Numerical Recipes, 3rd edition, section 6.2: series, and Lentz's method on
 *   the continued fraction.
 */
export function incompleteGamma(a: number, x: number): { lower: number; upper: number } {
  if (x === 0) return { lower: 0, upper: 1 };
  if (x === Number.POSITIVE_INFINITY) return { lower: 1, upper: 0 };
  const front = Math.exp(a * Math.log(x) - x - logGamma(a));
  if (x < a + 1) {
    let term = 1 / a;
    let sum = term;
    for (let n = 1; n < MAX_TERMS && term > sum * EPSILON; n++) {
      term *= x / (a + n);
      sum += term;
    }
    const lower = Math.min(1, front * sum);
    return { lower, upper: 1 - lower };
  }
  let b = x + 1 - a;
  let c = 1 / SMALLEST;
  let d = 1 / b;
  let fraction = d;
  for (let n = 1; n < MAX_TERMS; n++) {
    const an = n * (a - n);
    b += 2;
    d = 1 / away(an * d + b);
    c = away(b + an / c);
    const factor = d * c;
    fraction *= factor;
    if (Math.abs(factor - 1) < 2 * EPSILON) break;
  }
  const upper = Math.min(1, front * fraction);
  return { lower: 1 - upper, upper };
}

/**
 * Regularised incomplete beta function I_x(a, b).
 *
 * @param x - 0..1.
 * @param a - above 0.
 * @param b - above 0.
 * @param rest - 1 - x, where the caller knows it to more digits than the subtraction gives.
 * @see Press et al. (2007), Numerical Recipes, 3rd edition, section 6.4.
 */
export function incompleteBeta(x: number, a: number, b: number, rest = 1 - x): number {
  if (x <= 0) return 0;
  if (rest <= 0) return 1;
  const front = Math.exp(logGamma(a + b) - logGamma(a) - logGamma(b) + a * Math.log(x) + b * Math.log(rest));
  return x < (a + 1) / (a + b + 2)
    ? (front * betaFraction(x, a, b)) / a
    : 1 - (front * betaFraction(rest, b, a)) / b;
}

function betaFraction(x: number, a: number, b: number): number {
  let c = 1;
  let d = 1 / away(1 - ((a + b) * x) / (a + 1));
  let fraction = d;
  for (let m = 1; m < MAX_TERMS; m++) {
    const even = (m * (b - m) * x) / ((a + 2 * m - 1) * (a + 2 * m));
    d = 1 / away(1 + even * d);
    c = away(1 + even / c);
    fraction *= d * c;
    const odd = (-(a + m) * (a + b + m) * x) / ((a + 2 * m) * (a + 2 * m + 1));
    d = 1 / away(1 + odd * d);
    c = away(1 + odd / c);
    const factor = d * c;
    fraction *= factor;
    if (Math.abs(factor - 1) < 2 * EPSILON) break;
  }
  return fraction;
}

/** Keeps Lentz's method from dividing by 0. */
function away(x: number): number {
  return Math.abs(x) < SMALLEST ? SMALLEST : x;
}

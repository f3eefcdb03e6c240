/**
 * Functions of time with their first and second derivatives, on a block of instants.
 *
 * Motion is built from these by sums, products, sines and cosines, so that velocities and accelerations
 * are exact: no differencing, no step size to choose.
 */
export interface Jet {
  readonly v: Float64Array;
  /** First derivative, per second. */
  readonly d: Float64Array;
  /** Second derivative, per second squared. */
  readonly dd: Float64Array;
}

/** A jet of n zeros, to be filled. */
export function zeroJet(n: number): Jet {
  return { v: new Float64Array(n), d: new Float64Array(n), dd: new Float64Array(n) };
}

export function constantJet(n: number, value: number): Jet {
  const out = zeroJet(n);
  out.v.fill(value);
  return out;
}

/** offset + ka a + kb b. */
export function combine(offset: number, ka: number, a: Jet, kb = 0, b: Jet = a): Jet {
  const out = zeroJet(a.v.length);
  for (let i = 0; i < out.v.length; i++) {
    out.v[i] = offset + ka * a.v[i]! + kb * b.v[i]!;
    out.d[i] = ka * a.d[i]! + kb * b.d[i]!;
    out.dd[i] = ka * a.dd[i]! + kb * b.dd[i]!;
  }
  return out;
}

/** Adds k a b to `sum` in place, and returns it. */
export function addProduct(sum: Jet, k: number, a: Jet, b: Jet): Jet {
  for (let i = 0; i < sum.v.length; i++) {
    sum.v[i]! += k * a.v[i]! * b.v[i]!;
    sum.d[i]! += k * (a.d[i]! * b.v[i]! + a.v[i]! * b.d[i]!);
    sum.dd[i]! += k * (a.dd[i]! * b.v[i]! + 2 * a.d[i]! * b.d[i]! + a.v[i]! * b.dd[i]!);
  }
  return sum;
}

export function product(a: Jet, b: Jet): Jet {
  return addProduct(zeroJet(a.v.length), 1, a, b);
}

/** sin(k a + phase). */
export function sine(a: Jet, k = 1, phaseRad = 0): Jet {
  const out = zeroJet(a.v.length);
  for (let i = 0; i < out.v.length; i++) {
    const angle = k * a.v[i]! + phaseRad;
    const s = Math.sin(angle);
    const c = Math.cos(angle);
    const rate = k * a.d[i]!;
    out.v[i] = s;
    out.d[i] = c * rate;
    out.dd[i] = c * k * a.dd[i]! - s * rate * rate;
  }
  return out;
}

/** cos(k a + phase). */
export function cosine(a: Jet, k = 1, phaseRad = 0): Jet {
  return sine(a, k, phaseRad + Math.PI / 2);
}

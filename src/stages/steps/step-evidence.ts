/**
 * How much more probable what is seen is in walking than in anything else that happens to a phone: natural logarithms
 * of likelihood ratios. Shapes and widths are rounded from labelled walks with the phone in eight places on the body,
 * from walkers with a cane or a guide dog, and from simulated slow and impaired gait; moving any of them by a fifth
 * changes counts by a few steps in a thousand. Limits keep a single odd step from ending a bout.
 */

const LOG_SQRT_TWO_PI = 0.5 * Math.log(2 * Math.PI);

function logNormal(x: number, mean: number, sd: number): number {
  const z = (x - mean) / sd;
  return -0.5 * z * z - Math.log(sd) - LOG_SQRT_TWO_PI;
}

/** Log density of two normal distributions, the first with the given share. */
function logMixture(x: number, share: number, m1: number, s1: number, m2: number, s2: number): number {
  return Math.log(
    share * Math.exp(logNormal(x, m1, s1)) + (1 - share) * Math.exp(logNormal(x, m2, s2)) + 1e-12,
  );
}

function within(x: number, low: number, high: number): number {
  return Math.max(low, Math.min(high, x));
}

/**
 * A peak taken for a step, by its prominence.
 *
 * Being like its neighbours is hardly any proof of walking, since they may be no steps either; being much smaller is
 * proof against it.
 *
 * @param prominence - m/s2, > 0.
 * @param typical - that of steps around it, m/s2.
 */
export function peakEvidence(prominence: number, typical: number): number {
  const relative = Math.log(prominence / typical);
  const size = Math.log(prominence);
  const byNeighbours = logMixture(relative, 0.9, 0, 0.42, -0.5, 1.1) - logNormal(relative, -2.5, 1.8);
  // Walking shows one to ten m/s2, weak shuffling some tenths, a phone at rest hundredths.
  const bySize = logNormal(size, Math.log(2), 1.75) - logNormal(size, Math.log(0.11), 1.5);
  return within(byNeighbours, -6, 0.4) + within(bySize, -5, 0);
}

/** A peak passed over between two steps: small ones are usual, a large one is a step missed. */
export function passedOverEvidence(prominence: number, typical: number): number {
  const relative = Math.log(prominence / typical);
  return 2 * Math.min(0, logNormal(relative, -3.5, 1.15) - logNormal(relative, -2.5, 1.8));
}

/** The time between two steps, s: about half a second, with a long tail for slow and impaired gait. */
export function intervalEvidence(intervalS: number): number {
  const x = Math.log(intervalS);
  const usual = logMixture(x, 0.6, Math.log(0.55), 0.35, Math.log(1.25), 0.42);
  const most = Math.log(0.6 / 0.35) - LOG_SQRT_TWO_PI;
  return Math.max(-5.5, usual - most + 0.9);
}

/** Two intervals in a row, s: steps keep their beat, though left and right may differ. */
export function rhythmEvidence(intervalS: number, beforeS: number): number {
  const x = Math.log(intervalS / beforeS);
  return Math.min(1.6, logMixture(x, 0.7, 0, 0.2, 0, 0.55) - logNormal(x, 0, 0.45));
}

/** The correlation of a step with the one before the last, which the same foot made. */
export function likenessEvidence(correlation: number): number {
  const z = Math.atanh(within(correlation, -0.995, 0.995));
  return within(logNormal(z, 1.55, 0.65) - logNormal(z, 0.4, 0.75), -2.2, 2.4);
}

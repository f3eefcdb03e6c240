/**
 * Where an increasing function takes a value: Newton steps kept inside a shrinking bracket.
 *
 * The bracket makes it safe where Newton alone runs away; the steps make it quick where the function
 * is smooth.
 *
 * @param value - increasing in x, any unit u.
 * @param slope - its derivative, u per unit of x; may be 0 where the bracket then decides.
 * @param target - in u.
 * @param start - a guess in (low, high).
 * @param low - finite, value(low) <= target.
 * @param high - finite, value(high) >= target.
 * @returns x to about 1e-15 of its size.
 */
export function solveIncreasing(
  value: (x: number) => number,
  slope: (x: number) => number,
  target: number,
  start: number,
  low: number,
  high: number,
): number {
  let x = start;
  let [a, b] = [low, high];
  for (let round = 0; round < 200; round++) {
    const miss = value(x) - target;
    if (miss === 0) return x;
    if (miss < 0) a = x;
    else b = x;
    const step = miss / slope(x);
    let next = x - step;
    // Outside the bracket, or no number: halve it.
    if (!(next > a && next < b)) next = a + (b - a) / 2;
    if (next === x || Math.abs(next - x) <= 2 ** -52 * Math.abs(x)) return next;
    x = next;
  }
  return x;
}

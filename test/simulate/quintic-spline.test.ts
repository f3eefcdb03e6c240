import { expect, test } from 'vitest';
import { QuinticSpline } from '../../src/simulate/quintic-spline.js';

function all(spline: QuinticSpline, t: number): [number, number, number] {
  const out: [number, number, number] = [0, 0, 0];
  spline.evaluate(t, spline.interval(t), out);
  return out;
}

test('reproduces a polynomial of degree five, uneven knots', () => {
  // Identity: the spline with right end slopes is the polynomial itself.
  const value = (t: number) => 2 - t + 3 * t ** 2 - 0.5 * t ** 3 + 0.2 * t ** 4 - 0.05 * t ** 5;
  const slope = (t: number) => -1 + 6 * t - 1.5 * t ** 2 + 0.8 * t ** 3 - 0.25 * t ** 4;
  const bend = (t: number) => 6 - 3 * t + 2.4 * t ** 2 - t ** 3;
  const knots = [0, 0.3, 0.35, 1, 1.8, 2.1, 3];
  const spline = new QuinticSpline(knots, knots.map(value), {
    slope: [slope(0), slope(3)],
    bend: [bend(0), bend(3)],
  });
  for (let t = 0.01; t < 3; t += 0.037) {
    const [y, d, dd] = all(spline, t);
    // Rounding, grown by the unevenness of knots (a factor of 13 between neighbours, to the fourth power).
    expect(Math.abs(y - value(t))).toBeLessThan(1e-11);
    expect(Math.abs(d - slope(t))).toBeLessThan(1e-9);
    expect(Math.abs(dd - bend(t))).toBeLessThan(1e-8);
  }
});

test('passes through its points and stands still outside', () => {
  const [t, y] = [
    [0, 1, 1.5, 2.2],
    [0, 0.4, 1.1, 1.3],
  ];
  const spline = new QuinticSpline(t!, y!);
  // Identity, to rounding.
  for (const [i, knot] of t!.entries()) expect(all(spline, knot)[0]).toBeCloseTo(y![i]!, 13);
  expect(all(spline, -1)).toEqual([0, 0, 0]);
  expect(all(spline, 9)).toEqual([1.3, 0, 0]);
  const [, slope, bend] = all(spline, 1e-9);
  expect(Math.abs(slope)).toBeLessThan(1e-12);
  expect(Math.abs(bend)).toBeLessThan(1e-6);
});

test('third and fourth derivatives do not jump at a knot', () => {
  const spline = new QuinticSpline([0, 0.5, 1.1, 1.5, 2.1], [0, 0.3, 1.2, 1.9, 2.5]);
  const h = 1e-3;
  for (const knot of [0.5, 1.1, 1.5]) {
    const bend = (shift: number) => all(spline, knot + shift)[2];
    // One-sided differences of the second derivative; what differs is h times the fourth derivative, up to 1e3.
    const left = (bend(0) - bend(-h)) / h;
    const right = (bend(h) - bend(0)) / h;
    expect(Math.abs(left - right)).toBeLessThan(h * 2e3);
    const leftFourth = (bend(0) - 2 * bend(-h) + bend(-2 * h)) / h ** 2;
    const rightFourth = (bend(2 * h) - 2 * bend(h) + bend(0)) / h ** 2;
    // The fifth derivative is up to 1e4; a jump would be of the fourth's own size, hundreds.
    expect(Math.abs(leftFourth - rightFourth)).toBeLessThan(2 * h * 2e4);
  }
});

import { describe, expect, test } from 'vitest';
import { edgeDirections } from '../../src/geometry/edge-directions.js';

/** Edge from the origin of a length and direction, clockwise from north. */
const edge = (lengthM: number, degrees: number, east = 0, north = 0) => {
  const rad = (degrees * Math.PI) / 180;
  return [east, north, east + lengthM * Math.sin(rad), north + lengthM * Math.cos(rad)];
};
const shares = (edges: number[][], near: { east: number; north: number } | null = null, reachM = 10) =>
  edgeDirections(Float64Array.from(edges.flat()), near, reachM);

describe('edgeDirections', () => {
  test('a rectangle runs one way modulo a right angle, whichever end an edge begins with', () => {
    const out = shares([edge(10, 20.5), edge(4, 110.5), edge(10, 200.5), edge(4, 290.5)])!;
    expect(out).toHaveLength(90);
    expect(out[20]).toBeCloseTo(1, 12);
  });

  test('directions share by length', () => {
    const out = shares([edge(3, 10.5), edge(1, 55.5)])!;
    expect(out[10]).toBeCloseTo(0.75, 12);
    expect(out[55]).toBeCloseTo(0.25, 12);
  });

  test('a wall counts by what of it is near', () => {
    // Two short walls, the second one reach further away: e to 1. Pieces of at most 5 m are weighed at their middle,
    // so the walls of a centimetre are weighed at their place to a thousandth.
    const out = shares([edge(0.01, 10.5), edge(0.01, 55.5, 0, 10)], { east: 0, north: 0 }, 10)!;
    expect(out[10]! / out[55]!).toBeCloseTo(Math.E, 2);
    // A wall of 1 km through the place counts like the integral of exp(-|x| / 10): 20 m, each piece at its middle.
    const long = shares(
      [
        edge(1000, 10.5, -500 * Math.sin((10.5 * Math.PI) / 180), -500 * Math.cos((10.5 * Math.PI) / 180)),
        edge(0.01, 55.5),
      ],
      { east: 0, north: 0 },
      10,
    )!;
    expect(long[10]! / long[55]! / 2000).toBeCloseTo(1, 1);
  });

  test('no edge, or none of any length: null', () => {
    expect(shares([])).toBeNull();
    expect(shares([[1, 2, 1, 2]])).toBeNull();
  });
});

import { describe, expect, test } from 'vitest';
import { alignPlanar } from '../../src/geometry/alignment-2d.js';
import { type AlignmentKind, alignPoints } from '../../src/geometry/umeyama.js';
import { randomStream } from '../../src/stats/random.js';

const DEG = Math.PI / 180;

function normals(n: number, label: string): Float64Array {
  const random = randomStream(1, label);
  return Float64Array.from({ length: n }, () => random.normal());
}

/** Rotation by `angle` about (1, 2, 3), row-major (Rodrigues). */
function turnAbout123(angle: number): number[] {
  const [x, y, z] = [1, 2, 3].map((v) => v / Math.sqrt(14)) as [number, number, number];
  const [s, c] = [Math.sin(angle), Math.cos(angle)];
  const k = 1 - c;
  return [
    ...[c + x * x * k, x * y * k - z * s, x * z * k + y * s],
    ...[y * x * k + z * s, c + y * y * k, y * z * k - x * s],
    ...[z * x * k - y * s, z * y * k + x * s, c + z * z * k],
  ];
}

function moved(points: Float64Array, r: number[], scale: number, shift: number[]): Float64Array {
  return points.map((_, at) => {
    const row = at % 3;
    const from = at - row;
    const turned = [0, 1, 2].reduce((sum, c) => sum + r[3 * row + c]! * points[from + c]!, 0);
    return scale * turned + shift[row]!;
  });
}

describe('alignPoints', () => {
  test.each<[AlignmentKind, number, number[]]>([
    ['rotation', 1, [0, 0, 0]],
    ['rigid', 1, [100, -20, 3]],
    ['similarity', 1.7, [100, -20, 3]],
  ])('finds an exact %s in space', (kind, scale, shift) => {
    const source = normals(30, 'space');
    const r = turnAbout123(2);
    const a = alignPoints(source, moved(source, r, scale, shift), 3, kind);
    r.forEach((value, k) => {
      expect(a.rotation[k]).toBeCloseTo(value, 12);
    });
    shift.forEach((value, k) => {
      expect(a.translation[k]).toBeCloseTo(value, 11);
    });
    expect(a.scale).toBeCloseTo(scale, 12);
    // Tolerance: the square of the misfit is a difference of numbers of size 10, the root of its rounding.
    expect(a.rmse).toBeLessThan(2e-7);
  });

  test('stays a rotation where a mirror would fit', () => {
    const source = normals(30, 'mirror');
    const mirrored = source.map((v, at) => (at % 3 === 2 ? -v : v));
    const { rotation: r } = alignPoints(source, mirrored, 3);
    const determinant =
      r[0]! * (r[4]! * r[8]! - r[5]! * r[7]!) -
      r[1]! * (r[3]! * r[8]! - r[5]! * r[6]!) +
      r[2]! * (r[3]! * r[7]! - r[4]! * r[6]!);
    expect(determinant).toBeCloseTo(1, 12);
  });

  test('points in a plane fix a rotation in space', () => {
    const source = normals(30, 'flat').map((v, at) => (at % 3 === 2 ? 0 : v));
    const r = turnAbout123(-1);
    const a = alignPoints(source, moved(source, r, 1, [1, 2, 3]), 3);
    r.forEach((value, k) => {
      expect(a.rotation[k]).toBeCloseTo(value, 12);
    });
  });

  test('in the plane it is alignPlanar', () => {
    const source = normals(20, 'plane');
    const target = source.map((v, at) => 2 * v + Math.sin(at));
    const pick = (points: Float64Array, k: number) => points.filter((_, at) => at % 2 === k);
    for (const kind of ['rotation', 'rigid', 'similarity'] as const) {
      const a = alignPoints(source, target, 2, kind);
      const b = alignPlanar(pick(source, 0), pick(source, 1), pick(target, 0), pick(target, 1), kind);
      expect(Math.atan2(a.rotation[1]!, a.rotation[0]!)).toBeCloseTo(b.turnRad, 12);
      expect(a.scale).toBeCloseTo(b.scale, 12);
      expect(a.translation[0]).toBeCloseTo(b.eastM, 12);
      expect(a.translation[1]).toBeCloseTo(b.northM, 12);
      expect(a.rmse).toBeCloseTo(b.rmseM, 12);
    }
  });

  test('refusals', () => {
    expect(() => alignPoints(new Float64Array(5), new Float64Array(5), 2)).toThrow(
      'alignPoints: needs two lists of points of 2 coordinates, as many in each, got 5 and 5 numbers',
    );
    expect(() => alignPoints(new Float64Array(2), new Float64Array(2), 2)).toThrow(
      'alignPoints: rigid needs at least 2 points, got 1',
    );
    expect(() => alignPoints(Float64Array.of(0, 0, 1, Number.NaN), new Float64Array(4), 2)).toThrow(
      'alignPoints: point 1 is not finite',
    );
    expect(() => alignPoints(new Float64Array(6), new Float64Array(6), 2)).toThrow(
      'alignPoints: the 3 points do not fix a rotation; they must not all lie in one place',
    );
    const line = Float64Array.of(0, 0, 0, 1, 1, 1, 2, 2, 2);
    expect(() => alignPoints(line, line, 3)).toThrow(
      'alignPoints: the 3 points do not fix a rotation; they must not all lie in one place or on one line',
    );
  });
});

describe('alignPlanar', () => {
  const east = [0, 10, 10, 3];
  const north = [0, 0, 5, 8];
  const turned = (angle: number, scale = 1, e = 0, n = 0) => ({
    east: east.map((x, i) => e + scale * (Math.cos(angle) * x + Math.sin(angle) * north[i]!)),
    north: east.map((x, i) => n + scale * (Math.cos(angle) * north[i]! - Math.sin(angle) * x)),
  });

  test('a quarter turn clockwise takes north to east', () => {
    expect(alignPlanar([0], [1], [1], [0], 'rotation').turnRad).toBeCloseTo(90 * DEG, 14);
  });

  test('finds turn, scale and shift exactly', () => {
    const t = turned(-130 * DEG, 1.2, 5, -7);
    const a = alignPlanar(east, north, t.east, t.north, 'similarity');
    expect(a.turnRad).toBeCloseTo(-130 * DEG, 13);
    expect(a.scale).toBeCloseTo(1.2, 13);
    expect(a.eastM).toBeCloseTo(5, 12);
    expect(a.northM).toBeCloseTo(-7, 12);
  });

  test('a point without weight does not count', () => {
    const t = turned(20 * DEG);
    t.east[2] = 1000;
    const a = alignPlanar(east, north, t.east, t.north, 'rigid', [1, 2, 0, 1]);
    expect(a.turnRad).toBeCloseTo(20 * DEG, 13);
    expect(a.rmseM).toBeLessThan(1e-6);
  });

  test('refusals', () => {
    expect(() => alignPlanar([1, 2], [1], [1, 2], [1, 2])).toThrow(
      'alignPlanar: all inputs need 2 values, one has 1',
    );
    expect(() => alignPlanar([], [], [], [])).toThrow('alignPlanar: rigid needs at least 2 points, got 0');
    expect(() => alignPlanar([1, Number.NaN], [1, 1], [1, 1], [1, 1])).toThrow(
      'alignPlanar: point 1 is not finite',
    );
    expect(() => alignPlanar([1, 1], [1, 1], [1, 2], [1, 1])).toThrow(
      'alignPlanar: the 2 points do not fix a direction; they must not all lie in one place',
    );
    expect(() => alignPlanar([1, 2], [1, 1], [1, 2], [1, 1], 'rigid', [0, 0])).toThrow(
      'alignPlanar: the weights are all 0',
    );
  });
});

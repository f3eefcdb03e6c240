import { Corner } from './corner.js';
import type { Jet } from './jet.js';
import type { Curve2 } from './smooth-step.js';

/** A polyline's vertex. */
export interface RoutePoint {
  eastM: number;
  northM: number;
}

/** A straight piece or a corner, where it begins along the curve, and its start and direction. */
interface Piece {
  startM: number;
  lengthM: number;
  eastM: number;
  northM: number;
  headingRad: number;
  corner: Corner | null;
}

/**
 * How long a corner is: more the more it turns, two to three steps for a right angle. Its first and last
 * sixth are nearly straight.
 */
const SHORTEST_CORNER_M = 0.9;
const CORNER_M_PER_RAD = 1.35;
const LONGEST_CORNER_M = 4.4;

/**
 * The smooth curve that a walker follows along a polyline, by arc length.
 *
 * Straight along the legs, with corners that pass through the vertices; heading, curvature and its
 * slope are continuous.
 *
 * @param points - at least 2, neighbours apart; headings are clockwise from north.
 */
export class RouteCurve {
  readonly lengthM: number;
  /** Where along the curve each vertex lies. */
  readonly vertexM: readonly number[];
  readonly #pieces: Piece[] = [];
  readonly #curve: Curve2 = [0, 0, 0];
  readonly #offset: [number, number] = [0, 0];

  constructor(points: readonly RoutePoint[]) {
    const legs = points.slice(1).map((point, i) => {
      const east = point.eastM - points[i]!.eastM;
      const north = point.northM - points[i]!.northM;
      return { lengthM: Math.hypot(east, north), headingRad: Math.atan2(east, north) };
    });
    let headingRad = legs[0]!.headingRad;
    const corners = legs.slice(1).map((leg, i) => {
      const turn = leg.headingRad - legs[i]!.headingRad;
      const turnRad = turn - 2 * Math.PI * Math.ceil(turn / (2 * Math.PI) - 0.5);
      const wanted = Math.min(LONGEST_CORNER_M, SHORTEST_CORNER_M + CORNER_M_PER_RAD * Math.abs(turnRad));
      return new Corner(turnRad, Math.min(wanted, 0.98 * legs[i]!.lengthM, 0.98 * leg.lengthM));
    });
    let atM = 0;
    const vertexM = [0];
    const add = (lengthM: number, eastM: number, northM: number, corner: Corner | null) => {
      this.#pieces.push({ startM: atM, lengthM, eastM, northM, headingRad, corner });
      atM += lengthM;
    };
    for (let i = 0; i < legs.length; i++) {
      const before = i === 0 ? 0 : corners[i - 1]!.reachM;
      const after = i === corners.length ? 0 : corners[i]!.reachM;
      const [sin, cos] = [Math.sin(headingRad), Math.cos(headingRad)];
      const { eastM, northM } = points[i]!;
      const straightM = legs[i]!.lengthM - before - after;
      add(straightM, eastM + sin * before, northM + cos * before, null);
      const corner = corners[i];
      if (!corner) break;
      const toCorner = legs[i]!.lengthM - after;
      vertexM.push(atM + corner.lengthM / 2);
      add(corner.lengthM, eastM + sin * toCorner, northM + cos * toCorner, corner);
      headingRad += corner.turnRad;
    }
    this.lengthM = atM;
    this.vertexM = [...vertexM, atM];
  }

  /** The piece that holds arc length s. */
  #pieceAt(s: number): Piece {
    let low = 0;
    let high = this.#pieces.length;
    while (high - low > 1) {
      const middle = (low + high) >> 1;
      if (this.#pieces[middle]!.startM <= s) low = middle;
      else high = middle;
    }
    return this.#pieces[low]!;
  }

  /** Position, heading, curvature (rad/m) and its slope (rad/m²) at arc length s. */
  at(s: number, out: Float64Array): void {
    const piece = this.#pieceAt(s);
    const along = s - piece.startM;
    let right = 0;
    let forward = along;
    this.#curve.fill(0);
    if (piece.corner) {
      const u = along / piece.lengthM;
      piece.corner.heading(u, this.#curve);
      piece.corner.position(u, this.#offset);
      [right, forward] = this.#offset;
    }
    const sin = Math.sin(piece.headingRad);
    const cos = Math.cos(piece.headingRad);
    out[0] = piece.eastM + sin * forward + cos * right;
    out[1] = piece.northM + cos * forward - sin * right;
    out[2] = piece.headingRad + this.#curve[0];
    out[3] = this.#curve[1];
    out[4] = this.#curve[2];
  }

  /** Position and heading (unwrapped) as functions of time, where arc length is one. */
  follow(s: Jet, east: Jet, north: Jet, heading: Jet): void {
    const at = new Float64Array(5);
    for (let i = 0; i < s.v.length; i++) {
      this.at(s.v[i]!, at);
      const speed = s.d[i]!;
      const sin = Math.sin(at[2]!);
      const cos = Math.cos(at[2]!);
      east.v[i] = at[0]!;
      north.v[i] = at[1]!;
      heading.v[i] = at[2]!;
      east.d[i] = sin * speed;
      north.d[i] = cos * speed;
      heading.d[i] = at[3]! * speed;
      east.dd[i] = sin * s.dd[i]! + cos * at[3]! * speed * speed;
      north.dd[i] = cos * s.dd[i]! - sin * at[3]! * speed * speed;
      heading.dd[i] = at[3]! * s.dd[i]! + at[4]! * speed * speed;
    }
  }
}

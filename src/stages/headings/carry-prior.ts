/** What a way of carrying tells of the walking direction against the device's, before any motion is seen. */
export interface CarryPrior {
  /** Directions that the offset is near to, rad, each as likely as the other. */
  near: readonly number[];
  /** Spread around them, rad. */
  sdRad: number;
  /** Probability that it is none of them, and anything. */
  openShare: number;
  /** How far the axis of motion may lie off the walking direction for the whole spell, rad. */
  axisSdRad: number;
  /** Random walk of the offset, rad per square root of a step: hands drift, pockets slip, belts do neither. */
  walkRad: number;
}

const RAD = Math.PI / 180;

/**
 * In the hand the phone is looked at: its top points ahead. On chest or belt either side of it faces ahead. In a hanging
 * hand the top points roughly ahead. In pocket and bag it may lie in any way.
 *
 * Spreads are common practice, no source, but for the axis: it follows the walking direction within some degrees
 * where trunk or thigh carry the phone (Steinhoff & Schiele (2010), PerCom, 162-170, on trouser pockets, from memory), while a
 * hand in front moves along its forearm, 15 degrees off in 48 recorded walks.
 */
const BY_CARRY: Readonly<Record<string, CarryPrior>> = {
  hand: { near: [0], sdRad: 5 * RAD, openShare: 0.02, axisSdRad: 15 * RAD, walkRad: 0.4 * RAD },
  swing: { near: [0], sdRad: 20 * RAD, openShare: 0.2, axisSdRad: 5 * RAD, walkRad: 0.15 * RAD },
  chest: { near: [0, Math.PI], sdRad: 7 * RAD, openShare: 0.05, axisSdRad: 5 * RAD, walkRad: 0.1 * RAD },
  waist: { near: [0, Math.PI], sdRad: 10 * RAD, openShare: 0.05, axisSdRad: 5 * RAD, walkRad: 0.06 * RAD },
};

/** Any direction. */
const OPEN: CarryPrior = { near: [], sdRad: Math.PI, openShare: 1, axisSdRad: 5 * RAD, walkRad: 0.12 * RAD };

/** Flat enough to be read: screen up, level across. The face's tilt alone tells a phone in use from one put away. */
const HELD_TOP_UP: readonly [number, number] = [Math.sin(-15 * RAD), Math.sin(65 * RAD)];
const HELD_ACROSS = Math.sin(25 * RAD);

/**
 * The prior for a spell.
 *
 * @param carry - as the campaign names it, for the spell that the walk begins with; null where that is not known.
 * @param up - up in the device frame, unit length: how the phone lies.
 */
export function carryPrior(carry: string | null, up: readonly [number, number, number]): CarryPrior {
  const named = carry === null ? undefined : BY_CARRY[carry];
  if (named) return named;
  // A word that is not ours, or pocket and bag: only how the phone lies where no word is given.
  if (carry !== null) return OPEN;
  const [across, top, screen] = up;
  const isHeld = screen > 0 && Math.abs(across) < HELD_ACROSS && top > HELD_TOP_UP[0] && top < HELD_TOP_UP[1];
  return isHeld ? { ...BY_CARRY.hand!, openShare: 0.2 } : OPEN;
}

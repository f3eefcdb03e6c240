import type { RandomStream } from '../stats/random.js';
import { QuinticSpline } from './quintic-spline.js';
import type { Bout, Contact } from './timeline.js';
import type { WalkerModel } from './walker-model.js';

/** From the last contact until the body stands, s, and the part of a step that it still sways forward. From memory. */
const SETTLE_S = 0.4;
const SETTLE_PART = 0.05;

/**
 * Parts of a full step in the first two steps and the last: the body stands over both feet, so the
 * first step carries it half as far as those that follow; the foot that stops comes down beside the
 * other. After Winter (1995), Gait & Posture 3, 193-214, on initiation and termination (from memory).
 */
const FIRST_PARTS = [
  { length: 0.5, time: 1.25 },
  { length: 0.9, time: 1.04 },
] as const;
const LAST_PART = { length: 0.5, time: 1.05 };

/**
 * Steps from standing to standing over a given distance.
 *
 * Step lengths are scaled together so that they fill the distance exactly: at most half a step in all.
 *
 * @param fromM - where along the path the bout begins; `toM` where it ends, above `fromM`.
 * @param speedFactor - of the preferred speed, wanted at a place along the path, above 0.
 */
export function walkBout(
  walker: WalkerModel,
  startS: number,
  fromM: number,
  toM: number,
  speedFactor: (alongM: number) => number,
  random: RandomStream,
): Bout {
  const distanceM = toM - fromM;
  const firstFoot = random.uniform() < 0.5 ? 0 : 1;
  const lengths: number[] = [];
  const seconds: number[] = [];
  let walkedM = 0;
  for (;;) {
    const k = lengths.length;
    // The walk ratio, length over cadence, keeps when speed changes: Sekiya & Nagasaki (1998), Gait & Posture 7, 225-227.
    const root = Math.sqrt(speedFactor(fromM + walkedM));
    const side = (firstFoot + k) % 2 === 0 ? 1 : -1;
    const uneven = 1 + side * walker.asymmetry;
    // Bounded: a step of a tenth of the length or none at all is a stop, not a step.
    const full =
      walker.stepLengthM * root * uneven * Math.max(0.3, 1 + walker.lengthVariability * random.normal());
    const time =
      (uneven / (walker.cadenceHz * root)) * Math.max(0.5, 1 + walker.timeVariability * random.normal());
    const begun = FIRST_PARTS[k] ?? { length: 1, time: 1 };
    const isLast = walkedM + full * begun.length + (LAST_PART.length / 2) * full > distanceM && k > 0;
    const part = isLast ? LAST_PART : begun;
    lengths.push(full * part.length);
    seconds.push(time * part.time);
    walkedM += full * part.length;
    if (isLast) break;
  }
  const scale = distanceM / walkedM;
  const settleM = SETTLE_PART * lengths.at(-1)! * scale;
  let alongM = fromM;
  let tS = startS;
  const contacts = lengths.map((length, k): Contact => {
    const lengthM = length * scale - (k === lengths.length - 1 ? settleM : 0);
    alongM += lengthM;
    tS += seconds[k]!;
    return { tS, foot: (firstFoot + k) % 2 === 0 ? 'left' : 'right', lengthM, alongM };
  });
  return boutOf(walker, startS, tS + SETTLE_S, fromM, toM, firstFoot, contacts);
}

function boutOf(
  walker: WalkerModel,
  startS: number,
  endS: number,
  fromM: number,
  toM: number,
  firstFoot: number,
  contacts: readonly Contact[],
): Bout {
  const knots = [startS, ...contacts.map(({ tS }) => tS), endS];
  const along = [fromM, ...contacts.map(({ alongM }) => alongM), toM];
  const rate = walker.cadenceHz;
  const phase = [
    firstFoot - rate * (contacts[0]!.tS - startS),
    ...contacts.map((_, k) => firstFoot + k),
    firstFoot + contacts.length - 1 + rate * (endS - contacts.at(-1)!.tS),
  ];
  const lift = [0, ...contacts.map(({ lengthM }) => liftM(walker, lengthM)), 0];
  return {
    startS,
    endS,
    contacts,
    along: new QuinticSpline(knots, along),
    phase: new QuinticSpline(knots, phase, { slope: [rate, rate] }),
    lift: new QuinticSpline(knots, lift),
  };
}

/**
 * Half the rise and fall of the body over a step: a part of that of a rigid leg swinging over its foot.
 *
 * @see Gard, Miff & Kuo (2004), Human Movement Science 22, 597-610 (the pendulum overstates the rise).
 */
export function liftM(walker: WalkerModel, stepLengthM: number): number {
  const half = Math.min(stepLengthM / 2, 0.9 * walker.legM);
  return (walker.bounce / 2) * (walker.legM - Math.sqrt(walker.legM ** 2 - half ** 2));
}

import { fromMatrix, multiply, type Quaternion } from '../geometry/quaternion.js';
import type { RandomStream } from '../stats/random.js';
import type { CarryPose } from './carry-pose.js';
import type { GaitMotion } from './gait-motion.js';
import { addProduct, combine, constantJet, cosine, type Jet, sine } from './jet.js';
import type { WalkerModel } from './walker-model.js';

export const CARRY_NAMES = [
  'hand',
  'swing',
  'pocket',
  'front-pocket',
  'back-pocket',
  'bag',
  'chest',
  'waist',
] as const;
export type CarryName = (typeof CARRY_NAMES)[number];

/** What a carry's motion is made of. */
export interface CarryInputs {
  walker: WalkerModel;
  gait: GaitMotion;
  /** Steps taken, whole at each contact, even at the left foot's. */
  phase: Jet;
  /** 0 while standing, about 1 for steps of three quarters of a leg. */
  vigour: Jet;
}

/** How one walk's phone sits in its carry; the same through the walk. */
export interface Mounting {
  base: Quaternion;
  yawRad: number;
  pitchRad: number;
  rollRad: number;
}

interface Carry {
  /** Standard deviation of the slow wander of each angle, rad: hands drift, a belt does not. */
  wanderRad: number;
  mount(random: RandomStream): Mounting;
  pose(inputs: CarryInputs, mounting: Mounting): CarryPose;
}

const RAD = Math.PI / 180;

/** Device axes as columns in the walker's frame (right, forward, up). */
const FLAT: Quaternion = [1, 0, 0, 0];
/** Top forward, screen to the left: in the hanging right hand. */
const EDGEWISE = fromMatrix([0, 0, -1, 0, 1, 0, 1, 0, 0]);
/** Top up, screen forward. */
const UPRIGHT_OUT = fromMatrix([-1, 0, 0, 0, 0, 1, 0, 1, 0]);
/** Half turns about the device's own axes, for a phone put away upside down or screen inward. */
const HALF_TURNS: readonly Quaternion[] = [
  [1, 0, 0, 0],
  [0, 0, 0, 1],
  [0, 0, 1, 0],
  [0, 1, 0, 0],
];

function mounting(
  base: Quaternion,
  random: RandomStream,
  sdDeg: [number, number, number],
  tiltDeg = 0,
): Mounting {
  return {
    base,
    yawRad: sdDeg[0] * RAD * random.normal(),
    pitchRad: (tiltDeg + sdDeg[1] * random.normal()) * RAD,
    rollRad: sdDeg[2] * RAD * random.normal(),
  };
}

/** offset + vigour times amplitude times a sine of the phase, `timesPi` half turns a step. */
function beat(inputs: CarryInputs, offset: number, amplitude: number, timesPi: number, at: number): Jet {
  const wave = sine(inputs.phase, Math.PI * timesPi, -Math.PI * timesPi * at + Math.PI / 2);
  return addProduct(constantJet(wave.v.length, offset), amplitude, inputs.vigour, wave);
}

/** Fixed to the trunk at a place (m), following the pelvis by `share` and the heel strike's jolt by `jolt`. */
function onTrunk(
  inputs: CarryInputs,
  place: [number, number, number],
  share: number,
  jolt: number,
): Pick<CarryPose, 'right' | 'forward' | 'up'> {
  const { gait } = inputs;
  return {
    right: combine(place[0], share, gait.right),
    forward: combine(place[1], share, gait.forward),
    up: combine(place[2], share, gait.up, jolt, gait.jolt),
  };
}

/** On a limb that swings about the right axis by `angle`: from the joint at `joint`, at `forward` and `down` when it hangs. */
function onLimb(
  inputs: CarryInputs,
  angle: Jet,
  joint: [number, number, number],
  forward: number,
  down: number,
  jolt: number,
): Pick<CarryPose, 'right' | 'forward' | 'up'> {
  const { gait } = inputs;
  const [s, c] = [sine(angle), cosine(angle)];
  return {
    right: combine(joint[0], 1, gait.right),
    forward: combine(joint[1], 1, gait.forward, 1, combine(0, forward, c, down, s)),
    up: combine(joint[2], 1, combine(0, 1, gait.up, jolt, gait.jolt), 1, combine(0, forward, s, -down, c)),
  };
}

/** Thigh of the right leg: foremost as its foot comes down (odd phase), with the quicker forward swing. */
function thighAngle(inputs: CarryInputs, share: number): Jet {
  const first = beat(inputs, 4 * RAD, -20 * RAD * share, 1, 0.1);
  const second = beat(inputs, 0, 4 * RAD * share, 2, 0.25);
  return combine(0, 1, first, 1, second);
}

function pocket(inputs: CarryInputs, mount: Mounting, side: 'front' | 'back'): CarryPose {
  const { heightM } = inputs.walker;
  const share = side === 'front' ? 1 : 0.55;
  const angle = thighAngle(inputs, share);
  return {
    ...(side === 'front'
      ? onLimb(inputs, angle, [0.06 * heightM, 0, -0.02 * heightM], 0.05 * heightM, 0.1 * heightM, 2.2)
      : onLimb(inputs, angle, [0.05 * heightM, 0, 0], -0.07 * heightM, 0.02 * heightM, 1.8)),
    yaw: beat(inputs, mount.yawRad, 5 * RAD, 1, 0.2),
    pitch: combine(mount.pitchRad, 1, angle),
    roll: beat(inputs, mount.rollRad, 4 * RAD, 1, 0.5),
    base: mount.base,
  };
}

/**
 * The carries, all on the right side.
 *
 * Amplitudes are those of a comfortable pace: arm swing 20 degrees to each side and thigh from 25 to -15
 * degrees (Winter 2009; Murray, Drought & Kory 1964), pelvis 4 degrees about up and 3 about forward;
 * mounting spreads, the bag's pendulum, the hand's damping and the part of the heel strike's jolt that
 * reaches the phone (more at the thigh, less in the hand) are common practice, no source.
 */
export const CARRIES: Readonly<Record<CarryName, Carry>> = {
  hand: {
    wanderRad: 1.2 * RAD,
    mount: (random) => mounting(FLAT, random, [4, 5, 3], 35),
    // The arm takes up a part of the trunk's motion.
    pose: (inputs, mount) => ({
      ...onTrunk(inputs, [0.03, 0.32, 0.14 * inputs.walker.heightM], 0.9, 0.5),
      yaw: beat(inputs, mount.yawRad, 1.5 * RAD, 1, 0.3),
      pitch: beat(inputs, mount.pitchRad, 1.2 * RAD, 2, 0.2),
      roll: beat(inputs, mount.rollRad, 1 * RAD, 1, 0.6),
      base: mount.base,
    }),
  },
  swing: {
    wanderRad: 2 * RAD,
    mount: (random) => mounting(EDGEWISE, random, [12, 8, 8]),
    pose: (inputs, mount) => {
      const { heightM } = inputs.walker;
      // Right arm forward with the left leg (even phase); the second harmonic: the elbow bends in front.
      const arm = combine(
        0,
        1,
        beat(inputs, 4 * RAD, 20 * RAD, 1, 0.05),
        1,
        beat(inputs, 0, 1 * RAD, 2, 0.05),
      );
      return {
        ...onLimb(inputs, arm, [0.13 * heightM, 0, 0.29 * heightM], 0, 0.38 * heightM, 0.4),
        yaw: beat(inputs, mount.yawRad, 6 * RAD, 1, 0.15),
        pitch: combine(mount.pitchRad, 1.15, arm),
        roll: beat(inputs, mount.rollRad, 5 * RAD, 1, 0.3),
        base: mount.base,
      };
    },
  },
  pocket: frontPocket(),
  'front-pocket': frontPocket(),
  'back-pocket': {
    wanderRad: 0.4 * RAD,
    mount: (random) => mounting(multiply(UPRIGHT_OUT, HALF_TURNS[random.integer(0, 4)]!), random, [12, 6, 8]),
    pose: (inputs, mount) => pocket(inputs, mount, 'back'),
  },
  bag: {
    wanderRad: 1 * RAD,
    mount: (random) =>
      mounting(multiply(UPRIGHT_OUT, HALF_TURNS[random.integer(0, 4)]!), random, [40, 12, 15]),
    pose: (inputs, mount) => {
      const swing = combine(0, 1, beat(inputs, 0, 5 * RAD, 2, 0.45), 1, beat(inputs, 0, 3 * RAD, 1, 0.3));
      const { heightM } = inputs.walker;
      return {
        // Hangs from the shoulder.
        ...onLimb(inputs, swing, [0.15 * heightM, -0.03, 0.3 * heightM], 0, 0.35 * heightM, 1.2),
        yaw: beat(inputs, mount.yawRad, 5 * RAD, 1, 0.4),
        pitch: combine(mount.pitchRad, 1, swing),
        roll: beat(inputs, mount.rollRad, 4 * RAD, 1, 0.2),
        base: mount.base,
      };
    },
  },
  chest: {
    wanderRad: 0.4 * RAD,
    mount: (random) => mounting(UPRIGHT_OUT, random, [5, 4, 4], 8),
    pose: (inputs, mount) => ({
      ...onTrunk(inputs, [0, 0.13, 0.2 * inputs.walker.heightM], 0.95, 0.8),
      // The shoulders turn against the pelvis.
      yaw: beat(inputs, mount.yawRad, -3 * RAD, 1, 0.1),
      pitch: beat(inputs, mount.pitchRad, 1.5 * RAD, 2, 0.1),
      roll: beat(inputs, mount.rollRad, 1.2 * RAD, 1, 0.5),
      base: mount.base,
    }),
  },
  waist: {
    wanderRad: 0.3 * RAD,
    mount: (random) => mounting(UPRIGHT_OUT, random, [8, 4, 4]),
    pose: (inputs, mount) => ({
      ...onTrunk(inputs, [0.08, 0.13, 0.02], 1, 1),
      yaw: beat(inputs, mount.yawRad, 4 * RAD, 1, 0),
      pitch: beat(inputs, mount.pitchRad, 1.5 * RAD, 2, 0.1),
      roll: beat(inputs, mount.rollRad, 3 * RAD, 1, 0.5),
      base: mount.base,
    }),
  },
};

function frontPocket(): Carry {
  return {
    wanderRad: 0.5 * RAD,
    mount: (random) =>
      mounting(multiply(UPRIGHT_OUT, HALF_TURNS[random.integer(0, 4)]!), random, [15, 8, 10]),
    pose: (inputs, mount) => pocket(inputs, mount, 'front'),
  };
}

import type { Phasor, StrideMotion } from './stride-motion.js';

/**
 * What motion says of the walking direction in one spell, as logarithms of likelihood: for a direction p from the
 * device's, step k adds axisCos cos 2p + axisSin sin 2p + senseCos cos p + senseSin sin p.
 */
export interface MotionEvidence {
  axisCos: Float64Array;
  axisSin: Float64Array;
  senseCos: Float64Array;
  senseSin: Float64Array;
}

/**
 * Forward acceleration leads the vertical one at the step rate: 56 to 113 degrees in trouser pockets, 15 to 80 in the
 * hand, about 105 at the trunk (Zijlstra & Hof (1997), Gait & Posture 5, 249-262: a quarter of the step). The first two
 * ranges are of 38 and 48 recorded walks, sense by the start from standing and by the screen's top.
 */
const LEAD_RAD = Math.PI / 2;

/** Half the logarithm of the odds for the sense that a spell's motion can give: 98 of 100. */
const SENSE = 2;

/** A limb swings the phone where the motion at the stride rate outdoes that at the step rate by this. */
const SWINGING = 1.5;

/** Fewer strides than this tell no direction. */
const LEAST_STRIDES = 4;

/**
 * Axis: where the horizontal motion at the step rate is strongest. Each stride counts by its own scatter, and all of a
 * spell together no more than `axisSdRad` allows: that error is the same in every step.
 *
 * Sense: by the lead of the forward acceleration on the vertical one; where a limb swings the phone, by its being
 * higher in front than behind, since elbow and hip bend forward.
 *
 * @param strides - of the whole walk; the spell is [from, to).
 * @param axisSdRad - standard deviation of the spell's axis against the walking direction, rad.
 * @see Kunze, Lukowicz, Partridge & Begole (2009), ISWC, 103-106 (principal axis and its sense by the vertical).
 */
export function motionEvidence(
  strides: readonly (StrideMotion | null)[],
  from: number,
  to: number,
  axisSdRad: number,
): MotionEvidence {
  const n = to - from;
  const out = {
    axisCos: new Float64Array(n),
    axisSin: new Float64Array(n),
    senseCos: new Float64Array(n),
    senseSin: new Float64Array(n),
  };
  // The strides next to a change of carry have the handling in them.
  const used = (k: number) => (k >= (from > 0 ? from + 2 : from) && k < to - 2 ? strides[k] : null);
  const total = { cos: 0, sin: 0, power: 0, up: 0, strideAcross: 0, strideAlong: 0, strideUp: 0, count: 0 };
  for (let k = from; k < to; k++) {
    const s = used(k);
    if (!s) continue;
    total.cos += power(s.along) - power(s.right);
    total.sin += 2 * product(s.right, s.along);
    total.power += power(s.along) + power(s.right);
    total.up += power(s.up);
    total.strideAlong += power(s.strideAlong) + power(s.strideRight);
    total.strideUp += power(s.strideUp);
    total.count++;
  }
  const { count } = total;
  const length = Math.hypot(total.cos, total.sin);
  if (count < LEAST_STRIDES || !(length > 0 && total.up > 0)) return out;
  // Motion across the axis against motion along it is the square of one stride's scatter in direction; strides
  // overlap by half.
  const scatter2 = (total.power - length) / (total.power + length);
  const variance = 2 * scatter2 + axisSdRad * axisSdRad * count;
  const perPower = count / (length * 4 * variance);
  const swings = total.strideAlong > SWINGING ** 2 * total.power;
  const sense = swings
    ? SENSE / Math.sqrt(total.strideAlong * total.strideUp)
    : SENSE / Math.sqrt(total.power * total.up);
  for (let k = from; k < to; k++) {
    const s = used(k);
    if (!s) continue;
    // A stumble or a turn about must not count for many strides.
    const own = power(s.along) + power(s.right);
    const trust = Math.min(1, (2 * total.power) / count / own);
    out.axisCos[k - from] = trust * perPower * (power(s.along) - power(s.right));
    out.axisSin[k - from] = trust * perPower * 2 * product(s.right, s.along);
    out.senseCos[k - from] = sense * (swings ? product(s.strideAlong, s.strideUp) : ahead(s.along, s.up));
    out.senseSin[k - from] = sense * (swings ? product(s.strideRight, s.strideUp) : ahead(s.right, s.up));
  }
  return out;
}

function power(a: Phasor): number {
  return a[0] * a[0] + a[1] * a[1];
}

/** Part of a in phase with b, times b's amplitude. */
function product(a: Phasor, b: Phasor): number {
  return a[0] * b[0] + a[1] * b[1];
}

/** Part of a that leads b by the usual lead, times b's amplitude. */
function ahead(a: Phasor, b: Phasor): number {
  return Math.cos(LEAD_RAD) * product(a, b) + Math.sin(LEAD_RAD) * (a[1] * b[0] - a[0] * b[1]);
}

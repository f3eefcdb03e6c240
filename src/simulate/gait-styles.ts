/** How a walker walks, against the norm of age and sex. */
export interface GaitStyle {
  /** Factor on the norm's cadence. */
  cadence: number;
  /** Factor on the norm's step length. */
  stepLength: number;
  /** Step-to-step standard deviation of a step's time, part of the time. */
  timeVariability: number;
  /** Step-to-step standard deviation of a step's length, part of the length. */
  lengthVariability: number;
  /** Left steps are longer by this part and right ones shorter, in length and in time. */
  asymmetry: number;
  /** Rise and fall of the body, as a part of that of a rigid inverted pendulum. */
  bounce: number;
  /** Acceleration peak of the heel strike at the pelvis, m/s². */
  heelStrikeMps2: number;
}

export const STYLE_NAMES = ['normal', 'child', 'aid', 'shuffling', 'impaired'] as const;
export type StyleName = (typeof STYLE_NAMES)[number];

/**
 * normal: 2 % and 3 % step-to-step variability, after the stride-time CV of 1.94 % of the controls of
 * Frenkel-Toledo et al. (2005) and the step-length variability of 2.0 cm of Brown et al. (2015); bounce
 * such that the pelvis moves 3.5 to 4 cm at 1.35 m/s.
 * aid (walking frame): speed 1.24 to 1.21 m/s, stride time 1.08 to 1.10 s, stride kept: Frenkel-Toledo
 * et al. (2005), J. NeuroEng. Rehabil. 2, 23, table 2, controls. Bounce from memory.
 * shuffling: short quick steps with little lift, variability above the patients' CV of 2.24 % there;
 * impaired: slow, uneven, below 0.4 m/s, the household ambulation class. Both otherwise common
 * practice, no source.
 */
export const GAIT_STYLES: Readonly<Record<StyleName, GaitStyle>> = {
  normal: {
    cadence: 1,
    stepLength: 1,
    timeVariability: 0.02,
    lengthVariability: 0.03,
    asymmetry: 0.01,
    bounce: 0.55,
    heelStrikeMps2: 2.5,
  },
  child: {
    cadence: 1,
    stepLength: 1,
    timeVariability: 0.05,
    lengthVariability: 0.07,
    asymmetry: 0.015,
    bounce: 0.55,
    heelStrikeMps2: 2,
  },
  aid: {
    cadence: 1.08 / 1.1,
    stepLength: 1,
    timeVariability: 0.025,
    lengthVariability: 0.04,
    asymmetry: 0.02,
    bounce: 0.4,
    heelStrikeMps2: 1,
  },
  shuffling: {
    cadence: 1.05,
    stepLength: 0.5,
    timeVariability: 0.045,
    lengthVariability: 0.08,
    asymmetry: 0.03,
    bounce: 0.5,
    heelStrikeMps2: 0.4,
  },
  impaired: {
    cadence: 0.42,
    stepLength: 0.6,
    timeVariability: 0.07,
    lengthVariability: 0.1,
    asymmetry: 0.12,
    bounce: 0.5,
    heelStrikeMps2: 0.4,
  },
};

import { randomStream } from '../stats/random.js';
import { gaitNorm, type Sex } from './gait-norms.js';
import { GAIT_STYLES, type GaitStyle } from './gait-styles.js';
import type { GroupPlan, WalkerPlan } from './plan-schema.js';

/** One walker's body and gait. */
export interface WalkerModel extends Omit<GaitStyle, 'cadence' | 'stepLength'> {
  walker: string;
  group: string;
  sex: Sex;
  age: number;
  heightM: number;
  legM: number;
  massKg: number;
  /** Preferred. */
  cadenceHz: number;
  stepLengthM: number;
}

/** Height of the hip joint, part of the body height. Winter (2009), Biomechanics and Motor Control, fig. 4.1. */
const LEG_PER_HEIGHT = 0.53;

/** Spread of step length between people of one height: with that of height, about the 7 % of Öberg et al. (1993). */
const STEP_LENGTH_CV = 0.055;

/**
 * Draws a walker of a group.
 *
 * Cadence and step length are drawn apart, so the group's mean speed is the product of its mean cadence
 * and mean step length; step length grows with body height. What the plan gives is taken as given.
 */
export function drawWalker(seed: number, plan: WalkerPlan, group: GroupPlan): WalkerModel {
  // Every number is drawn, needed or not, so that giving one leaves the others as they were.
  const random = randomStream(seed, 'walker', plan.walker);
  const [ageDraw, sexDraw] = [random.uniform(), random.uniform()];
  const [heightDraw, cadenceDraw, lengthDraw, massDraw] = [
    within(random.normal()),
    within(random.normal()),
    within(random.normal()),
    within(random.normal()),
  ];
  const [youngest, oldest] = group.age;
  const age = plan.age ?? Math.floor(youngest + ageDraw * (oldest - youngest + 1));
  const sex = plan.sex ?? (group.sex === 'any' ? (sexDraw < 0.5 ? 'female' : 'male') : group.sex);
  const norm = gaitNorm(sex, age);
  const style = { ...GAIT_STYLES[group.gait] };
  const heightM = plan.height_m ?? norm.heightM + norm.heightSdM * heightDraw;
  const cadenceHz =
    plan.cadence_hz ??
    (group.cadence_hz ?? norm.cadenceHz * style.cadence) *
      (1 + (norm.cadenceSdHz / norm.cadenceHz) * cadenceDraw);
  const stepLengthM =
    plan.step_length_m ??
    (((group.step_length_m ?? norm.stepLengthM * style.stepLength) * heightM) / norm.heightM) *
      (1 + STEP_LENGTH_CV * lengthDraw);
  return {
    walker: plan.walker,
    group: plan.group,
    sex,
    age,
    heightM,
    legM: plan.leg_m ?? LEG_PER_HEIGHT * heightM,
    // Body mass index 23.5 with a spread of 3; from memory, used for nothing but walkers.csv.
    massKg: plan.mass_kg ?? (23.5 + 3 * massDraw) * heightM * heightM,
    cadenceHz,
    stepLengthM,
    timeVariability: group.time_variability ?? style.timeVariability,
    lengthVariability: group.length_variability ?? style.lengthVariability,
    asymmetry: group.asymmetry ?? style.asymmetry,
    bounce: group.bounce ?? style.bounce,
    heelStrikeMps2: group.heel_strike_mps2 ?? style.heelStrikeMps2,
  };
}

/** Keeps a standard deviate within the 95 % that norms describe well: no giants. Variance falls by 12 %. */
function within(deviate: number): number {
  return Math.max(-2, Math.min(2, deviate));
}

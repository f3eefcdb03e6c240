import { attitudeStage } from '../stages/attitude/index.js';
import { checkpointsStage } from '../stages/checkpoints/index.js';
import { findingsStage } from '../stages/findings/index.js';
import { headingsStage } from '../stages/headings/index.js';
import { motionStage } from '../stages/motion/index.js';
import { pathStage } from '../stages/path/index.js';
import type { AnyStage } from '../stages/stage.js';
import { stepsStage } from '../stages/steps/index.js';
import { stridesStage } from '../stages/strides/index.js';

/** Every stage in the order they follow each other: each reads only the readings and tables before it. */
export const STAGES: readonly AnyStage[] = [
  findingsStage,
  motionStage,
  attitudeStage,
  stepsStage,
  stridesStage,
  headingsStage,
  pathStage,
  checkpointsStage,
  // The pipeline hands tables on without knowing their columns; each stage's own type says which it reads.
] as unknown as readonly AnyStage[];

export const STAGE_NAMES: readonly string[] = STAGES.map((stage) => stage.name);

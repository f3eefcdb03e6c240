import { type Attitude, type Motion, type Steps, stepsTable } from '../../tables/schemas.js';
import { defineStage } from '../stage.js';
import { adaptivePeakValley } from './methods/adaptive-peak-valley.js';
import { peakChain } from './methods/peak-chain.js';

export interface StepsInputs {
  motion: Motion;
  attitude?: Attitude | undefined;
}

/** One row a step, told by the foot contact. Nothing is found inside gaps. */
export const stepsStage = defineStage<StepsInputs, Steps>({
  name: 'steps',
  table: stepsTable,
  reads: ['motion'],
  readsIfPresent: ['attitude'],
  methods: [peakChain, adaptivePeakValley],
  defaultMethod: peakChain.name,
});

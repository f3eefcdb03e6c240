import { type Attitude, type Motion, type Steps, type Strides, stridesTable } from '../../tables/schemas.js';
import { defineStage } from '../stage.js';
import { weinberg } from './methods/weinberg.js';

export interface StridesInputs {
  steps: Steps;
  motion: Motion;
  attitude?: Attitude | undefined;
}

/** Length of each step. */
export const stridesStage = defineStage<StridesInputs, Strides>({
  name: 'strides',
  table: stridesTable,
  reads: ['steps', 'motion'],
  readsIfPresent: ['attitude'],
  methods: [weinberg],
  defaultMethod: weinberg.name,
});

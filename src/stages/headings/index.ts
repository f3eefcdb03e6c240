import {
  type Attitude,
  type Headings,
  headingsTable,
  type Motion,
  type Steps,
} from '../../tables/schemas.js';
import { defineStage } from '../stage.js';
import { deviceAxis } from './methods/device-axis.js';
import { trackedOffset } from './methods/tracked-offset.js';

export interface HeadingsInputs {
  steps: Steps;
  motion: Motion;
  attitude: Attitude;
}

/** Walking direction of each step. */
export const headingsStage = defineStage<HeadingsInputs, Headings>({
  name: 'headings',
  table: headingsTable,
  reads: ['steps', 'motion', 'attitude'],
  methods: [trackedOffset, deviceAxis],
  defaultMethod: trackedOffset.name,
});

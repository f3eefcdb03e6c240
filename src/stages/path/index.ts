import { type Headings, type Path, pathTable, type Steps, type Strides } from '../../tables/schemas.js';
import { defineStage } from '../stage.js';
import { deadReckoning } from './methods/dead-reckoning.js';

export interface PathInputs {
  steps: Steps;
  strides: Strides;
  headings: Headings;
}

/** Position after each step, from the start on. */
export const pathStage = defineStage<PathInputs, Path>({
  name: 'path',
  table: pathTable,
  reads: ['steps', 'strides', 'headings'],
  methods: [deadReckoning],
  defaultMethod: deadReckoning.name,
});

import { type Checkpoints, checkpointsTable, type Path } from '../../tables/schemas.js';
import { defineStage } from '../stage.js';
import { atPassTimes } from './methods/at-pass-times.js';

export interface CheckpointsInputs {
  path: Path;
}

/** Estimated against surveyed position at each pass. */
export const checkpointsStage = defineStage<CheckpointsInputs, Checkpoints>({
  name: 'checkpoints',
  table: checkpointsTable,
  reads: ['path'],
  methods: [atPassTimes],
  defaultMethod: atPassTimes.name,
});

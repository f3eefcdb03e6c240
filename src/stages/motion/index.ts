import {
  type Motion,
  motionTable,
  type ReadingsAccel,
  type ReadingsBaro,
  type ReadingsGyro,
  type ReadingsMag,
} from '../../tables/schemas.js';
import { defineStage } from '../stage.js';
import { uniformGrid } from './methods/uniform-grid.js';

export interface MotionInputs {
  'readings-accel': ReadingsAccel;
  'readings-gyro'?: ReadingsGyro | undefined;
  'readings-mag'?: ReadingsMag | undefined;
  'readings-baro'?: ReadingsBaro | undefined;
}

/** All sensors calibrated and brought to one uniform time grid; gaps flagged, never filled. */
export const motionStage = defineStage<MotionInputs, Motion>({
  name: 'motion',
  table: motionTable,
  reads: ['readings-accel'],
  readsIfPresent: ['readings-gyro', 'readings-mag', 'readings-baro'],
  methods: [uniformGrid],
  defaultMethod: uniformGrid.name,
});

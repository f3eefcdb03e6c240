import { type Attitude, attitudeTable, type Motion } from '../../tables/schemas.js';
import { defineStage } from '../stage.js';
import { fixedIntervalSmoother } from './methods/fixed-interval-smoother.js';

export interface AttitudeInputs {
  motion: Motion;
}

/** Orientation of the device by fusing gyroscope, accelerometer and, where there is one, magnetometer. */
export const attitudeStage = defineStage<AttitudeInputs, Attitude>({
  name: 'attitude',
  table: attitudeTable,
  reads: ['motion'],
  methods: [fixedIntervalSmoother],
  defaultMethod: fixedIntervalSmoother.name,
});

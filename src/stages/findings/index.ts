import {
  type Findings,
  findingsTable,
  type ReadingsAccel,
  type ReadingsBaro,
  type ReadingsGyro,
  type ReadingsImport,
  type ReadingsMag,
} from '../../tables/schemas.js';
import { defineStage } from '../stage.js';
import { logCheck } from './methods/log-check.js';

export interface FindingsInputs {
  'readings-accel'?: ReadingsAccel | undefined;
  'readings-gyro'?: ReadingsGyro | undefined;
  'readings-mag'?: ReadingsMag | undefined;
  'readings-baro'?: ReadingsBaro | undefined;
  'readings-import': ReadingsImport;
}

/** What a person would want to know of a log before trusting what comes out of it. */
export const findingsStage = defineStage<FindingsInputs, Findings>({
  name: 'findings',
  table: findingsTable,
  reads: ['readings-import'],
  readsIfPresent: ['readings-accel', 'readings-gyro', 'readings-mag', 'readings-baro'],
  methods: [logCheck],
  defaultMethod: logCheck.name,
});

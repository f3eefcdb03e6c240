import { readFileSync } from 'node:fs';
import { z } from 'zod';
import { InputError } from '../errors.js';
import type { DeviceCalibration, StepConstant } from './context.js';
import { Problems } from './problems.js';
import { readYaml } from './yaml-document.js';

const number = z.number();
const axisSchema = z.strictObject({
  bias: z.tuple([number, number, number]),
  matrix: z.tuple([number, number, number, number, number, number, number, number, number]),
});
const deviceSchema = z.object({
  accel: axisSchema.nullable().default(null),
  gyro: axisSchema.nullable().default(null),
  mag: axisSchema.nullable().default(null),
  delay_s: z.record(z.string(), number).default({}),
});
const walkerSchema = z.object({
  step_constants: z
    .record(
      z.string(),
      z.strictObject({ value: number, sd: number.nonnegative(), from: z.string().default('walker') }),
    )
    .default({}),
});

/**
 * Reads a device's calibration: `accel`, `gyro`, `mag`, each with `bias` (3) and `matrix` (9, row by row),
 * and `delay_s` by sensor, all optional; further keys are for people and other programs.
 *
 * @throws InputErrors `bad-calibration` with file, line and column of each problem.
 */
export function readDeviceCalibration(path: string): DeviceCalibration {
  return readAs(path, deviceSchema);
}

/** Reads a walker's step-length constants: `step_constants` with `value`, `sd` and `from` by model name. */
export function readStepConstants(path: string): Readonly<Record<string, StepConstant>> {
  return readAs(path, walkerSchema).step_constants;
}

function readAs<S extends z.ZodType>(path: string, schema: S): z.output<S> {
  let text: string;
  try {
    text = readFileSync(path, 'utf8');
  } catch (error) {
    throw new InputError('no-file', `${path}: calibration file cannot be read`, { cause: error });
  }
  const problems = new Problems();
  const data = readYaml(text, path, schema, problems);
  problems.throwIfAny('bad-calibration');
  return data!;
}

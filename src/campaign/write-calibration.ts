import { existsSync, readFileSync } from 'node:fs';
import { join } from 'node:path';
import { parseDocument } from 'yaml';
import { writeText } from '../tables/write.js';
import { readDeviceCalibration, readStepConstants } from './read-calibration.js';

/**
 * Sets one part of a calibration file and leaves the others as they are.
 *
 * @param kind - whose calibration: `device` or `walker`.
 * @param part - key at the top of the file.
 * @param value - plain data.
 * @param about - how it was found: residuals, standard errors; under `found`, for people and reports.
 * @returns the file's path.
 * @throws InputErrors where the file that stands there cannot be read: it is not written over.
 */
export function writeCalibrationPart(
  campaignDir: string,
  kind: 'device' | 'walker',
  name: string,
  part: string,
  value: unknown,
  about: unknown,
): string {
  const path = join(campaignDir, 'calibrations', `${kind}-${name}.yaml`);
  const read = kind === 'device' ? readDeviceCalibration : readStepConstants;
  if (existsSync(path)) read(path);
  const document = parseDocument(existsSync(path) ? readFileSync(path, 'utf8') : '{}');
  document.setIn([part], document.createNode(value));
  document.setIn(['found', part], document.createNode(about));
  // Block style throughout, numbers in short lists on one line.
  writeText(path, document.toString({ lineWidth: 110, collectionStyle: 'block' }));
  return path;
}

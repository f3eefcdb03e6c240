import { readCampaignYaml } from '../../../src/campaign/campaign-yaml.js';
import { Problems } from '../../../src/campaign/problems.js';
import { readLog } from '../../../src/campaign/read-log.js';
import type { LogLayout, Walk } from '../../../src/campaign/types.js';
import { folderWith } from '../folder.js';

/** A layout from the YAML of its mapping. */
export function layoutFrom(yaml: string): LogLayout {
  const problems = new Problems();
  const campaign = readCampaignYaml(`name: x\nlayouts: { a: ${yaml} }\n`, problems);
  problems.throwIfAny('campaign');
  return campaign!.layouts.a!;
}

export function walkOf(log: string): Walk {
  return {
    walk: 'a1',
    walker: 'w1',
    log,
    device: null,
    carry: null,
    layout: 'a',
    level: null,
    start: null,
    startHeadingDeg: null,
    distanceM: null,
    steps: null,
    extra: {},
    line: 2,
  };
}

/** Reads a log of one file, logs/a1.csv. */
export function readText(content: string | Uint8Array, layout: LogLayout) {
  return readLog(folderWith({ 'logs/a1.csv': content }), walkOf('logs/a1.csv'), layout);
}

export const WIDE = layoutFrom(
  '{ shape: wide, time: { column: t, unit: ms }, accel: { columns: [ax, ay, az], unit: mps2 }, gyro: { columns: [gx, gy, gz], unit: radps } }',
);
export const TAGGED = layoutFrom(
  '{ shape: tagged, time: { column: t, unit: ms }, tag: sensor, accel: { tag: acc, columns: [x, y, z], unit: mps2 }, baro: { tag: bar, columns: [x], unit: hPa } }',
);
/** By numbers from 1. */
export const NUMBERED = layoutFrom(
  '{ shape: wide, time: { column: 1, unit: s }, accel: { columns: [2, 3, 4], unit: mps2 } }',
);

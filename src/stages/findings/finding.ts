import type { Findings } from '../../tables/schemas.js';

/** A thing noticed: one row of the findings table. */
export interface Finding {
  /** `note`: good to know; `warn`: the result may suffer; `fail`: part of the result is missing or wrong. */
  severity: 'note' | 'warn' | 'fail';
  kind: string;
  /** accel, gyro, mag, baro, or walk for the walk as a whole. */
  sensor: string;
  from_s: number;
  to_s: number;
  value: number;
  message: string;
}

/** Findings as columns, in the order given. */
export function findingColumns(findings: readonly Finding[]): Findings {
  return {
    severity: findings.map((finding) => finding.severity),
    kind: findings.map((finding) => finding.kind),
    sensor: findings.map((finding) => finding.sensor),
    from_s: Float64Array.from(findings, (finding) => finding.from_s),
    to_s: Float64Array.from(findings, (finding) => finding.to_s),
    value: Float64Array.from(findings, (finding) => finding.value),
    message: findings.map((finding) => finding.message),
  };
}

/** A sensor's name in a sentence. */
export const SENSOR_WORDS: Readonly<Record<string, string>> = {
  accel: 'accelerometer',
  gyro: 'gyroscope',
  mag: 'magnetometer',
  baro: 'barometer',
};

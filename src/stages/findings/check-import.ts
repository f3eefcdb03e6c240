import type { ReadingsImport } from '../../tables/schemas.js';
import { type Finding, SENSOR_WORDS } from './finding.js';

/** What the importer counted: readings in the wrong order, twice, or without a value. */
export function checkImport(counts: ReadingsImport, end_s: number): Finding[] {
  const out: Finding[] = [];
  for (const [i, sensor] of counts.sensor.entries()) {
    const name = SENSOR_WORDS[sensor] ?? sensor;
    const rows = counts.rows[i]!;
    const add = (kind: string, value: number, message: string) => {
      if (value > 0)
        out.push({
          severity: value > 0.01 * rows ? 'warn' : 'note',
          kind,
          sensor,
          from_s: 0,
          to_s: end_s,
          value,
          message: `${name}: ${message}`,
        });
    };
    add(
      'disorder',
      counts.out_of_order[i]!,
      `${counts.out_of_order[i]} of ${rows} readings come earlier than the one before them in the file; they were sorted by time; look at how the logger buffers`,
    );
    add(
      'duplicates',
      counts.duplicate_times[i]!,
      `${counts.duplicate_times[i]} of ${rows} readings have the time of another one; the first of each counts; look for a log written twice or times cut to too few digits`,
    );
    add(
      'missing-values',
      counts.missing[i]!,
      `${counts.missing[i]} rows without a number were left out; look at the log's columns`,
    );
  }
  return out;
}

import { z } from 'zod';
import type { PassContext } from '../../../campaign/context.js';
import type { Findings } from '../../../tables/schemas.js';
import { defineMethod } from '../../stage.js';
import { checkImport } from '../check-import.js';
import { checkSampling } from '../check-sampling.js';
import { type Finding, findingColumns } from '../finding.js';
import type { FindingsInputs } from '../index.js';

const settingsSchema = z.strictObject({
  /** Below this rate a warning. Common practice, no source: ten readings a step at two steps a second. */
  lowest_rate_hz: z.number().positive().default(20),
  /** Longest time between readings that is no gap; a quarter of a second is half a step. */
  gap_s: z.number().positive().default(0.25),
  /** Largest spread of the time between readings that is no warning, as a percentage of its median. */
  jitter_pct: z.number().positive().default(50),
});

/** Looks through one walk's readings and passes; findings in the order of sensors, then of time. */
export const logCheck = defineMethod<FindingsInputs, Findings, typeof settingsSchema>({
  name: 'log-check',
  source: 'common practice, no source',
  version: 1,
  settings: settingsSchema,
  uses: ['passes_outside'],
  run(inputs, settings, context) {
    const limits = {
      lowestRateHz: settings.lowest_rate_hz,
      gapS: settings.gap_s,
      jitterPct: settings.jitter_pct,
    };
    const times = {
      accel: inputs['readings-accel']?.t_s,
      gyro: inputs['readings-gyro']?.t_s,
      mag: inputs['readings-mag']?.t_s,
      baro: inputs['readings-baro']?.t_s,
    };
    let end_s = 0;
    for (const t of Object.values(times)) end_s = Math.max(end_s, t?.at(-1) ?? 0);
    const findings: Finding[] = [];
    for (const [sensor, t] of Object.entries(times))
      if (t) findings.push(...checkSampling(sensor, t, limits));
    findings.push(...missingSensors(times, end_s));
    findings.push(...checkImport(inputs['readings-import'], end_s));
    findings.push(...outsidePasses(context.passes_outside ?? [], end_s));
    return findingColumns(findings);
  },
});

function missingSensors(times: Record<string, Float64Array | undefined>, end_s: number): Finding[] {
  const out: Finding[] = [];
  const add = (severity: Finding['severity'], sensor: string, message: string) => {
    if (!times[sensor])
      out.push({ severity, kind: 'missing-sensor', sensor, from_s: 0, to_s: end_s, value: 0, message });
  };
  add(
    'fail',
    'accel',
    'the log has no accelerometer readings: no step can be found; record them or mend the layout',
  );
  add(
    'note',
    'gyro',
    'the log has no gyroscope readings: steps are counted, but there is no heading and no path',
  );
  add('note', 'mag', 'the log has no magnetometer readings: headings are relative to the start and drift');
  return out;
}

function outsidePasses(passes: readonly PassContext[], end_s: number): Finding[] {
  return passes.map(({ checkpoint, t_s }) => {
    const outside = t_s < 0 ? -t_s : t_s - end_s;
    const where = t_s < 0 ? 'before the log begins' : 'after the log ends';
    return {
      severity: 'fail',
      kind: 'pass-outside-log',
      sensor: 'walk',
      from_s: t_s,
      to_s: t_s,
      value: outside,
      message: `pass of checkpoint ${checkpoint} lies ${outside.toFixed(1)} s ${where}: it is not scored; compare its time in passes.csv and truth_time in campaign.yaml with the log's clock`,
    };
  });
}

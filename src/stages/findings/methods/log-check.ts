import { z } from 'zod';
import type { PassContext, WalkContext } from '../../../campaign/context.js';
import type { Findings } from '../../../tables/schemas.js';
import { defineMethod } from '../../stage.js';
import { checkChannels } from '../check-channels.js';
import { checkDelay } from '../check-delay.js';
import { checkField } from '../check-field.js';
import { checkImport } from '../check-import.js';
import { checkRest } from '../check-rest.js';
import { checkRotation, fieldOf, forceOf, rotationAgrees } from '../check-rotation.js';
import { checkSampling } from '../check-sampling.js';
import { checkSign } from '../check-sign.js';
import { checkSpacing } from '../check-spacing.js';
import { checkUnits } from '../check-units.js';
import { type Finding, findingColumns } from '../finding.js';
import type { FindingsInputs } from '../index.js';

const settingsSchema = z.strictObject({
  /** Below this rate a warning. Common practice, no source: ten readings a step at two steps a second. */
  lowest_rate_hz: z.number().positive().default(20),
  /** Longest time between readings that is no gap; a quarter of a second is half a step. */
  gap_s: z.number().positive().default(0.25),
  /** Largest spread of the time between readings that is no warning, as a percentage of its median. */
  jitter_pct: z.number().positive().default(50),
  /** A channel that keeps one value this long is stuck: quantised channels of a phone at rest do so for shorter. */
  stuck_s: z.number().positive().default(3),
  /** Readings in a row at a channel's largest value that are no accident. */
  saturated_readings: z.int().min(2).default(3),
  /** Largest part by which |f| at rest may differ from gravity: phones are within one percent. */
  gravity_pct: z.number().positive().default(3),
  /** Largest rate at rest: five times the zero-rate error that data sheets give after a phone's own correction. */
  gyro_bias_radps: z.number().positive().default(0.05),
  /** Largest part by which the field's median may differ from the model's: buildings of steel bend it by a third. */
  field_pct: z.number().positive().default(40),
  /** A field this far from the walk's median turns headings by ten degrees and more. */
  disturbed_pct: z.number().positive().default(30),
  disturbed_s: z.number().positive().default(1.5),
  /** Longest delay of the magnetometer against the gyroscope: in 40 ms a quick turn goes on by four degrees. */
  delay_s: z.number().positive().default(0.04),
  /** Distance per step that no walker reaches, and that is too short even round corners. */
  longest_step_m: z.number().positive().default(1.3),
  shortest_step_m: z.number().positive().default(0.1),
});

type Settings = z.output<typeof settingsSchema>;

/** Looks through one walk's readings and passes; findings in the order of sensors, then of time. */
export const logCheck = defineMethod<FindingsInputs, Findings, typeof settingsSchema>({
  name: 'log-check',
  source: 'common practice, no source',
  version: 2,
  settings: settingsSchema,
  uses: ['passes_outside', 'passes', 'place'],
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
    findings.push(...checkReadings(inputs, settings, context));
    findings.push(...outsidePasses(context.passes_outside ?? [], end_s));
    return findingColumns(findings);
  },
});

/** What the readings themselves tell, sensor by sensor and against each other. */
function checkReadings(inputs: FindingsInputs, settings: Settings, context: WalkContext): Finding[] {
  const accel = inputs['readings-accel'];
  const gyro = inputs['readings-gyro'];
  const mag = inputs['readings-mag'];
  const { place } = context;
  const channels = { stuckS: settings.stuck_s, saturatedReadings: settings.saturated_readings };
  const out: Finding[] = [];
  if (accel) {
    const { t_s, x_mps2, y_mps2, z_mps2 } = accel;
    out.push(...checkUnits('accel', t_s, x_mps2, y_mps2, z_mps2));
    out.push(...checkChannels('accel', t_s, [x_mps2, y_mps2, z_mps2], channels));
  }
  if (gyro) {
    const { t_s, x_radps, y_radps, z_radps } = gyro;
    const units = checkUnits('gyro', t_s, x_radps, y_radps, z_radps);
    // A phone that is spun by hand turns as fast as degrees look; then gravity and field turn with it.
    const agrees = () =>
      (accel && rotationAgrees(gyro, forceOf(accel))) || (mag && rotationAgrees(gyro, fieldOf(mag)));
    if (units.length > 0 && !agrees()) out.push(...units);
    out.push(...checkChannels('gyro', t_s, [x_radps, y_radps, z_radps], channels));
  }
  if (mag) {
    const { t_s, x_uT, y_uT, z_uT } = mag;
    out.push(...checkUnits('mag', t_s, x_uT, y_uT, z_uT));
    // Its range is twenty times the earth's field: it does not clip.
    out.push(
      ...checkChannels('mag', t_s, [x_uT, y_uT, z_uT], {
        ...channels,
        saturatedReadings: Number.POSITIVE_INFINITY,
      }),
    );
    out.push(
      ...checkField(mag, place, {
        fieldPct: settings.field_pct,
        disturbedPct: settings.disturbed_pct,
        disturbedS: settings.disturbed_s,
      }),
    );
  }
  // With a wrong unit, what follows would say the same in other words.
  if (out.some(({ kind }) => kind === 'wrong-unit' || kind === 'wrong-size')) return out;
  const rest = { gravityPct: settings.gravity_pct, biasRadps: settings.gyro_bias_radps };
  out.push(...checkRest(accel, gyro, place.gravity_mps2, rest));
  const turns = gyro && accel ? checkRotation(gyro, forceOf(accel)) : [];
  out.push(...turns);
  if (gyro && mag && turns.length === 0) out.push(...checkRotation(gyro, fieldOf(mag)));
  if (gyro && mag) out.push(...checkDelay(gyro, mag, { delayS: settings.delay_s }));
  if (accel && mag) out.push(...checkSign(accel, mag, place));
  if (accel)
    out.push(
      ...checkSpacing(accel, context.passes, {
        shortestM: settings.shortest_step_m,
        longestM: settings.longest_step_m,
      }),
    );
  return out;
}

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

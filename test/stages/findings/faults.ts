import type { WalkContext } from '../../../src/campaign/context.js';
import { type FindingsInputs, findingsStage } from '../../../src/stages/findings/index.js';

const method = findingsStage.methods['log-check']!;

/** A log as the check sees it. */
export interface Log {
  inputs: FindingsInputs;
  context: WalkContext;
}

/** Kinds found, with their severity and sensor, but for the notes. */
export function alarms({ inputs, context }: Log): string[] {
  const found = method.run(inputs, method.settings.parse({}), context);
  return found.kind.flatMap((kind, i) =>
    found.severity[i] === 'note' ? [] : [`${found.severity[i]} ${kind} ${found.sensor[i]}`],
  );
}

/** A copy of a log in which a fault can be planted. */
export function copyOf({ inputs, context }: Log): Log {
  return structuredClone({ inputs, context });
}

const scale = (columns: object, factor: number) => {
  for (const [name, column] of Object.entries(columns))
    if (name !== 't_s') for (let i = 0; i < column.length; i++) column[i] *= factor;
};

/** Name, the alarm that must be raised, and the fault; each in the hand (first walk) unless another is named. */
export const FAULTS: [string, string, (log: Log) => void, number?][] = [
  [
    'acceleration in g',
    'fail wrong-unit accel',
    ({ inputs }) => scale(inputs['readings-accel']!, 1 / 9.80665),
  ],
  [
    'rates in degrees',
    'fail wrong-unit gyro',
    ({ inputs }) => scale(inputs['readings-gyro']!, 180 / Math.PI),
  ],
  ['field in gauss', 'fail wrong-unit mag', ({ inputs }) => scale(inputs['readings-mag']!, 0.01)],
  [
    'accelerometer 5 % too large',
    'warn gravity-off accel',
    ({ inputs }) => scale(inputs['readings-accel']!, 1.05),
  ],
  [
    'accelerometer of the other sign',
    'fail wrong-sign accel',
    ({ inputs }) => scale(inputs['readings-accel']!, -1),
  ],
  [
    'gyroscope axis turned about',
    'fail (sensors-disagree|wrong-axes) gyro',
    ({ inputs }) => {
      const gyro = inputs['readings-gyro']!;
      for (let i = 0; i < gyro.z_radps.length; i++) gyro.z_radps[i]! *= -1;
    },
  ],
  [
    'gyroscope axes exchanged',
    'fail wrong-axes gyro',
    ({ inputs }) => {
      const gyro = inputs['readings-gyro']!;
      [gyro.x_radps, gyro.z_radps] = [gyro.z_radps, gyro.x_radps];
    },
    3,
  ],
  [
    'gyroscope of another time',
    'warn sensors-disagree mag',
    ({ inputs }) => {
      const gyro = inputs['readings-gyro']!;
      const n = gyro.t_s.length;
      for (const axis of [gyro.x_radps, gyro.y_radps, gyro.z_radps])
        axis.set([...axis].map((_, i) => axis[(i + Math.floor(n / 2.37)) % n]!));
    },
  ],
  [
    'gyroscope off by 6 degrees a second',
    'warn gyro-bias gyro',
    ({ inputs }) => {
      const { z_radps } = inputs['readings-gyro']!;
      for (let i = 0; i < z_radps.length; i++) z_radps[i]! += 0.105;
    },
  ],
  [
    'gyroscope stuck for five seconds',
    'fail stuck gyro',
    ({ inputs }) => inputs['readings-gyro']!.y_radps.fill(0.01, 1500, 2000),
  ],
  [
    'accelerometer clipped at 12 m/s2',
    'warn saturated accel',
    ({ inputs }) => {
      const { z_mps2 } = inputs['readings-accel']!;
      for (let i = 0; i < z_mps2.length; i++) z_mps2[i] = Math.min(z_mps2[i]!, 9.5);
    },
  ],
  ['field half as strong again', 'warn field-off mag', ({ inputs }) => scale(inputs['readings-mag']!, 1.5)],
  [
    'a second of silence',
    'warn gap accel',
    ({ inputs }) => {
      const accel = inputs['readings-accel']! as unknown as Record<string, Float64Array>;
      for (const [name, column] of Object.entries(accel))
        accel[name] = column.filter((_, i) => i < 1000 || i >= 1100);
    },
  ],
  [
    'a checkpoint mistaken for one 60 m away',
    'warn checkpoint-spacing walk',
    ({ context }) => {
      (context.passes[2] as { east_m: number }).east_m += 60;
    },
  ],
  [
    'magnetometer 120 ms late',
    'warn sensor-delay mag',
    ({ inputs }) => {
      const { t_s } = inputs['readings-mag']!;
      for (let i = 0; i < t_s.length; i++) t_s[i]! += 0.12;
    },
  ],
  [
    'magnetometer clock that was set by a fifth of a second in mid-walk',
    'warn clock-drift mag',
    ({ inputs }) => {
      const { t_s } = inputs['readings-mag']!;
      for (let i = t_s.length >> 1; i < t_s.length; i++) t_s[i]! += 0.2;
    },
  ],
  [
    'times of arrival instead of measurement',
    'warn jitter gyro',
    ({ inputs }) => {
      const { t_s } = inputs['readings-gyro']!;
      for (let i = 0; i < t_s.length; i++) t_s[i] = Math.floor(t_s[i]! / 0.04) * 0.04 + (i % 4) * 0.0005;
    },
  ],
];

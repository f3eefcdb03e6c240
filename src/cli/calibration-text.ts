import type { DelayFit, DeviceFit } from '../pipeline/calibrate-device.js';
import type { WalkersFit } from '../pipeline/calibrate-walkers.js';
import type { AxisNoise } from '../pipeline/noise-of-log.js';
import { fixed, printable, textTable } from './text-table.js';

const UNITS = { accel: 'm/s2', gyro: 'rad/s', mag: 'uT' } as const;

/** A device's calibration for people. */
export function deviceFitText({ device, sensor, calibration, biasSd, fit, basis }: DeviceFit): string {
  const unit = UNITS[sensor];
  const rows = [0, 1, 2];
  const lines = [`${sensor} of ${printable(device)}, from ${basis}`];
  lines.push(
    textTable([
      { head: 'axis', cells: rows.map((a) => 'xyz'[a]!), isNumber: false },
      { head: `zero ${unit}`, cells: rows.map((a) => calibration.bias[a]!.toFixed(5)), isNumber: true },
      { head: 'se', cells: rows.map((a) => fixed(biasSd[a]!, 5)), isNumber: true },
      ...(fit
        ? rows.map((c) => ({
            head: `matrix ${'xyz'[c]}`,
            cells: rows.map(
              (r) => `${calibration.matrix[3 * r + c]!.toFixed(5)} ± ${fixed(fit.matrixSd[3 * r + c]!, 5)}`,
            ),
            isNumber: true,
          }))
        : []),
    ]).trimEnd(),
  );
  if (fit)
    lines.push(
      `size off by ${fit.residual.toPrecision(3)} ${unit} (root mean square; ${fit.residualBefore.toPrecision(3)} before), at most ${fit.worst.toPrecision(3)}; condition ${fit.condition.toFixed(1)}`,
    );
  return `${lines.join('\n')}\n`;
}

/** A device's delay for people. */
export function delayText({ device, delay_s, delaySd, walks }: DelayFit): string {
  return (
    `magnetometer of ${printable(device)}: ${(1000 * delay_s).toFixed(1)} ms to add to its times` +
    `${Number.isFinite(delaySd) ? ` (se ${(1000 * delaySd).toFixed(1)} ms)` : ''}, from ${walks.length} logs, ` +
    `correlation ${Math.min(...walks.map(({ correlation }) => correlation)).toFixed(2)} and above\n`
  );
}

/** Noise of each axis for people: a few averaging times, then what is fitted. */
export function noiseText(axes: readonly AxisNoise[]): string {
  const parts: string[] = [];
  for (const sensor of ['accel', 'gyro'] as const) {
    const own = axes.filter((axis) => axis.sensor === sensor);
    const first = own[0]?.deviation;
    if (!first) continue;
    const unit = UNITS[sensor];
    const rows = [...first.tauS.keys()].filter((k) => isShown(first.tauS, k));
    parts.push(
      `${sensor}: ${first.kind} deviation, ${unit} [95 % interval], ${(first.nSamples / first.sampleRateHz).toFixed(0)} s at ${first.sampleRateHz.toFixed(1)} Hz\n`,
      textTable([
        { head: 'tau s', cells: rows.map((k) => first.tauS[k]!.toPrecision(3)), isNumber: true },
        ...own.map(({ axis, deviation }) => ({
          head: axis,
          cells: rows.map(
            (k) =>
              `${exponential(deviation.deviation[k]!)} [${exponential(deviation.low[k]!)}, ${exponential(deviation.high[k]!)}]`,
          ),
          isNumber: true,
        })),
      ]),
    );
    if (own.every(({ fit }) => fit)) {
      const walk = sensor === 'accel' ? 'velocity random walk N, m/s/√s' : 'angle random walk N, rad/√s';
      const rows2 = [
        [walk, 'angleRandomWalk'],
        [`bias instability B, ${unit}`, 'biasInstability'],
        [`${sensor === 'accel' ? 'acceleration' : 'rate'} random walk K, ${unit}/√s`, 'rateRandomWalk'],
      ] as const;
      parts.push(
        textTable([
          { head: 'fitted', cells: rows2.map(([name]) => name), isNumber: false },
          ...own.map(({ axis, fit }) => ({
            head: axis,
            cells: rows2.map(
              ([, key]) => `${exponential(fit![key].value)} ± ${exponential(fit![key].standardError)}`,
            ),
            isNumber: true,
          })),
        ]),
      );
    }
  }
  return parts.join('\n');
}

/** Noise as `--json` prints it. */
export function noiseJson(axes: readonly AxisNoise[]) {
  return axes.map(({ sensor, axis, deviation, fit }) => ({
    sensor,
    axis,
    kind: deviation.kind,
    rate_hz: deviation.sampleRateHz,
    tau_s: [...deviation.tauS],
    deviation: [...deviation.deviation],
    low: [...deviation.low],
    high: [...deviation.high],
    fit,
  }));
}

/** About three averaging times a decade are enough to look at. */
function isShown(tauS: Float64Array, k: number): boolean {
  if (k === 0) return true;
  const third = (t: number) => Math.floor(3 * Math.log10(t) + 1e-9);
  return third(tauS[k]!) !== third(tauS[k - 1]!);
}

function exponential(value: number): string {
  return Number.isFinite(value) ? value.toExponential(2) : '–';
}

/** Walkers' step-length constants for people. */
export function walkersFitText({ walkers, groups, betweenWalkers, betweenWalks, walks }: WalkersFit): string {
  const entries = [...walkers];
  return [
    `weinberg constant, m/(m/s2)^(1/4), from ${walks.length} walks of known length`,
    textTable([
      { head: 'walker', cells: entries.map(([name]) => printable(name)), isNumber: false },
      { head: 'constant', cells: entries.map(([, { value }]) => value.toFixed(4)), isNumber: true },
      { head: 'se', cells: entries.map(([, { sd }]) => sd.toFixed(4)), isNumber: true },
      { head: 'from', cells: entries.map(([, { from }]) => from), isNumber: false },
      { head: 'walks', cells: entries.map(([, { walks: count }]) => String(count)), isNumber: true },
    ]).trimEnd(),
    `groups: ${[...groups].map(([name, { value, sd }]) => `${printable(name)} ${value.toFixed(4)} ± ${sd.toFixed(4)} for a walker without walks`).join(', ')}`,
    `walkers of a group differ by ${(100 * betweenWalkers).toFixed(1)} %, walks of a walker by ${(100 * betweenWalks).toFixed(1)} %\n`,
  ].join('\n');
}

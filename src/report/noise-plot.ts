import * as Plot from '@observablehq/plot';
import type { AllanDeviation } from '../stats/allan.js';
import { fittedAllanDeviation, type NoiseFit } from '../stats/noise-fit.js';
import { svgPlot } from './svg-plot.js';

/** One curve of {@link noisePlot}. */
export interface NoiseCurve {
  axis: string;
  deviation: AllanDeviation;
  fit: NoiseFit | null;
}

/** Told apart by colour-blind readers too (Okabe & Ito 2008), and by their dashes. */
const COLOURS = ['#0072b2', '#d55e00', '#009e73'];
const DASHES = ['', '6 3', '2 3'];

/**
 * Allan deviations against averaging time, both logarithmic, with their intervals and the fitted noise.
 *
 * @param sensor - for the title.
 * @param unit - of the rate.
 */
export function noisePlot(sensor: string, unit: string, curves: readonly NoiseCurve[]): string {
  const marks = curves.flatMap(({ axis, deviation, fit }, i) => {
    const points = Array.from(deviation.tauS, (tau, k) => ({
      tau,
      value: deviation.deviation[k]!,
      low: deviation.low[k]!,
      high: deviation.high[k]!,
      fitted: fit ? fittedAllanDeviation(fit, tau) : Number.NaN,
    }));
    const last = points.at(-1)!;
    const colour = COLOURS[i % COLOURS.length]!;
    return [
      Plot.areaY(points, { x: 'tau', y1: 'low', y2: 'high', fill: colour, fillOpacity: 0.15 }),
      Plot.lineY(points, {
        x: 'tau',
        y: 'value',
        stroke: colour,
        strokeDasharray: DASHES[i % DASHES.length]!,
        strokeWidth: 2,
      }),
      ...(fit ? [Plot.lineY(points, { x: 'tau', y: 'fitted', stroke: colour, strokeWidth: 0.8 })] : []),
      Plot.text([last], { x: 'tau', y: 'value', text: () => axis, dx: 8, fill: colour, textAnchor: 'start' }),
    ];
  });
  const kind = curves[0]?.deviation.kind ?? '';
  return svgPlot(
    {
      width: 720,
      height: 480,
      marginLeft: 60,
      marginRight: 30,
      grid: true,
      x: { type: 'log', label: 'averaging time, s', tickFormat: '~g' },
      y: { type: 'log', label: `${kind} deviation, ${unit}`, tickFormat: '.0e' },
      marks,
    },
    `${sensor}: ${kind} deviation of ${curves.map(({ axis }) => axis).join(', ')} against averaging time, with 95 % intervals and the fitted noise as a thin line`,
  );
}

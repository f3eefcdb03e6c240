import { expect, test } from 'vitest';
import { noisePlot } from '../../src/report/noise-plot.js';
import { allanDeviation } from '../../src/stats/allan.js';
import { fitNoise } from '../../src/stats/noise-fit.js';
import { randomStream } from '../../src/stats/random.js';

function plotOf(axis: string): string {
  const random = randomStream(1, 'noise plot');
  const rate = Float64Array.from({ length: 12_000 }, () => random.normal());
  const deviation = allanDeviation(rate, 100);
  return noisePlot('gyro', 'rad/s', [{ axis, deviation, fit: fitNoise(deviation) }]);
}

test('a file of its own: SVG with a text alternative, nothing from outside, the same bytes each time', () => {
  const svg = plotOf('x');
  expect(svg).toMatch(/^<svg [^>]*xmlns="http:\/\/www\.w3\.org\/2000\/svg"/);
  expect(svg).toContain('<title>gyro: overlapping-allan deviation of x against averaging time');
  expect(svg.replaceAll('http://www.w3.org/2000/svg', '')).not.toMatch(/https?:|url\(|<script|<image/);
  expect(svg).toContain('averaging time, s');
  // A curve, its interval and its fit.
  expect(svg.match(/<path /g)!.length).toBeGreaterThanOrEqual(3);
  expect(plotOf('x')).toBe(svg);
});

test('a name is text, whatever it holds', () => {
  expect(plotOf('<script>alert(1)</script>')).not.toContain('<script>');
});

import * as Plot from '@observablehq/plot';
import { parseHTML } from 'linkedom';

/**
 * A chart as a stand-alone SVG file.
 *
 * @param options - as the plotting library takes them.
 * @param title - what is shown, for readers who cannot see it and as a tooltip.
 */
export function svgPlot(options: Plot.PlotOptions, title: string): string {
  const { document } = parseHTML('<!doctype html><html><body></body></html>');
  const svg = Plot.plot({ ...options, document: document as never }) as unknown as {
    setAttribute(name: string, value: string): void;
    insertBefore(child: unknown, before: unknown): void;
    firstChild: unknown;
    outerHTML: string;
  };
  // The library draws for a page; a file of its own must say what it is, and be legible on any ground.
  svg.setAttribute('xmlns', 'http://www.w3.org/2000/svg');
  svg.setAttribute('role', 'img');
  // The serialiser leaves angle brackets as they are in attributes and titles, which no XML reader takes.
  const label = title.replaceAll('<', '‹').replaceAll('>', '›').replaceAll('&', '+');
  svg.setAttribute('aria-label', label);
  svg.setAttribute('style', 'background: white; color: black');
  const element = document.createElement('title');
  element.textContent = label;
  svg.insertBefore(element, svg.firstChild);
  return `${svg.outerHTML}\n`;
}

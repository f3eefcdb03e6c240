import { z } from 'zod';
import { layoutSchema } from './layout-schema.js';
import type { Problems } from './problems.js';
import { type Grid, type LogLayout, SENSOR_NAMES, type SensorLayout, type SensorName } from './types.js';
import { readYaml } from './yaml-document.js';

/** `2019-11-24`, and a day that the calendar has. */
function isDate(text: string): boolean {
  if (!/^\d{4}-\d{2}-\d{2}$/.test(text)) return false;
  const time = Date.parse(`${text}T00:00:00Z`);
  return !Number.isNaN(time) && new Date(time).toISOString().startsWith(text);
}

const gridSchema = z.strictObject({
  origin: z
    .strictObject({
      lat_deg: z.number().min(-90).max(90),
      lon_deg: z.number().min(-180).max(180),
      height_m: z.number().default(0),
    })
    .optional()
    .describe("Where the grid's zero point lies on the ellipsoid WGS84."),
  rotation_deg: z.number().min(-360).max(360).default(0).describe('Grid north clockwise from true north.'),
  date: z
    .string()
    .refine(isDate, 'must be a date like 2025-03-31')
    .optional()
    .describe('For the geomagnetic model.'),
  declination_deg: z
    .number()
    .min(-180)
    .max(180)
    .optional()
    .describe('Magnetic north clockwise from true north; from the geomagnetic model where not given.'),
});

/**
 * campaign.yaml: the campaign's name, its grid (default `local`), the time base of truths (default `log`)
 * and the log layouts by name, see `layoutSchema`.
 */
export const campaignSchema = z.strictObject({
  name: z.string().min(1),
  grid: z
    .union(
      [z.literal('local'), gridSchema],
      'must be local, or a mapping with origin, rotation_deg, date, declination_deg',
    )
    .default('local'),
  truth_time: z.enum(['log', 'relative']).default('log'),
  layouts: z
    .record(z.string().min(1), layoutSchema)
    .refine((layouts) => Object.keys(layouts).length > 0, 'must describe at least one log layout'),
});

type YamlLayout = z.output<typeof layoutSchema>;

function sensorOf(part: NonNullable<YamlLayout[SensorName]>): SensorLayout {
  return {
    columns: part.columns,
    unit: part.unit,
    sign: 'sign' in part ? part.sign : 'specific-force',
    tag: part.tag === undefined ? null : String(part.tag),
    file: part.file ?? null,
    time: part.time ?? null,
  };
}

const DELIMITER_WORDS: Readonly<Record<string, string>> = { tab: '\t', space: ' ' };

function layoutOf(name: string, yaml: YamlLayout): LogLayout {
  const sensors: Partial<Record<SensorName, SensorLayout>> = {};
  for (const sensor of SENSOR_NAMES) {
    const part = yaml[sensor];
    if (part) sensors[sensor] = sensorOf(part);
  }
  const delimiter = yaml.delimiter ?? null;
  return {
    name,
    shape: yaml.shape,
    time: yaml.time,
    tag: yaml.tag ?? null,
    sensors,
    axes: yaml.axes.map((text) => ({
      axis: 'xyz'.indexOf(text.slice(-1)) as 0 | 1 | 2,
      sign: text.startsWith('-') ? -1 : 1,
    })),
    delimiter: delimiter === null ? null : (DELIMITER_WORDS[delimiter] ?? delimiter),
    decimal: yaml.decimal ?? null,
    header: yaml.header ?? null,
  };
}

/** What campaign.yaml says, with defaults filled in. */
export interface CampaignYaml {
  name: string;
  grid: Grid;
  truthTime: 'log' | 'relative';
  layouts: Record<string, LogLayout>;
}

/** Reads campaign.yaml's text; null where it is wrong (reported). */
export function readCampaignYaml(text: string, problems: Problems): CampaignYaml | null {
  const yaml = readYaml(text, 'campaign.yaml', campaignSchema, problems);
  if (!yaml) return null;
  const grid = yaml.grid === 'local' ? null : yaml.grid;
  const origin = grid?.origin;
  return {
    name: yaml.name,
    grid: {
      origin: origin ? { latDeg: origin.lat_deg, lonDeg: origin.lon_deg, heightM: origin.height_m } : null,
      rotationDeg: grid?.rotation_deg ?? 0,
      date: grid?.date ?? null,
      declinationDeg: grid?.declination_deg ?? null,
    },
    truthTime: yaml.truth_time,
    layouts: Object.fromEntries(
      Object.entries(yaml.layouts).map(([name, layout]) => [name, layoutOf(name, layout)]),
    ),
  };
}

import { existsSync } from 'node:fs';
import { hashLog, readLog } from '../campaign/read-log.js';
import type { ImportCounts, LogReadings } from '../campaign/readings.js';
import {
  type Campaign,
  type LogLayout,
  SENSOR_NAMES,
  type SensorName,
  type TimeUnit,
  type Walk,
} from '../campaign/types.js';
import type { LogSpan } from '../campaign/walk-context.js';
import { InputError } from '../errors.js';
import { buildTable } from '../tables/build.js';
import { canonicalJson } from '../tables/canonical-json.js';
import { hashOfValue, madeTheSame, provenanceMetadata } from '../tables/provenance.js';
import { readStoredIfSound, type StoredTable } from '../tables/read.js';
import { removeTable } from '../tables/remove.js';
import {
  type ReadingsImport,
  readingsAccelTable,
  readingsBaroTable,
  readingsGyroTable,
  readingsMagTable,
} from '../tables/schemas.js';
import type { AnyColumns, TableSpec } from '../tables/spec.js';
import { writeTable } from '../tables/write.js';
import { type OnHand, onHandFromFile, tablePath } from './on-hand.js';

/** Raise when the same log and layout may give other readings. */
const IMPORT_VERSION = 1;

/** The readings' tables by sensor. */
export const READINGS_TABLES: Readonly<Record<SensorName, TableSpec>> = {
  accel: readingsAccelTable,
  gyro: readingsGyroTable,
  mag: readingsMagTable,
  baro: readingsBaroTable,
};

export interface ImportedReadings {
  /** By table name, and `readings-import` with what the importer counted. */
  tables: Map<string, OnHand>;
  span: LogSpan;
  made: string[];
  kept: string[];
}

/** A walk's layout. @throws InputError where campaign.yaml has none of that name. */
export function layoutOf(campaign: Campaign, walk: Walk) {
  const layout = campaign.layouts[walk.layout];
  if (layout) return layout;
  const names = Object.keys(campaign.layouts).join(', ');
  throw new InputError(
    'no-layout',
    `walks.csv:${walk.line}: layout "${walk.layout}" is not in campaign.yaml, which has ${names}`,
  );
}

/**
 * The walk's readings as tables on disk: read from the log, or, where log and layout are what they were,
 * taken as they stand.
 */
export async function importReadings(
  campaign: Campaign,
  walk: Walk,
  resultsDir: string,
  again: boolean,
): Promise<ImportedReadings> {
  const kept = again ? null : await keptReadings(campaign, walk, resultsDir);
  if (kept) return kept;
  const layout = layoutOf(campaign, walk);
  const pathOf = readingsPaths(walk, resultsDir);
  const log = await readLog(campaign.dir, walk, layout);
  const present = SENSOR_NAMES.filter((sensor) => log[sensor] !== null);
  const tables = new Map<string, OnHand>();
  for (const sensor of SENSOR_NAMES) {
    const spec = READINGS_TABLES[sensor];
    const columns = log[sensor] as AnyColumns | null;
    if (!columns) {
      removeTable(pathOf(sensor));
      continue;
    }
    const metadata = {
      ...importMetadata(layout, sensor, log.sha256),
      t0: log.t0.value,
      t0_unit: log.t0.unit,
      'treadline.import': canonicalJson(log.counts[sensor]),
      // Told by every readings table, so that a lost one is noticed.
      'treadline.sensors': present.join(' '),
    };
    const sha256 = writeTable(pathOf(sensor), buildTable(spec, columns, metadata));
    tables.set(spec.name, { sha256, columns: () => columns });
  }
  tables.set('readings-import', importTable(log.counts));
  return {
    tables,
    span: { t0: log.t0, end_s: logEnd(tables) },
    made: [...tables.keys()].filter((name) => name !== 'readings-import'),
    kept: [],
  };
}

/** The walk's readings on disk where all of them were made of this very log and layout; else null. */
export async function keptReadings(
  campaign: Campaign,
  walk: Walk,
  resultsDir: string,
): Promise<ImportedReadings | null> {
  const layout = layoutOf(campaign, walk);
  const pathOf = readingsPaths(walk, resultsDir);
  if (!SENSOR_NAMES.some((sensor) => existsSync(pathOf(sensor)))) return null;
  const sha256 = await hashLog(campaign.dir, walk, layout);
  return storedReadings(pathOf, (sensor) => importMetadata(layout, sensor, sha256));
}

function readingsPaths(walk: Walk, resultsDir: string) {
  return (sensor: SensorName) => tablePath(resultsDir, walk.walk, READINGS_TABLES[sensor].name);
}

function importMetadata(layout: LogLayout, sensor: SensorName, sha256: string): Record<string, string> {
  return provenanceMetadata({
    stage: READINGS_TABLES[sensor].name,
    stageVersion: IMPORT_VERSION,
    method: 'import',
    settings: layout,
    inputs: { log: sha256 },
  });
}

/** Readings in memory only, for a look at a log without writing anything. */
export function readingsInMemory(log: LogReadings): ImportedReadings {
  const tables = new Map<string, OnHand>();
  for (const sensor of SENSOR_NAMES) {
    const columns = log[sensor] as AnyColumns | null;
    if (columns) tables.set(READINGS_TABLES[sensor].name, { sha256: log.sha256, columns: () => columns });
  }
  tables.set('readings-import', importTable(log.counts));
  return { tables, span: { t0: log.t0, end_s: logEnd(tables) }, made: [], kept: [] };
}

/** The stored readings where all of them were made of this very log and layout; else null. */
function storedReadings(
  pathOf: (sensor: SensorName) => string,
  expected: (sensor: SensorName) => Record<string, string>,
): ImportedReadings | null {
  const stored = new Map<SensorName, StoredTable>();
  for (const sensor of SENSOR_NAMES) {
    const table = readStoredIfSound(pathOf(sensor));
    if (!table) continue;
    if (!madeTheSame(table.metadata, expected(sensor))) return null;
    stored.set(sensor, table);
  }
  const sensors = [...stored.keys()].join(' ');
  if (stored.size === 0) return null;
  const tables = new Map<string, OnHand>();
  const counts: Partial<Record<SensorName, ImportCounts>> = {};
  let t0: LogSpan['t0'] | null = null;
  for (const [sensor, table] of stored) {
    const meta = table.metadata;
    if (meta['treadline.sensors'] !== sensors) return null;
    counts[sensor] = JSON.parse(meta['treadline.import'] ?? '{}') as ImportCounts;
    t0 = { value: meta.t0 ?? '', unit: (meta.t0_unit ?? 's') as TimeUnit };
    tables.set(READINGS_TABLES[sensor].name, onHandFromFile(table, READINGS_TABLES[sensor]));
  }
  const kept = [...tables.keys()];
  tables.set('readings-import', importTable(counts));
  return { tables, span: { t0: t0!, end_s: logEnd(tables) }, made: [], kept };
}

function importTable(counts: Readonly<Partial<Record<SensorName, ImportCounts>>>): OnHand {
  const sensors = SENSOR_NAMES.filter((sensor) => counts[sensor]);
  const numbers = (key: keyof ImportCounts) => Int32Array.from(sensors, (sensor) => counts[sensor]![key]);
  const columns: ReadingsImport = {
    sensor: sensors,
    rows: numbers('rows'),
    out_of_order: numbers('outOfOrder'),
    duplicate_times: numbers('duplicateTimes'),
    missing: numbers('missing'),
  };
  return { sha256: hashOfValue(counts), columns: () => columns };
}

function logEnd(tables: ReadonlyMap<string, OnHand>): number {
  let end = 0;
  for (const table of tables.values())
    end = Math.max(end, (table.columns().t_s as Float64Array | undefined)?.at(-1) ?? 0);
  return end;
}

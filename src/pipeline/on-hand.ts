import { join } from 'node:path';
import { columnsOf, type StoredTable } from '../tables/read.js';
import type { AnyColumns, TableSpec } from '../tables/spec.js';

/** A table that later stages may read. */
export interface OnHand {
  /** SHA-256 of its file's bytes. */
  sha256: string;
  /** Its columns; decoded on first use where they come from a file. */
  columns(): AnyColumns;
}

/** Where a walk's table stands. */
export function tablePath(resultsDir: string, walk: string, table: string): string {
  return join(resultsDir, walk, `${table}.arrow`);
}

/** A stored table, its columns decoded when first asked for. */
export function onHandFromFile(stored: StoredTable, spec: TableSpec): OnHand {
  let columns: AnyColumns | null = null;
  return {
    sha256: stored.sha256,
    columns: () => (columns ??= columnsOf(stored.table, spec, stored.path) as AnyColumns),
  };
}

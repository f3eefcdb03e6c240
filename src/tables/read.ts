import { readFileSync } from 'node:fs';
import { DataType, type Table, tableFromIPC } from 'apache-arrow';
import { InputError } from '../errors.js';
import { hashOfBytes } from './provenance.js';
import type { AnyColumns, ColumnSpec, Columns, ColumnType, ColumnValues, TableSpec } from './spec.js';

const MAGIC = 'ARROW1';

/** A table file as read. */
export interface StoredTable {
  path: string;
  table: Table;
  /** SHA-256 of the file's bytes, in hexadecimal. */
  sha256: string;
  /** The schema's metadata. */
  metadata: Readonly<Record<string, string>>;
}

/**
 * Reads an Arrow IPC file.
 *
 * @throws InputError `no-file` where there is none; `not-arrow` where it is empty, cut off, or not an
 *   Arrow IPC file (apache-arrow itself takes an empty file for an empty table).
 */
export function readStored(path: string): StoredTable {
  const bytes = readBytes(path);
  const refuse = (what: string, cause?: unknown) =>
    new InputError('not-arrow', `${path}: ${what}; write it again or name an Arrow IPC file (.arrow)`, {
      cause,
    });
  if (bytes.length === 0) throw refuse('the file is empty (0 bytes)');
  if (latin(bytes, 0) !== MAGIC) throw refuse('not an Arrow IPC file (it does not begin with ARROW1)');
  if (bytes.length < 2 * MAGIC.length || latin(bytes, bytes.length - MAGIC.length) !== MAGIC)
    throw refuse('the Arrow file is cut off (its end mark is missing)');
  try {
    const table = tableFromIPC(bytes);
    for (const vector of table.schema.fields.map((_, i) => table.getChildAt(i)!)) vector.get(0);
    return { path, table, sha256: hashOfBytes(bytes), metadata: Object.fromEntries(table.schema.metadata) };
  } catch (error) {
    throw refuse('the Arrow file is damaged', error);
  }
}

/** Reads an Arrow IPC file as an Arrow table; errors as {@link readStored}. */
export function readTable(path: string): Table {
  return readStored(path).table;
}

/** {@link readStored}, or null where there is no readable table: what a run then simply writes anew. */
export function readStoredIfSound(path: string): StoredTable | null {
  try {
    return readStored(path);
  } catch (error) {
    if (error instanceof InputError) return null;
    throw error;
  }
}

/**
 * A table's columns as plain arrays; columns that `spec` does not know are left aside.
 *
 * @param where - the file, for messages.
 * @throws InputError `no-column`, `wrong-type`, or `has-nulls`.
 */
export function columnsOf<S extends TableSpec>(table: Table, spec: S, where: string): Columns<S> {
  const out: AnyColumns = {};
  for (const [name, column] of Object.entries(spec.columns)) {
    if (!table.getChild(name)) {
      if (column.optional) continue;
      const has = table.schema.fields.map((field) => field.name).join(', ');
      throw new InputError('no-column', `${where}: no column "${name}"; it has ${has}`);
    }
    out[name] = valuesOf(table, name, column.type, where);
  }
  return out as Columns<S>;
}

/** Reads a file and takes the columns out of it; see {@link readStored} and {@link columnsOf}. */
export function readColumns<S extends TableSpec>(path: string, spec: S): Columns<S> {
  return columnsOf(readTable(path), spec, path);
}

/** All columns of a table of ours, whatever they are called, with what the schema says of each. */
export function anyColumnsOf(table: Table, where: string): { spec: TableSpec; columns: AnyColumns } {
  const specs: Record<string, ColumnSpec> = {};
  const columns: AnyColumns = {};
  for (const field of table.schema.fields) {
    const type = columnTypeOf(field.type);
    if (!type) continue;
    const unit = field.metadata.get('unit');
    const about = field.metadata.get('about') ?? '';
    specs[field.name] = { type, optional: false, about, ...(unit ? { unit } : {}) };
    columns[field.name] = valuesOf(table, field.name, type, where);
  }
  return { spec: { name: table.schema.metadata.get('treadline.stage') ?? '', columns: specs }, columns };
}

function readBytes(path: string): Buffer {
  try {
    return readFileSync(path);
  } catch (error) {
    const code = (error as NodeJS.ErrnoException).code;
    if (code === 'ENOENT') throw new InputError('no-file', `${path}: no such file`, { cause: error });
    if (code === 'EISDIR')
      throw new InputError('no-file', `${path}: is a folder; name a table file in it`, { cause: error });
    throw new InputError('no-file', `${path}: cannot be read (${code ?? String(error)})`, { cause: error });
  }
}

function latin(bytes: Buffer, from: number): string {
  return bytes.toString('latin1', from, from + MAGIC.length);
}

function columnTypeOf(type: DataType): ColumnType | null {
  if (DataType.isFloat(type)) return 'f64';
  if (DataType.isInt(type) && type.bitWidth === 32 && type.isSigned) return 'i32';
  if (DataType.isBool(type)) return 'bool';
  return DataType.isUtf8(type) || DataType.isDictionary(type) ? 'utf8' : null;
}

function valuesOf(table: Table, name: string, type: ColumnType, where: string): ColumnValues<ColumnType> {
  const vector = table.getChild(name)!;
  if (vector.nullCount > 0)
    throw new InputError('has-nulls', `${where}: column "${name}" has ${vector.nullCount} empty cells`);
  const wrong = () =>
    new InputError('wrong-type', `${where}: column "${name}" is ${vector.type}, must be ${type}`);
  switch (type) {
    case 'f64': {
      const values: unknown = vector.toArray();
      if (values instanceof Float64Array) return values;
      if (values instanceof Float32Array) return Float64Array.from(values);
      throw wrong();
    }
    case 'i32': {
      const values: unknown = vector.toArray();
      if (values instanceof Int32Array) return values;
      throw wrong();
    }
    case 'bool': {
      if (!DataType.isBool(vector.type)) throw wrong();
      return Uint8Array.from({ length: vector.length }, (_, i) => (vector.get(i) ? 1 : 0));
    }
    case 'utf8': {
      if (columnTypeOf(vector.type) !== 'utf8') throw wrong();
      return Array.from({ length: vector.length }, (_, i) => String(vector.get(i)));
    }
  }
}

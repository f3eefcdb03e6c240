/**
 * What a table promises: its columns, in order, each with its type and unit.
 *
 * Numeric code sees a table as plain typed arrays (`Columns<Spec>`); only this folder knows Arrow.
 */

/** Value type of a column: float64, int32, flag or text. */
export type ColumnType = 'f64' | 'i32' | 'bool' | 'utf8';

export interface ColumnSpec<T extends ColumnType = ColumnType, Optional extends boolean = boolean> {
  readonly type: T;
  /** The unit as its name's suffix writes it (`m`, `s`, `mps2`, ...); none for counts, ids and flags. */
  readonly unit?: string;
  /** True where a table may lack the column (a sensor that the log does not have). */
  readonly optional: Optional;
  /** One line for people: what the column holds. */
  readonly about: string;
}

export interface TableSpec<C extends Record<string, ColumnSpec> = Record<string, ColumnSpec>> {
  readonly name: string;
  readonly columns: C;
}

/** Typed array that carries a column of the given type; flags are 0 or 1 in a `Uint8Array`. */
export type ColumnValues<T extends ColumnType> = T extends 'f64'
  ? Float64Array
  : T extends 'i32'
    ? Int32Array
    : T extends 'bool'
      ? Uint8Array
      : readonly string[];

type RequiredKeys<C extends Record<string, ColumnSpec>> = {
  [K in keyof C]: C[K]['optional'] extends true ? never : K;
}[keyof C];
type OptionalKeys<C extends Record<string, ColumnSpec>> = {
  [K in keyof C]: C[K]['optional'] extends true ? K : never;
}[keyof C];

/** The columns of a table as typed arrays of one common length. */
export type Columns<S extends TableSpec> = {
  [K in RequiredKeys<S['columns']>]: ColumnValues<S['columns'][K]['type']>;
} & {
  [K in OptionalKeys<S['columns']>]?: ColumnValues<S['columns'][K]['type']> | undefined;
};

/** Columns whose names are not known to the compiler. */
export type AnyColumns = Record<string, ColumnValues<ColumnType> | undefined>;

/** A float64 column with its unit; pass '' for a pure number. */
export function f64(unit: string, about: string): ColumnSpec<'f64', false> {
  return unit === ''
    ? { type: 'f64', optional: false, about }
    : { type: 'f64', unit, optional: false, about };
}

/** A float64 column that a table may lack. */
export function optionalF64(unit: string, about: string): ColumnSpec<'f64', true> {
  return { type: 'f64', unit, optional: true, about };
}

/** An int32 column: a count or a number of order. */
export function i32(about: string): ColumnSpec<'i32', false> {
  return { type: 'i32', optional: false, about };
}

/** A flag. */
export function bool(about: string): ColumnSpec<'bool', false> {
  return { type: 'bool', optional: false, about };
}

/** A text column. */
export function utf8(about: string): ColumnSpec<'utf8', false> {
  return { type: 'utf8', optional: false, about };
}

/** Names a table and its columns. */
export function defineTable<C extends Record<string, ColumnSpec>>(name: string, columns: C): TableSpec<C> {
  return { name, columns };
}

/** Number of rows; 0 for a table without columns. */
export function rowCount(columns: AnyColumns): number {
  for (const values of Object.values(columns)) if (values) return values.length;
  return 0;
}

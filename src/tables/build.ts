import {
  Bool,
  type Data,
  type DataType,
  Field,
  Float64,
  Int32,
  makeData,
  RecordBatch,
  Schema,
  Struct,
  Table,
  Utf8,
  vectorFromArray,
} from 'apache-arrow';
import type { AnyColumns, ColumnSpec, ColumnType, ColumnValues, TableSpec } from './spec.js';

const ARROW_TYPES: Record<ColumnType, () => DataType> = {
  f64: () => new Float64(),
  i32: () => new Int32(),
  bool: () => new Bool(),
  utf8: () => new Utf8(),
};

function packBits(flags: Uint8Array): Uint8Array {
  const bits = new Uint8Array(Math.ceil(flags.length / 64) * 8);
  for (let i = 0; i < flags.length; i++) if (flags[i]) bits[i >> 3]! |= 1 << (i & 7);
  return bits;
}

function columnData(spec: ColumnSpec, values: ColumnValues<ColumnType>): Data {
  const length = values.length;
  switch (spec.type) {
    case 'f64':
      return makeData({ type: new Float64(), length, nullCount: 0, data: values as Float64Array });
    case 'i32':
      return makeData({ type: new Int32(), length, nullCount: 0, data: values as Int32Array });
    case 'bool':
      return makeData({ type: new Bool(), length, nullCount: 0, data: packBits(values as Uint8Array) });
    case 'utf8':
      return length === 0
        ? makeData({
            type: new Utf8(),
            length: 0,
            nullCount: 0,
            valueOffsets: new Int32Array(1),
            data: new Uint8Array(0),
          })
        : vectorFromArray(values as readonly string[], new Utf8()).data[0]!;
  }
}

/**
 * An Arrow table of one batch from plain columns, checked against what the table promises.
 *
 * @param spec - names, types and units, in the order to write.
 * @param columns - one array per column; optional columns may be missing. Extra columns are refused.
 * @param metadata - schema metadata, text to text.
 * @throws Error on a missing, extra, mistyped or unequal column: a stage broke its promise, which is our bug.
 */
export function buildTable(spec: TableSpec, columns: AnyColumns, metadata: Record<string, string>): Table {
  for (const name of Object.keys(columns))
    if (!spec.columns[name] && columns[name])
      throw new Error(`${spec.name}: column "${name}" is not in the table's schema`);
  const fields: Field[] = [];
  const children: Data[] = [];
  let length = -1;
  for (const [name, column] of Object.entries(spec.columns)) {
    const values = columns[name];
    if (!values) {
      if (column.optional) continue;
      throw new Error(`${spec.name}: column "${name}" is missing`);
    }
    if (length === -1) length = values.length;
    // Arrow pads short columns with nulls without a word, so unequal lengths are refused here.
    if (values.length !== length)
      throw new Error(`${spec.name}: column "${name}" has ${values.length} rows, expected ${length}`);
    const meta = new Map<string, string>();
    if (column.unit) meta.set('unit', column.unit);
    meta.set('about', column.about);
    fields.push(new Field(name, ARROW_TYPES[column.type](), false, meta));
    children.push(columnData(column, values));
  }
  const schema = new Schema(fields, new Map(Object.entries(metadata)));
  const data = makeData({ type: new Struct(fields), length: Math.max(length, 0), nullCount: 0, children });
  return new Table(schema, new RecordBatch(schema, data));
}

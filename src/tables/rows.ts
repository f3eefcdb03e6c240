import type { AnyColumns } from './spec.js';

/** A cell as JSON takes it: what is not a number is null. */
export type JsonCell = number | string | null;

/** Rows as objects, as JSON prints them; numbers that are not finite become null. */
export function rowsOf(columns: AnyColumns): Record<string, JsonCell>[] {
  const names = Object.keys(columns).filter((name) => columns[name]);
  const n = names.length > 0 ? columns[names[0]!]!.length : 0;
  return Array.from({ length: n }, (_, i) =>
    Object.fromEntries(
      names.map((name) => {
        const value = columns[name]![i]!;
        return [name, typeof value === 'number' && !Number.isFinite(value) ? null : value];
      }),
    ),
  );
}

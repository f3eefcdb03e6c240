import { rmSync } from 'node:fs';

/** Removes a table that no longer holds; nothing happens where there is none. */
export function removeTable(path: string): void {
  rmSync(path, { force: true });
}

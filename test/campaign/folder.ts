import { mkdirSync, mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { dirname, join } from 'node:path';
import { afterAll } from 'vitest';

const made: string[] = [];

/** A folder with the given files, removed after the test file's last test. */
export function folderWith(files: Readonly<Record<string, string | Uint8Array>>): string {
  const dir = mkdtempSync(join(tmpdir(), 'treadline-campaign-'));
  made.push(dir);
  for (const [name, content] of Object.entries(files)) {
    mkdirSync(dirname(join(dir, name)), { recursive: true });
    writeFileSync(join(dir, name), content);
  }
  return dir;
}

afterAll(() => {
  for (const dir of made.splice(0)) rmSync(dir, { recursive: true, force: true });
});

/** The message of what `run` throws; fails the test where it throws nothing. */
export async function messageFrom(run: () => unknown): Promise<string> {
  try {
    await run();
  } catch (error) {
    return (error as Error).message;
  }
  throw new Error('nothing was thrown');
}

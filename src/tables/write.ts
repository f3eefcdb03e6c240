import { createHash, randomBytes } from 'node:crypto';
import { closeSync, fsyncSync, mkdirSync, openSync, renameSync, rmSync, writeSync } from 'node:fs';
import { basename, dirname, join } from 'node:path';
import { AsyncByteQueue, RecordBatchFileWriter, type Table } from 'apache-arrow';

/** Writes all of a chunk: one `write` may take less than it was given. */
function writeAll(fd: number, bytes: Uint8Array): void {
  let done = 0;
  while (done < bytes.length) done += writeSync(fd, bytes, done, bytes.length - done);
}

/**
 * Writes a file whole or not at all: into a new file beside it, then renamed over it.
 *
 * @param path - where the file shall stand; its folder is made if missing.
 * @param chunks - its content, in order.
 * @returns SHA-256 of the content, in hexadecimal.
 */
export function writeWhole(path: string, chunks: Iterable<Uint8Array>): string {
  const folder = dirname(path);
  mkdirSync(folder, { recursive: true });
  // A name of its own per writer: two runs on one folder must not write into each other's half-made file.
  const beside = join(folder, `.${basename(path)}.${process.pid}-${randomBytes(4).toString('hex')}.tmp`);
  const hash = createHash('sha256');
  let fd = -1;
  try {
    fd = openSync(beside, 'wx');
    for (const chunk of chunks) {
      hash.update(chunk);
      writeAll(fd, chunk);
    }
    fsyncSync(fd);
    closeSync(fd);
    fd = -1;
    renameSync(beside, path);
  } catch (error) {
    if (fd !== -1) closeSync(fd);
    rmSync(beside, { force: true });
    throw error;
  }
  return hash.digest('hex');
}

/** Writes text whole or not at all, as UTF-8; see {@link writeWhole}. */
export function writeText(path: string, text: string): string {
  return writeWhole(path, [Buffer.from(text, 'utf8')]);
}

/** Takes a writer's chunks as they come, so that they can be written without waiting. */
class ChunkList extends AsyncByteQueue<Uint8Array> {
  readonly chunks: Uint8Array[] = [];

  override write(chunk: Uint8Array): void {
    if (chunk.byteLength > 0) this.chunks.push(chunk);
  }
}

/**
 * Writes a table as an Arrow IPC file, uncompressed, whole or not at all.
 *
 * Chunk by chunk: apache-arrow's one-buffer writers merge chunks that overlap in memory and then
 * write wrong numbers (its issue 315).
 *
 * @returns SHA-256 of the file's bytes, in hexadecimal.
 */
export function writeTable(path: string, table: Table): string {
  const list = new ChunkList();
  new RecordBatchFileWriter().reset(list).writeAll(table);
  return writeWhole(path, list.chunks);
}

import type { Hash } from 'node:crypto';
import { createReadStream } from 'node:fs';
import { pipeline, Readable } from 'node:stream';
import { createGunzip } from 'node:zlib';
import { InputError, messageOf } from '../../errors.js';

const CHUNK_BYTES = 256 * 1024;

function refuse(label: string, error: unknown): never {
  const code = (error as { code?: string } | null)?.code ?? '';
  if (error instanceof InputError) throw error;
  if (code === 'ENOENT' || code === 'ENOTDIR')
    throw new InputError(
      'no-log',
      `${label}: there is no such file; put the log there, or mend its path in walks.csv`,
    );
  if (code === 'EISDIR')
    throw new InputError(
      'no-log',
      `${label}: is a folder; only a split layout reads one, other layouts need the file`,
    );
  if (code === 'Z_BUF_ERROR')
    throw new InputError('corrupt-log', `${label}: its gzip data ends too early; copy the file again`);
  if (code.startsWith('Z_'))
    throw new InputError(
      'corrupt-log',
      `${label}: its gzip data is damaged (${messageOf(error)}); copy the file again`,
    );
  if (code.startsWith('E'))
    throw new InputError('unreadable-log', `${label}: cannot be read (${messageOf(error)})`);
  throw error;
}

/** A file's bytes as stored, chunk by chunk, each taken into the hash. @throws InputError where it cannot be read. */
export async function* storedBytes(path: string, label: string, hash: Hash): AsyncGenerator<Buffer> {
  try {
    for await (const chunk of createReadStream(path, { highWaterMark: CHUNK_BYTES })) {
      hash.update(chunk as Buffer);
      yield chunk as Buffer;
    }
  } catch (error) {
    refuse(label, error);
  }
}

/**
 * A file's content, chunk by chunk: unzipped where its first bytes are gzip's, whatever it is called.
 *
 * The bytes as stored are taken into the hash on the way, all of them once the last chunk has come.
 */
export async function* unzippedBytes(path: string, label: string, hash: Hash): AsyncGenerator<Buffer> {
  const stored = storedBytes(path, label, hash);
  const first = await stored.next();
  if (first.done) return;
  const zipped = first.value[0] === 0x1f && first.value[1] === 0x8b;
  if (!zipped) {
    yield first.value;
    yield* stored;
    return;
  }
  async function* all() {
    yield first.value as Buffer;
    yield* stored;
  }
  const gunzip = createGunzip({ chunkSize: CHUNK_BYTES });
  pipeline(Readable.from(all(), { objectMode: false }), gunzip, () => {});
  try {
    for await (const chunk of gunzip) yield chunk as Buffer;
    // Whatever follows the gzip data is part of the file as stored.
    for await (const _ of stored);
  } catch (error) {
    refuse(label, error);
  }
}

import { createHash } from 'node:crypto';
import { VERSION } from '../version.js';
import { canonicalJson } from './canonical-json.js';

/** What made a table; see {@link provenanceMetadata} for how it stands in the file. */
export interface Provenance {
  stage: string;
  /** Version of the method: raised when the same input may give another output. */
  stageVersion: number;
  method: string;
  settings: unknown;
  /** SHA-256 of each input's bytes, in hexadecimal, by the input's name. */
  inputs: Readonly<Record<string, string>>;
}

/** Schema metadata that says what made a table: all of it is text, JSON where it has parts. */
export function provenanceMetadata(made: Provenance): Record<string, string> {
  return { ...methodMetadata(made), 'treadline.inputs': canonicalJson(made.inputs) };
}

/** {@link provenanceMetadata} without the inputs: how a table was made, whatever of. */
export function methodMetadata(made: Omit<Provenance, 'inputs'>): Record<string, string> {
  return {
    'treadline.version': VERSION,
    'treadline.stage': made.stage,
    'treadline.stage_version': String(made.stageVersion),
    'treadline.method': made.method,
    'treadline.settings': canonicalJson(made.settings),
  };
}

/** True where every key of `expected` stands in `found` with the same text. */
export function madeTheSame(
  found: Readonly<Record<string, string>>,
  expected: Readonly<Record<string, string>>,
): boolean {
  return Object.entries(expected).every(([key, value]) => found[key] === value);
}

/** SHA-256, in hexadecimal, of a plain value's canonical JSON. */
export function hashOfValue(value: unknown): string {
  return hashOfBytes(canonicalJson(value ?? null));
}

/** SHA-256, in hexadecimal, of bytes or of text as UTF-8. */
export function hashOfBytes(bytes: Uint8Array | string): string {
  return createHash('sha256').update(bytes).digest('hex');
}

import { InputError } from '../../errors.js';

const LF = 0x0a;
const CR = 0x0d;
const QUOTE = 0x22;
const SPACE = 0x20;
const TAB = 0x09;

/** No logger writes a line this long: it is not a CSV file, or a quote was never closed. */
const LONGEST_LINE = 1024 * 1024;

/**
 * Splits CSV bytes into rows of fields, chunk by chunk, without making a string of any.
 *
 * Use: `push` a chunk, call `next` until it returns false, push the next; `end` after the last. Fields
 * of the present row are [`starts[i]`, `ends[i]`) of `bytes`, blanks around them removed; quotes are
 * taken off. Blank lines are passed over. Both kinds of line end and a byte order mark are understood.
 */
export class CsvScanner {
  bytes = Buffer.allocUnsafe(512 * 1024);
  starts = new Int32Array(64);
  ends = new Int32Array(64);
  quoted = new Uint8Array(64);
  nFields = 0;
  /** The line of the file, from 1, on which the present row begins. */
  row = 0;
  /** The byte between fields; runs of blanks count as one. */
  delimiter = 0x2c;
  readonly #label: string;
  #position = 0;
  #length = 0;
  #nextLine = 1;
  #ended = false;
  #begun = false;

  constructor(label: string) {
    this.#label = label;
  }

  /** What has been pushed and not yet been passed by `next`. */
  get pending(): Buffer {
    return this.bytes.subarray(this.#position, this.#length);
  }

  push(chunk: Uint8Array): void {
    const rest = this.#length - this.#position;
    const needed = rest + chunk.length;
    const kept = this.bytes;
    if (needed > kept.length) this.bytes = Buffer.allocUnsafe(2 * needed);
    kept.copy(this.bytes, 0, this.#position, this.#length);
    this.bytes.set(chunk, rest);
    this.#position = 0;
    this.#length = needed;
    // The mark is three bytes; a chunk may bring fewer of them.
    if (!this.#begun && needed >= 3) {
      this.#begun = true;
      if (this.bytes[0] === 0xef && this.bytes[1] === 0xbb && this.bytes[2] === 0xbf) this.#position = 3;
    }
  }

  get ended(): boolean {
    return this.#ended;
  }

  end(): void {
    this.#ended = true;
  }

  /**
   * Moves to the next row.
   *
   * @returns false where no complete row is left in what has been pushed.
   * @throws InputError `malformed-csv` on a line beyond 1 MB or misplaced quotes.
   */
  next(): boolean {
    if (!this.#begun && !this.#ended) return false;
    while (this.#position < this.#length) {
      const blank = this.#scan();
      if (blank === null) return false;
      if (!blank) return true;
    }
    return false;
  }

  /** Scans one row. @returns whether it is blank; null where it is not complete. */
  #scan(): boolean | null {
    const { bytes, delimiter } = this;
    const length = this.#length;
    const begin = this.#position;
    let at = begin;
    let nFields = 0;
    let nLines = 1;
    for (;;) {
      if (delimiter === SPACE) while (at < length && bytes[at] === SPACE) at++;
      let start = at;
      let end: number;
      const quoted = at < length && bytes[at] === QUOTE;
      if (quoted) {
        start = at + 1;
        at = this.#closingQuote(start);
        if (at === -1 || (at + 1 >= length && !this.#ended)) return this.#incomplete(begin, at === -1);
        end = at;
        for (let inside = start; inside < end; inside++) if (bytes[inside] === LF) nLines++;
        at++;
        while (at < length && (bytes[at] === CR || (bytes[at] === SPACE && delimiter !== SPACE))) at++;
        if (at < length && bytes[at] !== delimiter && bytes[at] !== LF)
          throw new InputError(
            'malformed-csv',
            `${this.#label} row ${this.#nextLine}: text follows a closing quote; double the quotes inside a quoted field`,
          );
      } else {
        let byte = 0;
        while (at < length && (byte = bytes[at]!) !== delimiter && byte !== LF) at++;
        end = at;
      }
      if (at >= length && !this.#ended) return this.#incomplete(begin, false);
      while (start < end && isBlank(bytes[start]!)) start++;
      while (start < end && isBlank(bytes[end - 1]!)) end--;
      // A blank before the line's end does not begin another field.
      if (delimiter !== SPACE || start < end || quoted || nFields === 0) {
        if (nFields === this.starts.length) this.#growFields();
        this.starts[nFields] = start;
        this.ends[nFields] = end;
        this.quoted[nFields] = quoted ? 1 : 0;
        nFields++;
      }
      if (at >= length || bytes[at] === LF) break;
      at++;
    }
    this.#position = Math.min(at + 1, length);
    this.nFields = nFields;
    this.row = this.#nextLine;
    this.#nextLine += nLines;
    return nFields === 1 && this.starts[0] === this.ends[0];
  }

  #closingQuote(from: number): number {
    for (let at = from; at < this.#length; at++) {
      if (this.bytes[at] !== QUOTE) continue;
      if (this.bytes[at + 1] !== QUOTE || at + 1 >= this.#length) return at;
      at++;
    }
    return -1;
  }

  #incomplete(begin: number, inQuotes: boolean): null {
    if (this.#ended && inQuotes)
      throw new InputError(
        'malformed-csv',
        `${this.#label} row ${this.#nextLine}: a quote is opened and never closed`,
      );
    if (this.#length - begin > LONGEST_LINE)
      throw new InputError(
        'malformed-csv',
        `${this.#label} row ${this.#nextLine}: the line is longer than 1 MB; this is not a CSV log`,
      );
    return null;
  }

  #growFields(): void {
    const longer = (indices: Int32Array<ArrayBuffer>) => {
      const grown = new Int32Array(indices.length * 2);
      grown.set(indices);
      return grown;
    };
    this.starts = longer(this.starts);
    this.ends = longer(this.ends);
    const flags = new Uint8Array(this.quoted.length * 2);
    flags.set(this.quoted);
    this.quoted = flags;
  }

  /** A field as text, doubled quotes of a quoted field made single; empty where the row does not have it. */
  text(field: number): string {
    if (field >= this.nFields) return '';
    const text = this.bytes.toString('utf8', this.starts[field]!, this.ends[field]!);
    return this.quoted[field] ? text.replaceAll('""', '"') : text;
  }

  /** All fields of the row as text. */
  texts(): string[] {
    return Array.from({ length: this.nFields }, (_, field) => this.text(field));
  }
}

function isBlank(byte: number): boolean {
  return byte === SPACE || byte === TAB || byte === CR;
}

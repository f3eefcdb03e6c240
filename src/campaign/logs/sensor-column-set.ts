import { compareStamps, type Stamp, secondsBetween } from '../exact-time.js';
import type { ImportCounts } from '../readings.js';

/** One sensor's readings while its log is read: growing columns of exact stamps and values as the file has them. */
export class SensorColumnSet {
  #seconds = new Float64Array(1024);
  #femtos = new Float64Array(1024);
  #values: Float64Array[];
  #count = 0;
  /** Readings left out because a value or the time was empty or not a number. */
  missing = 0;

  constructor(nAxes: number) {
    this.#values = Array.from({ length: nAxes }, () => new Float64Array(1024));
  }

  get count(): number {
    return this.#count;
  }

  /** Adds a reading, one value an axis. */
  push(seconds: number, femtos: number, values: Float64Array): void {
    const row = this.#count;
    if (row === this.#seconds.length) this.#grow();
    this.#seconds[row] = seconds;
    this.#femtos[row] = femtos;
    for (let axis = 0; axis < this.#values.length; axis++) this.#values[axis]![row] = values[axis]!;
    this.#count++;
  }

  #grow(): void {
    const grown = (column: Float64Array) => {
      const longer = new Float64Array(column.length * 2);
      longer.set(column);
      return longer;
    };
    this.#seconds = grown(this.#seconds);
    this.#femtos = grown(this.#femtos);
    this.#values = this.#values.map(grown);
  }

  /**
   * The readings in time order, those of one instant in file order.
   *
   * @param start - what times count from.
   */
  inTimeOrder(start: Stamp): { t_s: Float64Array; values: Float64Array[]; counts: ImportCounts } {
    const n = this.#count;
    const seconds = this.#seconds;
    const femtos = this.#femtos;
    let outOfOrder = 0;
    let duplicateTimes = 0;
    for (let row = 1; row < n; row++) {
      const step = compareStamps(seconds[row]!, femtos[row]!, seconds[row - 1]!, femtos[row - 1]!);
      if (step < 0) outOfOrder++;
      else if (step === 0) duplicateTimes++;
    }
    if (outOfOrder > 0) duplicateTimes = this.#sort();
    const t_s = new Float64Array(n);
    for (let row = 0; row < n; row++)
      t_s[row] = secondsBetween(this.#seconds[row]!, this.#femtos[row]!, start.seconds, start.femtos);
    const values = this.#values.map((column) => column.slice(0, n));
    return { t_s, values, counts: { rows: n, outOfOrder, duplicateTimes, missing: this.missing } };
  }

  /** Sorts all columns by time, keeping the file's order within one instant. @returns readings that share their time with the one before. */
  #sort(): number {
    const n = this.#count;
    const seconds = this.#seconds;
    const femtos = this.#femtos;
    const compare = (a: number, b: number) => compareStamps(seconds[a]!, femtos[a]!, seconds[b]!, femtos[b]!);
    const order = new Uint32Array(n);
    for (let row = 0; row < n; row++) order[row] = row;
    order.sort((a, b) => compare(a, b) || a - b);
    let shared = 0;
    for (let i = 1; i < n; i++) if (compare(order[i]!, order[i - 1]!) === 0) shared++;
    const sorted = (column: Float64Array) => {
      const result = new Float64Array(n);
      for (let i = 0; i < n; i++) result[i] = column[order[i]!]!;
      return result;
    };
    this.#seconds = sorted(seconds);
    this.#femtos = sorted(femtos);
    this.#values = this.#values.map(sorted);
    return shared;
  }
}

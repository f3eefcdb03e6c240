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

  /** Adds a reading; `values` holds its axes from index `from` on. */
  push(seconds: number, femtos: number, values: Float64Array, from: number): void {
    const row = this.#count;
    if (row === this.#seconds.length) this.#grow();
    this.#seconds[row] = seconds;
    this.#femtos[row] = femtos;
    for (let axis = 0; axis < this.#values.length; axis++) this.#values[axis]![row] = values[from + axis]!;
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
    const compare = (a: number, b: number) => compareStamps(seconds[a]!, femtos[a]!, seconds[b]!, femtos[b]!);
    let outOfOrder = 0;
    for (let row = 1; row < n; row++) if (compare(row, row - 1) < 0) outOfOrder++;
    const order = Uint32Array.from({ length: n }, (_, row) => row);
    if (outOfOrder > 0) order.sort((a, b) => compare(a, b) || a - b);
    let duplicateTimes = 0;
    for (let i = 1; i < n; i++) if (compare(order[i]!, order[i - 1]!) === 0) duplicateTimes++;
    const t_s = new Float64Array(n);
    for (let i = 0; i < n; i++) {
      const row = order[i]!;
      t_s[i] = secondsBetween(seconds[row]!, femtos[row]!, start.seconds, start.femtos);
    }
    const values = this.#values.map((column) => {
      const sorted = new Float64Array(n);
      for (let i = 0; i < n; i++) sorted[i] = column[order[i]!]!;
      return sorted;
    });
    return { t_s, values, counts: { rows: n, outOfOrder, duplicateTimes, missing: this.missing } };
  }
}

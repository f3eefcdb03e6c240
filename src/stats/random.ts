import { createHash } from 'node:crypto';
import { xoroshiro128plusFromState } from 'pure-rand/generator/xoroshiro128plus';
import { InputError } from '../errors.js';

/** Random numbers that are the same on every machine for the same seed and labels. */
export interface RandomStream {
  /** A multiple of 2^-53 in [0, 1). */
  uniform(): number;
  /** Standard normal deviate. */
  normal(): number;
  /** A whole number in [lo, hiExclusive), without bias; at most 2^32 of them. */
  integer(lo: number, hiExclusive: number): number;
  /** Reorders in place, every order equally likely, and returns its argument. */
  shuffle<T extends { length: number; [index: number]: unknown }>(items: T): T;
}

const TWO_32 = 2 ** 32;

/**
 * A stream of its own for each seed and labels.
 *
 * Label streams by what they feed (`randomStream(seed, walk, 'gyro')`), not by when they are drawn: then
 * adding a walk or a sensor leaves all other numbers as they were. The generator is xoroshiro128+; its
 * state is the SHA-256 of the JSON text of seed and labels, so that no two label lists run into each other.
 * The weak low bits of each 32-bit output are not used.
 *
 * @param seed - a whole number, within ±2^53.
 * @param labels - words or finite numbers; 1 and '1' are two labels.
 * @throws InputError `seed`, `label`; `integer` and `shuffle` throw `range`.
 * @see Blackman & Vigna (2021), ACM TOMS 47(4), 36 (the generator).
 * @see Doornik (2005), An improved ziggurat method to generate normal random samples, Oxford (ZIGNOR).
 */
export function randomStream(seed: number, ...labels: (string | number)[]): RandomStream {
  if (!Number.isSafeInteger(seed))
    throw new InputError('seed', `seed must be a whole number within ±2^53, got ${seed}`);
  for (const label of labels)
    if (typeof label === 'number' && !Number.isFinite(label))
      throw new InputError('label', `randomStream: a label must be a word or a finite number, got ${label}`);
  const digest = createHash('sha256')
    .update(JSON.stringify([seed, ...labels]))
    .digest();
  const generator = xoroshiro128plusFromState([0, 4, 8, 12].map((at) => digest.readInt32LE(at)));

  function uniform(): number {
    const high = generator.next() >>> 5;
    const low = generator.next() >>> 6;
    return (high * 67108864 + low) * 2 ** -53;
  }

  function normal(): number {
    for (;;) {
      const first = generator.next() >>> 0;
      const layer = first >>> 25;
      // 25 + 28 further bits make a uniform in [-1, 1).
      const u = ((first & 0x1ffffff) * 268435456 + (generator.next() >>> 4)) * 2 ** -52 - 1;
      if (Math.abs(u) < LAYER_RATIO[layer]!) return u * LAYER_EDGE[layer]!;
      if (layer === 0) return tail(u < 0);
      const x = u * LAYER_EDGE[layer]!;
      const outer = Math.exp(-0.5 * (LAYER_EDGE[layer]! ** 2 - x * x));
      const inner = Math.exp(-0.5 * (LAYER_EDGE[layer + 1]! ** 2 - x * x));
      if (inner + uniform() * (outer - inner) < 1) return x;
    }
  }

  /** Beyond the outermost layer. */
  function tail(negative: boolean): number {
    for (;;) {
      const x = Math.log(1 - uniform()) / TAIL_START;
      const y = Math.log(1 - uniform());
      if (-2 * y >= x * x) return negative ? x - TAIL_START : TAIL_START - x;
    }
  }

  function integer(lo: number, hiExclusive: number): number {
    const size = hiExclusive - lo;
    if (!(size >= 1 && size <= TWO_32 && Number.isSafeInteger(lo) && Number.isSafeInteger(hiExclusive)))
      throw new InputError(
        'range',
        `integer: needs whole numbers lo < hiExclusive, at most 2^32 apart, got ${lo} and ${hiExclusive}`,
      );
    // Scaled, so that the strong high bits decide; words that would favour some values are drawn again.
    const wordsPerValue = Math.floor(TWO_32 / size);
    for (;;) {
      const value = Math.floor((generator.next() >>> 0) / wordsPerValue);
      if (value < size) return lo + value;
    }
  }

  function shuffle<T extends { length: number; [index: number]: unknown }>(items: T): T {
    for (let last = items.length - 1; last > 0; last--) {
      const other = integer(0, last + 1);
      const kept = items[last];
      items[last] = items[other];
      items[other] = kept;
    }
    return items;
  }

  return { uniform, normal, integer, shuffle };
}

const LAYERS = 128;
/** Where the tail begins and the area of each of 128 layers under exp(-x²/2). */
const TAIL_START = 3.442619855899;
const LAYER_AREA = 9.91256303526217e-3;

const LAYER_EDGE = new Float64Array(LAYERS + 1);
const LAYER_RATIO = new Float64Array(LAYERS);
{
  let density = Math.exp(-0.5 * TAIL_START * TAIL_START);
  LAYER_EDGE[0] = LAYER_AREA / density;
  LAYER_EDGE[1] = TAIL_START;
  for (let i = 2; i < LAYERS; i++) {
    LAYER_EDGE[i] = Math.sqrt(-2 * Math.log(LAYER_AREA / LAYER_EDGE[i - 1]! + density));
    density = Math.exp(-0.5 * LAYER_EDGE[i]! ** 2);
  }
  LAYER_EDGE[LAYERS] = 0;
  for (let i = 0; i < LAYERS; i++) LAYER_RATIO[i] = LAYER_EDGE[i + 1]! / LAYER_EDGE[i]!;
}

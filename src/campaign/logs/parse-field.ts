import { parseStamp, UNIT_DIGITS } from '../exact-time.js';
import type { TimeUnit } from '../types.js';

/** Exact powers of ten: a whole number below 2^53 divided by one of them is rounded once, so it is the nearest float64. */
const TEN = Float64Array.from({ length: 23 }, (_, n) => Number(`1e${n}`));

const ZERO = 0x30;
const NINE = 0x39;
const DOT = 0x2e;

/** What a field turned out to be. */
export const FIELD = { good: 0, missing: 1, bad: 2 } as const;

const NUMBER = /^[+-]?(\d+\.?\d*|\.\d+)([eE][+-]?\d+)?$/;
const MISSING = /^(nan|null|na|n\/a)?$/i;

function textOf(bytes: Buffer, start: number, end: number, decimal: number): string {
  const text = bytes.toString('latin1', start, end);
  return decimal === DOT ? text : text.replaceAll('.', '\0').replace(String.fromCharCode(decimal), '.');
}

function parseSlowly(text: string): number {
  if (MISSING.test(text)) return Number.NaN;
  const value = NUMBER.test(text) ? Number(text) : Number.POSITIVE_INFINITY;
  return Number.isFinite(value) ? value : Number.POSITIVE_INFINITY;
}

/**
 * The number in a field of a log: the float64 nearest to what is written.
 *
 * @param bytes - the field is [start, end), blanks around it removed.
 * @param decimal - the decimal sign's byte.
 * @returns NaN where there is no number (empty, NaN, NA, N/A, null in any case); Infinity where the
 *   field is something else than a finite decimal number.
 */
export function parseNumber(bytes: Buffer, start: number, end: number, decimal: number): number {
  let at = start;
  let negative = false;
  if (bytes[at] === 0x2d) {
    negative = true;
    at++;
  }
  const begin = at;
  let mantissa = 0;
  let digit = 0;
  while (at < end && (digit = bytes[at]! - ZERO) >= 0 && digit <= 9) {
    mantissa = mantissa * 10 + digit;
    at++;
  }
  let nDecimals = 0;
  if (at < end && bytes[at] === decimal) {
    at++;
    const point = at;
    while (at < end && (digit = bytes[at]! - ZERO) >= 0 && digit <= 9) {
      mantissa = mantissa * 10 + digit;
      at++;
    }
    nDecimals = at - point;
    if (nDecimals === 0 && point - begin === 1) return parseSlowly(textOf(bytes, start, end, decimal));
  }
  if (at < end || at === begin) return parseSlowly(textOf(bytes, start, end, decimal));
  // 15 digits are below 2^53; more of them take the language's own, slower way, which is right for any number.
  if (at - begin > 15) return Number(textOf(bytes, start, end, decimal));
  const value = nDecimals > 0 ? mantissa / TEN[nDecimals]! : mantissa;
  return negative ? -value : value;
}

/**
 * The time stamp in a field of a log, every digit kept.
 *
 * @param out - takes whole seconds and femtoseconds, see `Stamp`.
 * @returns one of {@link FIELD}.
 */
export function parseTime(
  bytes: Buffer,
  start: number,
  end: number,
  decimal: number,
  unit: TimeUnit,
  out: Float64Array,
): number {
  let point = start;
  while (point < end && bytes[point]! >= ZERO && bytes[point]! <= NINE) point++;
  const nWhole = point - start;
  const nDecimals = point < end ? end - point - 1 : 0;
  const shift = UNIT_DIGITS[unit];
  const plain = nWhole > 0 && nWhole - shift <= 15 && shift + nDecimals <= 15;
  if (!plain || (point < end && bytes[point] !== decimal))
    return parseTimeSlowly(bytes, start, end, decimal, unit, out);
  // Digits up to `split` are whole seconds, those behind it are decimals of a second.
  const split = point - shift;
  let seconds = 0;
  for (let at = start; at < split; at++) seconds = seconds * 10 + (bytes[at]! - ZERO);
  let decimals = 0;
  for (let at = Math.max(split, start); at < point; at++) decimals = decimals * 10 + (bytes[at]! - ZERO);
  for (let at = point + 1; at < end; at++) {
    const digit = bytes[at]! - ZERO;
    if (digit < 0 || digit > 9) return parseTimeSlowly(bytes, start, end, decimal, unit, out);
    decimals = decimals * 10 + digit;
  }
  out[0] = seconds;
  out[1] = decimals * TEN[15 - shift - nDecimals]!;
  return FIELD.good;
}

function parseTimeSlowly(
  bytes: Buffer,
  start: number,
  end: number,
  decimal: number,
  unit: TimeUnit,
  out: Float64Array,
): number {
  const text = textOf(bytes, start, end, decimal);
  if (MISSING.test(text)) return FIELD.missing;
  const stamp = parseStamp(text, unit);
  if (!stamp) return FIELD.bad;
  out[0] = stamp.seconds;
  out[1] = stamp.femtos;
  return FIELD.good;
}

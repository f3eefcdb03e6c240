import type { TimeUnit } from './types.js';

/**
 * A time stamp that keeps every digit: whole seconds and femtoseconds, both of the stamp's sign.
 *
 * Epoch nanoseconds have 19 digits, a float64 holds 15 to 17; in two parts, stamps of up to 15 digits
 * before and 15 after the decimal point (in seconds) are exact. Further digits are rounded to float64
 * in `femtos`, so far below anything a clock gives.
 */
export interface Stamp {
  /** Whole number, magnitude below 1e15. */
  seconds: number;
  /** Magnitude 0 to 1e15; a whole number unless the stamp has more than 15 decimals. */
  femtos: number;
}

/** How many of a unit's digits lie behind the seconds' decimal point. */
export const UNIT_DIGITS: Readonly<Record<TimeUnit, number>> = { s: 0, ms: 3, us: 6, ns: 9 };

const DECIMAL = /^([+-]?)(\d*)(?:\.(\d*))?(?:[eE]([+-]?\d{1,4}))?$/;

/**
 * Reads a time stamp written as a decimal number, with or without exponent.
 *
 * @returns null where it is not a decimal number or has more than 15 digits of seconds.
 */
export function parseStamp(text: string, unit: TimeUnit): Stamp | null {
  const match = DECIMAL.exec(text);
  if (!match) return null;
  const [, sign, whole = '', decimals = '', exponent = '0'] = match;
  if (whole === '' && decimals === '') return null;
  let digits = whole + decimals;
  let point = whole.length + Number(exponent) - UNIT_DIGITS[unit];
  const zeros = /^0*/.exec(digits)![0].length;
  digits = digits.slice(zeros);
  point -= zeros;
  if (digits === '') return { seconds: 0, femtos: 0 };
  if (point > 15) return null;
  const direction = sign === '-' ? -1 : 1;
  const before = point > 0 ? digits.slice(0, point).padEnd(point, '0') : '0';
  const femtos = Number(point > 0 ? `0.${digits.slice(point)}e15` : `0.${digits}e${point + 15}`);
  return { seconds: direction * Number(before), femtos: direction * femtos };
}

/** Negative where `a` is earlier than `b`, 0 where they are the same, positive where later. */
export function compareStamps(aSeconds: number, aFemtos: number, bSeconds: number, bFemtos: number): number {
  return aSeconds === bSeconds ? aFemtos - bFemtos : aSeconds - bSeconds;
}

/**
 * Seconds from stamp `b` to stamp `a`.
 *
 * The exact difference rounded once, for stamps in whole nanoseconds up to 100 days apart; beyond
 * that, within one unit in the last place.
 */
export function secondsBetween(aSeconds: number, aFemtos: number, bSeconds: number, bFemtos: number): number {
  const seconds = aSeconds - bSeconds;
  const femtos = aFemtos - bFemtos;
  const nanos = femtos / 1e6;
  // 9e6 s in nanoseconds is just below 2^53, so the sum is a whole number without rounding.
  if (Number.isInteger(nanos) && seconds < 9e6 && seconds > -9e6) return (seconds * 1e9 + nanos) / 1e9;
  return seconds + femtos / 1e15;
}

import { fault, ok, type Result } from './result.ts';

declare const unit: unique symbol;
/** A number or string whose range was checked once, at the door; inside it is known good. */
export type Branded<T, Name extends string> = T & { readonly [unit]: Name };

/** Share of units, 0 to 1 (both ends included). */
export type Fraction = Branded<number, 'Fraction'>;
/** Tail probability alpha of a one-sided statement, above 0, below 1; the complement of a confidence level. */
export type Tail = Branded<number, 'Tail'>;
/** Confidence level of a one-sided statement, above 0, below 1. */
export type Confidence = Branded<number, 'Confidence'>;
/** Whole units, 0 to 2^53 - 1. */
export type UnitCount = Branded<number, 'UnitCount'>;
/** Milliseconds since 1970-01-01 UTC; whole, not negative, up to the year 9999. */
export type EpochMs = Branded<number, 'EpochMs'>;
/** A span in milliseconds, whole, above 0. */
export type SpanMs = Branded<number, 'SpanMs'>;

/** A value outside what its place accepts: which place, what it held, what was expected. */
export interface OutOfRange {
  readonly kind: 'out-of-range';
  readonly what: string;
  readonly value: unknown;
  readonly expected: string;
}

const outOfRange = (what: string, value: unknown, expected: string): Result<never, OutOfRange> =>
  fault({ kind: 'out-of-range', what, value, expected });

/** The moment after which no time of inspection is believed: the end of the year 9999. */
export const latestMs = 253_402_300_799_999;

export function fraction(value: number, what = 'fraction'): Result<Fraction, OutOfRange> {
  return value >= 0 && value <= 1 ? ok(value as Fraction) : outOfRange(what, value, 'a number from 0 to 1');
}

export function confidence(value: number, what = 'confidence'): Result<Confidence, OutOfRange> {
  return value > 0 && value < 1
    ? ok(value as Confidence)
    : outOfRange(what, value, 'a number above 0 and below 1');
}

export function tail(value: number, what = 'tail'): Result<Tail, OutOfRange> {
  return value > 0 && value < 1 ? ok(value as Tail) : outOfRange(what, value, 'a number above 0 and below 1');
}

export function unitCount(value: number, what = 'units'): Result<UnitCount, OutOfRange> {
  return Number.isSafeInteger(value) && value >= 0
    ? ok(value as UnitCount)
    : outOfRange(what, value, 'a whole number, 0 or more');
}

export function epochMs(value: number, what = 'time'): Result<EpochMs, OutOfRange> {
  return Number.isSafeInteger(value) && value >= 0 && value <= latestMs
    ? ok(value as EpochMs)
    : outOfRange(what, value, 'whole milliseconds since 1970-01-01 UTC, up to the year 9999');
}

export function spanMs(value: number, what = 'span'): Result<SpanMs, OutOfRange> {
  return Number.isSafeInteger(value) && value > 0
    ? ok(value as SpanMs)
    : outOfRange(what, value, 'whole milliseconds, above 0');
}

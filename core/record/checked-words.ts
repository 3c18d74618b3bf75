import { latestMs } from '../units.ts';
import { refuse } from './refusal.ts';

const idForm = /^(?!__proto__$)[A-Za-z0-9._-]{1,64}$/;
const controlOrLone = /[\p{Cc}\p{Cs}]/u;
/** Longest id, characters. */
export const idLength = 64;
/** Longest reason, characters as UTF-16 counts them. */
export const reasonLength = 500;
/** Largest whole number a 32-bit column holds. */
export const largestWhole = 4_294_967_295;

/** An id of the plant; `__proto__` alone is refused, so that an id is safe as a key wherever it goes. */
export function checkedId(value: unknown, field: string): string {
  return typeof value === 'string' && idForm.test(value)
    ? value
    : refuse('bad-id', field, value, 'an id of 1 to 64 letters, digits, points, underscores or hyphens');
}

/** A reason people will read: well-formed, without control characters, kept as it is. */
export function checkedReason(value: unknown, field = 'reason'): string {
  return typeof value === 'string' && value.length > 0 && value.length <= reasonLength && !controlOrLone.test(value)
    ? value
    : refuse('bad-text', field, value, '1 to 500 characters without control characters');
}

/** Whole milliseconds since 1970-01-01 UTC, 0 to the end of the year 9999. */
export function checkedMoment(value: unknown, field = 'time'): number {
  return typeof value === 'number' && value >= 0 && value <= latestMs && Math.floor(value) === value
    ? value + 0
    : refuse('bad-time', field, value, 'whole milliseconds since 1970-01-01 UTC, up to the year 9999');
}

/** A record's number within its source, 1 to 2^53 - 1. */
export function checkedSequence(value: unknown, field: string): number {
  return Number.isSafeInteger(value) && (value as number) >= 1
    ? (value as number)
    : refuse('bad-sequence', field, value, 'a whole number from 1 to 9,007,199,254,740,991');
}

/** A whole number from `least` to 4,294,967,295. */
export function checkedWhole(value: unknown, field: string, least: 0 | 1): number {
  return typeof value === 'number' && value >>> 0 === value && value >= least
    ? value + 0
    : refuse('out-of-range', field, value, `a whole number from ${least} to 4,294,967,295`);
}

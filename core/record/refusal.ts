import { refusalTable, type RefusalCode } from '../protocol/refusals.ts';
import { fault, ok, type Result } from '../result.ts';

/** Why records were not taken: which field, what it held, what was expected. */
export interface Refusal {
  readonly code: RefusalCode;
  /** Path inside the frame or name of the row's field, e.g. `parts[0].nonconforming[3]`; empty for the whole. */
  readonly field: string;
  /** What the field held, shortened for people and logs; never longer than 70 characters. */
  readonly value: string;
  readonly expected: string;
  readonly sentence: string;
  /** 1-based line of the file or request body, in the row forms. */
  readonly line?: number;
}

/**
 * Carries a refusal out of nested checks. Never leaves core: `settled` turns it into a value, so that the
 * good path pays for no wrapping and the bad path names its field exactly.
 */
export class Refused extends Error {
  readonly code: RefusalCode;
  readonly field: string;
  readonly value: string;
  readonly expected: string;

  constructor(code: RefusalCode, field: string, value: string, expected: string) {
    super(code);
    this.code = code;
    this.field = field;
    this.value = value;
    this.expected = expected;
  }
}

/** A value in a few characters; never walks into arrays or objects, so depth and size cost nothing. */
function shown(value: unknown): string {
  if (value === undefined) return 'missing';
  if (typeof value === 'string') return JSON.stringify(value.length > 40 ? `${value.slice(0, 40)}…` : value).slice(0, 70);
  if (Array.isArray(value)) return `an array of ${value.length}`;
  if (value instanceof Uint32Array || value instanceof Float64Array) return `an array of ${value.length}`;
  return typeof value === 'number' || typeof value === 'boolean' || value === null ? String(value) : 'an object';
}

/** Ends the present check. A field that is missing is always refused as such, whatever was to be checked. */
export function refuse(code: RefusalCode, field: string, value: unknown, expected: string): never {
  throw new Refused(value === undefined ? 'missing-field' : code, field, shown(value), expected);
}

/** The same refusal seen from one level further out; anything else is passed on as it is. */
export function under(place: string, cause: unknown): unknown {
  return cause instanceof Refused
    ? new Refused(cause.code, cause.field === '' ? place : `${place}.${cause.field}`, cause.value, cause.expected)
    : cause;
}

function sentenceOf({ code, field, value, expected }: Refused): string {
  return field === ''
    ? `${refusalTable[code].sentence} Expected ${expected}, got ${value}.`
    : `${field} is ${value}; expected ${expected}.`;
}

/** Runs checks that may refuse; their refusal becomes a value. What is no refusal is a bug and goes on up. */
export function settled<T>(checks: () => T, line?: number): Result<T, Refusal> {
  try {
    return ok(checks());
  } catch (cause) {
    if (!(cause instanceof Refused)) throw cause;
    const { code, field, value, expected } = cause;
    const refusal: Refusal = { code, field, value, expected, sentence: sentenceOf(cause) };
    return fault(line === undefined ? refusal : { ...refusal, line });
  }
}

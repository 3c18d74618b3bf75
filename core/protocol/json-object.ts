import { refuse } from '../record/refusal.ts';

/** An object as it comes from JSON.parse: fields of any content, none of them trusted. */
export type JsonObject = Readonly<Record<string, unknown>>;

export function objectAt(value: unknown, field: string, expected: string): JsonObject {
  return typeof value === 'object' && value !== null && !Array.isArray(value) ? (value as JsonObject) : refuse('wrong-type', field, value, expected);
}

/**
 * Refuses an object that has other fields than these: a misspelt field must not pass as one that was left out.
 *
 * @param count how many of the fields have to be there (checked one by one elsewhere); the common case costs one count
 */
export function expectFields(object: JsonObject, count: number, fields: readonly string[], place = ''): void {
  let found = 0;
  for (const _ in object) found += 1;
  if (found === count) return;
  for (const name in object) {
    if (!fields.includes(name)) refuse('unknown-field', place + name.slice(0, 64), object[name] ?? null, `one of the fields ${fields.join(', ')}`);
  }
}

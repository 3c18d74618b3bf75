/** What JSON can say. */
export type Json = null | boolean | number | string | readonly Json[] | { readonly [name: string]: Json };

/**
 * The one way of writing a value as JSON: names in the order of their UTF-16 code units, no white space, so that equal
 * values give equal text and equal hashes.
 *
 * @throws RangeError for a number that JSON cannot say
 * @source IETF RFC 8785, sections 3.2.2 and 3.2.3 (from memory)
 */
export function canonicalJson(value: Json): string {
  if (typeof value === 'number' && !Number.isFinite(value)) throw new RangeError(`number: got ${value}; expected a finite one`);
  if (value === null || typeof value !== 'object') return JSON.stringify(value);
  if (isList(value)) return `[${value.map(canonicalJson).join(',')}]`;
  const names = Object.keys(value).sort();
  return `{${names.map((name) => `${JSON.stringify(name)}:${canonicalJson(value[name] ?? null)}`).join(',')}}`;
}

const isList = (value: Json): value is readonly Json[] => Array.isArray(value);

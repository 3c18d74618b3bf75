import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { canonicalJson, type Json } from '../../../core/access/canonical-json.ts';

/** The same value with the names of every object put in the other way round. */
function turned(value: Json): Json {
  if (Array.isArray(value)) return (value as readonly Json[]).map(turned);
  if (value === null || typeof value !== 'object') return value;
  return Object.fromEntries(Object.entries(value).reverse().map(([name, part]) => [name, turned(part)]));
}

describe('canonical JSON', () => {
  it('orders names at every depth and writes no white space', () => {
    expect(canonicalJson({ b: [1, { d: null, c: 'é\n' }], a: true })).toBe('{"a":true,"b":[1,{"c":"é\\n","d":null}]}');
  });

  it('says the same for equal values, and what JSON reads back', () => {
    fc.assert(
      fc.property(fc.jsonValue(), (value) => {
        expect(canonicalJson(turned(value as Json))).toBe(canonicalJson(value as Json));
        expect(JSON.parse(canonicalJson(value as Json))).toEqual(JSON.parse(JSON.stringify(value)));
      }),
      { seed: 20_261_201, numRuns: 300 },
    );
  });

  it('refuses numbers that JSON cannot say', () => {
    for (const number of [NaN, Infinity, -Infinity]) expect(() => canonicalJson({ number })).toThrow('expected a finite one');
  });
});

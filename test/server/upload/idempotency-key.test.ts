import { expect, it } from 'vitest';
import { idempotencyKeyOf } from '../../../server/http/idempotency-key.ts';

it.each([
  ['"8e03978e-40d5"', '8e03978e-40d5'], ['8e03978e', '8e03978e'], [String.raw`"a\"b\\"`, String.raw`a"b\ `.trim()], ['""', undefined], ['"a', undefined], ['a b', undefined],
  ['"a b"', 'a b'], ['"é"', undefined], [`"${'x'.repeat(255)}"`, 'x'.repeat(255)], [`"${'x'.repeat(256)}"`, undefined], [String.raw`"a\x"`, undefined],
])('the key in %s is %s', (header, key) => {
  expect(idempotencyKeyOf(header)).toBe(key);
});

import { expect, it } from 'vitest';
import { Sparing } from '../../../server/access/sparing.ts';

it('lets each thing through once a minute, and so many of all', () => {
  let now = 1_000;
  const sparing = new Sparing(3, () => now);
  expect(['a', 'a', 'b', undefined, 'c'].map((key) => sparing.lets(key))).toEqual([true, false, true, true, false]);
  now += 59_999;
  expect([sparing.lets('a'), sparing.lets('d')]).toEqual([false, false]);
  now += 1;
  expect(['a', 'a', 'c', undefined, undefined].map((key) => sparing.lets(key))).toEqual([true, false, true, true, false]);
});

it('forgets nothing that is younger than a minute while it has room, and holds no more than it may', () => {
  let now = 0;
  const sparing = new Sparing(Infinity, () => now);
  for (let key = 0; key < 10_000; key += 1) expect(sparing.lets(String(key))).toBe(true);
  expect(sparing.lets('0')).toBe(false);
  expect(sparing.lets('one more')).toBe(true);
  expect(sparing.lets('0')).toBe(true); // Forgotten to make room: let through once too often rather than held for ever.
  now += 60_000;
  expect(sparing.lets('one more')).toBe(true);
});

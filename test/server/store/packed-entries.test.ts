import fc from 'fast-check';
import { expect, it } from 'vitest';
import type { Entry, EntryKind } from '../../../server/store/entry.ts';
import { kindCode, kindOfCode, packEntries, unpackEntries } from '../../../server/store/packed-entries.ts';

const whole = fc.maxSafeNat();
const kept: fc.Arbitrary<Entry> = fc.record({
  id: whole,
  at: whole,
  kind: fc.constantFrom<EntryKind[]>('frame', 'act', 'tick', 'plant', 'refused'),
  sourceId: fc.option(whole, { nil: undefined }),
  firstSequence: fc.option(whole, { nil: undefined }),
  records: whole,
  body: fc.uint8Array({ maxLength: 40 }),
});

it('entries packed and unpacked are the same', () => {
  fc.assert(
    fc.property(fc.array(kept), (entries) => {
      expect(unpackEntries(packEntries(entries))).toEqual(entries);
    }),
    { seed: 20260302 },
  );
});

it('a body that is part of a larger buffer takes only its own bytes along', () => {
  const body = new Uint8Array(10_000).fill(7).subarray(9_990);
  expect(packEntries([{ id: 1, at: 0, kind: 'frame', sourceId: 1, firstSequence: 1, records: 1, body }]).bodies.buffer.byteLength).toBe(10);
});

it('stored codes never change', () => {
  expect((['frame', 'act', 'tick', 'plant', 'refused'] as const).map(kindCode)).toEqual([1, 2, 3, 4, 5]);
  expect(() => kindOfCode(6)).toThrow('Journal kind 6: expected 1 to 5');
});

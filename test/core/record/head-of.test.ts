import fc from 'fast-check';
import { expect, it } from 'vitest';
import { headOf } from '../../../core/record/head-of.ts';
import { arbitraryFrame } from './arbitrary-frame.ts';
import { rowsOfFrame } from './rows-of-frame.ts';

const whole = arbitraryFrame.filter(({ parts }) => parts.every(({ kind }) => kind !== 'lost'));

it('keeps the first records as they are', () =>
  fc.assert(
    fc.property(whole, fc.nat(), (frame, at) => {
      const keep = at % (frame.records + 1);
      const head = headOf(frame, keep);
      expect(head.records).toBe(keep);
      expect(rowsOfFrame(head)).toEqual(rowsOfFrame(frame).slice(0, keep));
    }),
    { seed: 5, numRuns: 300 },
  ));

it('cuts a loss into a smaller one', () => {
  const frame = { first: 5, records: 10, parts: [{ kind: 'lost' as const, records: 10, at: 1, station: 'A', reason: 'full' }] };
  expect(headOf(frame, 4)).toEqual({ first: 5, records: 4, parts: [{ kind: 'lost', records: 4, at: 1, station: 'A', reason: 'full' }] });
});

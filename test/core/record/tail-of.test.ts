import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { tailOf } from '../../../core/record/tail-of.ts';
import { arbitraryFrame } from './arbitrary-frame.ts';
import { rowsOfFrame } from './rows-of-frame.ts';

describe('the tail of a frame', () => {
  it('holds the same records at the same sequences and times', () =>
    fc.assert(
      fc.property(arbitraryFrame, fc.double({ min: 0, max: 1, noNaN: true }), (whole, share) => {
        const frame = { ...whole, parts: whole.parts.filter(({ kind }) => kind !== 'lost') };
        const records = frame.parts.reduce((sum, part) => sum + part.records, 0);
        const skip = Math.floor(share * records);
        const tail = tailOf({ ...frame, records }, skip);
        expect([tail.first, tail.records]).toEqual([frame.first + skip, records - skip]);
        expect(rowsOfFrame(tail)).toStrictEqual(rowsOfFrame(frame).slice(skip));
      }),
      { seed: 8, numRuns: 500 },
    ));

  it('cuts lost records, keeps a frame whole when nothing is skipped, and ends empty', () => {
    const frame = { first: 5, records: 10, parts: [{ kind: 'lost', records: 10, at: 1, station: 'a-leak', reason: 'overrun' }] } as const;
    expect(tailOf(frame, 0)).toBe(frame);
    expect(tailOf(frame, 4)).toEqual({ first: 9, records: 6, parts: [{ ...frame.parts[0], records: 6 }] });
    expect(tailOf(frame, 10)).toEqual({ first: 15, records: 0, parts: [] });
  });
});

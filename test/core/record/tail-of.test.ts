import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import type { Frame } from '../../../core/record/part.ts';
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

  it('a broken step keeps every millisecond: 0.7 ms from a later start would round record 7 down', () => {
    const origin = { station: 'a-leak', product: 'hose-12', characteristic: 'leak', lot: undefined };
    const frame: Frame = {
      first: 1, records: 20,
      parts: [{ kind: 'verdicts', origin, records: 20, time: { kind: 'steady', start: 0, step: 0.7 }, nonconforming: Uint32Array.of(3, 12) }],
    };
    expect(rowsOfFrame(tailOf(frame, 3))).toStrictEqual(rowsOfFrame(frame).slice(3));
  });

  it('cuts lost records, keeps a frame whole when nothing is skipped, and ends empty', () => {
    const frame = { first: 5, records: 10, parts: [{ kind: 'lost', records: 10, at: 1, station: 'a-leak', reason: 'overrun' }] } as const;
    expect(tailOf(frame, 0)).toBe(frame);
    expect(tailOf(frame, 4)).toEqual({ first: 9, records: 6, parts: [{ ...frame.parts[0], records: 6 }] });
    expect(tailOf(frame, 10)).toEqual({ first: 15, records: 0, parts: [] });
  });
});

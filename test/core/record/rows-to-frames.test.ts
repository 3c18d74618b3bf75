import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import type { Frame } from '../../../core/record/part.ts';
import type { RowRecord } from '../../../core/record/row.ts';
import { RowsToFrames } from '../../../core/record/rows-to-frames.ts';
import { rowsOfFrame } from './rows-of-frame.ts';

const at = 1_764_547_200_000;
const origin = { station: 'a-leak', product: 'hose-12', characteristic: 'leak', lot: undefined };
const verdict = (nonconforming: boolean, sequence?: number): RowRecord => ({ sequence, says: 'finding', origin, at, finding: { kind: 'verdict', nonconforming } });

function gathered(rows: readonly RowRecord[], records = 1000, parts = 256, first = 1): Frame[] {
  const gather = new RowsToFrames({ first, records, parts });
  const frames: Frame[] = [];
  rows.forEach((row, i) => {
    const added = gather.add(row, i + 1);
    if (!added.ok) throw new Error(added.fault.sentence);
    if (added.value !== undefined) frames.push(added.value);
  });
  const last = gather.flush();
  return last === undefined ? frames : [...frames, last];
}

describe('rows gathered into frames', () => {
  it('neighbours of one origin are one part; times at an even pace are two numbers', () => {
    const rows = [0, 1, 2].map((i) => ({ ...verdict(i === 1), at: at + i * 40 }));
    expect(gathered(rows)).toStrictEqual([{
      first: 1, records: 3,
      parts: [{ kind: 'verdicts', origin, records: 3, time: { kind: 'steady', start: at, step: 40 }, nonconforming: Uint32Array.of(1) }],
    }]);
  });

  it('rows without a sequence follow the row before, past records declared lost', () => {
    const lost: RowRecord = { sequence: undefined, says: 'part', part: { kind: 'lost', records: 5, at, station: 'a-leak', reason: 'overrun' } };
    const [one, other] = gathered([verdict(false, 41), lost, verdict(true), verdict(true, 100)]);
    expect([one!.first, one!.records, other!.first, other!.records]).toEqual([41, 7, 100, 1]);
  });

  it('a frame ends at its limit of records, of parts, and where the sequence jumps back or on', () => {
    expect(gathered(Array.from({ length: 7 }, () => verdict(false)), 3).map(({ first, records }) => [first, records])).toEqual([[1, 3], [4, 3], [7, 1]]);
    const running: RowRecord = { sequence: undefined, says: 'part', part: { kind: 'line-running', records: 1, at, line: 'A' } };
    expect(gathered([running, running, running, verdict(false), verdict(false)], 10, 2).map(({ first, records }) => [first, records])).toEqual([[1, 2], [3, 3]]);
    expect(gathered([verdict(false, 5), verdict(false, 5), verdict(false, 9)]).map(({ first }) => first)).toEqual([5, 5, 9]);
    expect(gathered([])).toEqual([]);
  });

  it('a correction of its own or a later sequence is refused and leaves what was gathered', () => {
    const gather = new RowsToFrames({ first: 1, records: 10, parts: 10 });
    gather.add(verdict(true), 1);
    const correction: RowRecord = {
      sequence: undefined, says: 'part',
      part: { kind: 'correction', records: 1, origin, at, corrects: 2, finding: { kind: 'verdict', nonconforming: false }, reason: 'looked again' },
    };
    expect(gather.add(correction, 2)).toMatchObject({ fault: { code: 'bad-correction', line: 2 } });
    expect(gather.next).toBe(2);
    expect(gather.flush()).toMatchObject({ first: 1, records: 1 });
  });

  it('no row is lost, moved or changed, however the frames fall', () =>
    fc.assert(
      fc.property(fc.array(fc.tuple(fc.constantFrom('a-leak', 'b-leak'), fc.integer({ min: 0, max: 3 }), fc.nat(200), fc.boolean()), { maxLength: 60 }), fc.integer({ min: 1, max: 9 }), fc.integer({ min: 1, max: 5 }), (list, records, parts) => {
        const rows = list.map(([station, kind, number, is], i): RowRecord => {
          const common = { sequence: i + 1, says: 'finding', origin: { ...origin, station }, at: at + number } as const;
          if (kind === 0) return { ...common, finding: { kind: 'verdict', nonconforming: is } };
          if (kind === 1) return { ...common, finding: { kind: 'tally', inspected: number + 1, nonconforming: number } };
          if (kind === 2) return { ...common, finding: { kind: 'exposure', count: number, exposure: number + 0.5 } };
          return { ...common, finding: { kind: 'measurement', value: number / 8 } };
        });
        const frames = gathered(rows, records, parts);
        expect(frames.flatMap(rowsOfFrame)).toStrictEqual(rows);
        for (const frame of frames) expect(frame.records <= records && frame.parts.length <= parts).toBe(true);
      }),
      { seed: 6, numRuns: 400 },
    ));
});

import fc from 'fast-check';
import { expect, it } from 'vitest';
import { SourceLedger } from '../../../core/monitor/source-ledger.ts';
import { frameOf } from '../../../core/record/frame-of.ts';
import { noPlaces } from '../../../core/record/no-places.ts';
import type { Part } from '../../../core/record/part.ts';
import { piecesOf } from '../../../core/monitor/pieces-of.ts';

const origin = { station: 'A.leak-test', product: 'BH-4', characteristic: 'tightness', lot: undefined };
const part = fc.record({ lost: fc.boolean(), records: fc.integer({ min: 1, max: 6 }) }).map(({ lost, records }): Part =>
  lost ? { kind: 'lost', records, at: 1, station: 'A.leak-test', reason: 'overrun' } : { kind: 'verdicts', origin, records, time: { kind: 'steady', start: 0, step: 1 }, nonconforming: noPlaces });
const frames = fc.array(fc.record({ back: fc.integer({ min: 0, max: 25 }), parts: fc.array(part, { minLength: 1, maxLength: 4 }) }), { minLength: 1, maxLength: 12 });

it('each piece lies in one place of the order, none is left out, and each record is taken once', () =>
  fc.assert(
    fc.property(frames, (sent) => {
      const ledger = new SourceLedger();
      const counted = new Set<number>();
      const lost = new Set<number>();
      for (const { back, parts } of sent) {
        const frame = frameOf(Math.max(1, ledger.next - back), parts);
        const pieces = piecesOf(ledger, frame);
        expect(pieces.flatMap(({ frame: { first, records } }) => Array.from({ length: records }, (_, i) => first + i))).toEqual(Array.from({ length: frame.records }, (_, i) => frame.first + i));
        for (const { kind, frame: piece } of pieces) {
          if (kind === 'repeat') continue;
          expect(ledger.place(piece.first, piece.records).kind).toBe(kind);
          let sequence = piece.first;
          for (const { kind: says, records } of piece.parts) {
            for (let i = 0; i < records; i += 1) {
              expect(counted.has(sequence + i)).toBe(false);
              if (says === 'lost') expect(lost.has(sequence + i)).toBe(false);
              (says === 'lost' ? lost : counted).add(sequence + i);
            }
            if (says === 'lost') ledger.declareLost(sequence, records);
            sequence += records;
          }
          if (kind === 'late') ledger.fill(piece.first, piece.records);
          else ledger.advance(sequence);
        }
      }
      // Whatever is below the next sequence was counted, or is lost and waits for its records.
      for (let sequence = 1; sequence < ledger.next; sequence += 1) {
        expect(counted.has(sequence)).toBe(!ledger.holes.some(({ first, last }) => first <= sequence && sequence <= last));
      }
    }),
    { seed: 3, numRuns: 500 },
  ));

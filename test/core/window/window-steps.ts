import fc from 'fast-check';

/** One record of a frame: units inspected and how many of them do not conform. */
export interface RecordDraw {
  readonly of: number;
  readonly nonconforming: number;
}

/** What can happen to a window. Numbers that choose among what exists are taken modulo its length. */
export type Step =
  | { readonly kind: 'frame'; readonly source: number; readonly records: readonly RecordDraw[] }
  | { readonly kind: 'hole'; readonly source: number; readonly records: readonly RecordDraw[] }
  | { readonly kind: 'fill'; readonly choice: number }
  | { readonly kind: 'correct'; readonly choice: number; readonly share: number; readonly resize: number | undefined }
  | { readonly kind: 'clear' }
  | { readonly kind: 'store' };

const verdict = fc.integer({ min: 0, max: 3 }).map((draw) => ({ of: 1, nonconforming: draw === 0 ? 1 : 0 }));
const tally = fc
  .tuple(fc.integer({ min: 1, max: 6 }), fc.integer({ min: 0, max: 6 }))
  .map(([of, bad]) => ({ of, nonconforming: Math.min(of, bad) }));
const records = fc.oneof(
  { weight: 3, arbitrary: fc.array(verdict, { minLength: 1, maxLength: 12 }) },
  { weight: 1, arbitrary: fc.array(tally, { minLength: 1, maxLength: 4 }) },
);
const source = fc.integer({ min: 0, max: 2 });
const choice = fc.nat(1_000);

export const steps: fc.Arbitrary<Step[]> = fc.array(
  fc.oneof(
    { weight: 6, arbitrary: fc.record({ kind: fc.constant('frame' as const), source, records }) },
    { weight: 2, arbitrary: fc.record({ kind: fc.constant('hole' as const), source, records }) },
    { weight: 2, arbitrary: fc.record({ kind: fc.constant('fill' as const), choice }) },
    {
      weight: 4,
      arbitrary: fc.record({
        kind: fc.constant('correct' as const),
        choice,
        share: fc.double({ min: 0, max: 1, noNaN: true }),
        resize: fc.option(fc.integer({ min: 1, max: 8 }), { nil: undefined, freq: 3 }),
      }),
    },
    { weight: 1, arbitrary: fc.record({ kind: fc.constant('clear' as const) }) },
    { weight: 1, arbitrary: fc.record({ kind: fc.constant('store' as const) }) },
  ),
  { minLength: 1, maxLength: 40 },
);

/** A record that a source has numbered. */
export interface SentRecord extends RecordDraw {
  readonly source: number;
  readonly sequence: number;
}

/** Numbers the records of each source; keeps what was sent and which holes are open. */
export class SourceNumbers {
  readonly sent: SentRecord[] = [];
  readonly holes: SentRecord[][] = [];
  readonly newest = new Map<number, number>();

  number(source: number, records: readonly RecordDraw[]): SentRecord[] {
    const first = (this.newest.get(source) ?? 0) + 1;
    this.newest.set(source, first + records.length - 1);
    return records.map((record, k) => ({ ...record, source, sequence: first + k }));
  }
}

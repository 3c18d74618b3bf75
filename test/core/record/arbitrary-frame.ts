import fc from 'fast-check';
import { frameOf } from '../../../core/record/frame-of.ts';
import type { Finding, Frame, Origin, Part } from '../../../core/record/part.ts';
import type { TimeColumn } from '../../../core/record/time-column.ts';
import { latestMs } from '../../../core/units.ts';

const record = <T>(model: { [K in keyof T]: fc.Arbitrary<T[K]> }): fc.Arbitrary<T> => fc.record<T>(model, { noNullPrototype: true });
const id = fc.stringMatching(/^[A-Za-z0-9._-]{1,64}$/).filter((word) => word !== '__proto__');
const reason = fc.string({ unit: 'grapheme', minLength: 1, maxLength: 40 }).filter((text) => text.length <= 500 && !/[\p{Cc}\p{Cs}]/u.test(text));
const moment = fc.oneof(fc.integer({ min: 1_764_547_200_000, max: 1_764_547_300_000 }), fc.integer({ min: 0, max: latestMs }));
const whole = fc.integer({ min: 0, max: 4_294_967_295 });
const real = fc.double({ noNaN: true, noDefaultInfinity: true });
const above0 = fc.double({ min: 5e-324, noNaN: true, noDefaultInfinity: true });
const origin: fc.Arbitrary<Origin> = record({ station: id, product: id, characteristic: id, lot: fc.option(id, { nil: undefined }) });

function timeOf(records: number): fc.Arbitrary<TimeColumn> {
  const steady = record({
    kind: fc.constant('steady' as const),
    start: fc.double({ min: 0, max: 2e12, noNaN: true }).map((start) => start + 0),
    step: fc.double({ min: 0, max: 1e6, noNaN: true }).map((step) => step + 0),
  });
  if (records === 1) return fc.oneof(steady, moment.map((start) => ({ kind: 'steady' as const, start, step: 0 })));
  return fc.oneof(steady, fc.array(moment, { minLength: records, maxLength: records }).map((times) => ({ kind: 'each' as const, times: Float64Array.from(times) })));
}

const columns = <T>(entry: fc.Arbitrary<T>) =>
  fc.array(entry, { minLength: 1, maxLength: 40 }).chain((list) => fc.tuple(fc.constant(list), timeOf(list.length), origin));

const tally = fc.tuple(whole, fc.integer({ min: 0, max: 900 })).map(([a, b]) => ({ inspected: Math.max(a, b, 1), nonconforming: Math.min(a, b) }));
const finding: fc.Arbitrary<Finding> = fc.oneof(
  fc.boolean().map((nonconforming) => ({ kind: 'verdict' as const, nonconforming })),
  tally.map((of) => ({ kind: 'tally' as const, ...of })),
  record({ kind: fc.constant('exposure' as const), count: whole, exposure: above0 }),
  record({ kind: fc.constant('measurement' as const), value: real.map((value) => value + 0) }),
);
const one = { records: fc.constant(1 as const), at: moment };

const part: fc.Arbitrary<Part> = fc.oneof(
  columns(fc.boolean()).map(([bad, time, of]) => ({
    kind: 'verdicts' as const, origin: of, records: bad.length, time, nonconforming: Uint32Array.from(bad.flatMap((is, i) => (is ? [i] : []))),
  })),
  columns(tally).map(([rows, time, of]) => ({
    kind: 'tallies' as const, origin: of, records: rows.length, time,
    inspected: Uint32Array.from(rows, (row) => row.inspected), nonconforming: Uint32Array.from(rows, (row) => row.nonconforming),
  })),
  columns(fc.tuple(whole, above0)).map(([rows, time, of]) => ({
    kind: 'exposures' as const, origin: of, records: rows.length, time, count: Uint32Array.from(rows, ([n]) => n), exposure: Float64Array.from(rows, ([, x]) => x),
  })),
  columns(real.map((value) => value + 0)).map(([values, time, of]) => ({
    kind: 'measurements' as const, origin: of, records: values.length, time, value: Float64Array.from(values),
  })),
  record({ kind: fc.constant('correction' as const), ...one, origin, corrects: fc.integer({ min: 1, max: 999 }), finding, reason }),
  record({ kind: fc.constant('changeover' as const), ...one, line: id, product: id }),
  record({ kind: fc.constant('lot-start' as const), ...one, line: id, product: id, lot: id, size: fc.option(fc.integer({ min: 1, max: 4_294_967_295 }), { nil: undefined }) }),
  record({ kind: fc.constant('lot-end' as const), ...one, line: id, lot: id }),
  record({ kind: fc.constant('line-stopped' as const), ...one, line: id, reason }),
  record({ kind: fc.constant('line-running' as const), ...one, line: id }),
  record({ kind: fc.constant('lost' as const), records: fc.integer({ min: 1, max: 4_294_967_295 }), at: moment, station: id, reason }),
);

/** Frames that keep every rule, as a reader would give them; first sequence from 1000 on. */
export const arbitraryFrame: fc.Arbitrary<Frame> = fc
  .tuple(fc.integer({ min: 1000, max: 9_000_000_000_000_000 }), fc.array(part, { minLength: 1, maxLength: 6 }))
  .map(([first, parts]) => frameOf(first, parts));

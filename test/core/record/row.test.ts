import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { columnsOfHeader, recordOfCsv } from '../../../core/record/csv-row.ts';
import { parsedMoment } from '../../../core/record/moment-text.ts';
import { recordOfNdjson } from '../../../core/record/ndjson-row.ts';
import { recordOfRow } from '../../../core/record/row.ts';

const at = 1_764_547_200_000; // 2025-12-01T00:00:00Z
const where = { time: at, station: 'a-leak', product: 'hose-12', characteristic: 'leak' };
const origin = { station: 'a-leak', product: 'hose-12', characteristic: 'leak', lot: undefined };
const common = { sequence: undefined, says: 'finding', origin, at } as const;

const good: readonly (readonly [string, object, object])[] = [
  ['a verdict', { ...where, verdict: 'nonconforming' }, { ...common, finding: { kind: 'verdict', nonconforming: true } }],
  ['a verdict with sequence and lot', { ...where, sequence: 9, lot: 'L-1', verdict: 'conforming' }, {
    ...common, sequence: 9, origin: { ...origin, lot: 'L-1' }, finding: { kind: 'verdict', nonconforming: false },
  }],
  ['a tally', { ...where, inspected: 50, nonconforming: 2 }, { ...common, finding: { kind: 'tally', inspected: 50, nonconforming: 2 } }],
  ['a count', { ...where, count: 3, exposure: 12.5 }, { ...common, finding: { kind: 'exposure', count: 3, exposure: 12.5 } }],
  ['a value', { ...where, value: -1.5e3 }, { ...common, finding: { kind: 'measurement', value: -1500 } }],
  ['a correction', { ...where, sequence: 12, corrects: 4, verdict: 'conforming', reason: 'leak tester was cold' }, {
    sequence: 12, says: 'part',
    part: { kind: 'correction', records: 1, origin, at, corrects: 4, finding: { kind: 'verdict', nonconforming: false }, reason: 'leak tester was cold' },
  }],
  ['a changeover', { time: at, event: 'changeover', line: 'A', product: 'hose-15' }, {
    sequence: undefined, says: 'part', part: { kind: 'changeover', records: 1, at, line: 'A', product: 'hose-15' },
  }],
  ['start of a lot', { time: at, event: 'lot-start', line: 'A', product: 'hose-15', lot: 'L-2', size: 500 }, {
    sequence: undefined, says: 'part', part: { kind: 'lot-start', records: 1, at, line: 'A', product: 'hose-15', lot: 'L-2', size: 500 },
  }],
  ['end of a lot', { time: at, event: 'lot-end', line: 'A', lot: 'L-2' }, { sequence: undefined, says: 'part', part: { kind: 'lot-end', records: 1, at, line: 'A', lot: 'L-2' } }],
  ['line stopped', { time: at, event: 'line-stopped', line: 'A', reason: 'oil' }, { sequence: undefined, says: 'part', part: { kind: 'line-stopped', records: 1, at, line: 'A', reason: 'oil' } }],
  ['line running', { time: at, event: 'line-running', line: 'A' }, { sequence: undefined, says: 'part', part: { kind: 'line-running', records: 1, at, line: 'A' } }],
  ['records lost', { time: at, event: 'lost', station: 'a-leak', records: 7, reason: 'overrun' }, {
    sequence: undefined, says: 'part', part: { kind: 'lost', records: 7, at, station: 'a-leak', reason: 'overrun' },
  }],
];

const bad: readonly (readonly [string, object, string, string])[] = [
  ['nothing said', where, 'bad-row', ''],
  ['two things said', { ...where, verdict: 'conforming', value: 3 }, 'bad-row', 'value'],
  ['half a tally', { ...where, inspected: 5 }, 'missing-field', 'nonconforming'],
  ['more nonconforming than inspected', { ...where, inspected: 5, nonconforming: 6 }, 'out-of-range', 'nonconforming'],
  ['a verdict in other words', { ...where, verdict: 'OK' }, 'out-of-range', 'verdict'],
  ['a decimal comma', { ...where, value: '3,14' }, 'wrong-type', 'value'],
  ['a hexadecimal number', { ...where, value: '0x10' }, 'wrong-type', 'value'],
  ['a number JSON cannot hold', { ...where, value: '1e999' }, 'out-of-range', 'value'],
  ['a broken count', { ...where, count: 1.5, exposure: 1 }, 'out-of-range', 'count'],
  ['no exposure', { ...where, count: 1, exposure: 0 }, 'out-of-range', 'exposure'],
  ['no time', { ...where, time: '', verdict: 'conforming' }, 'missing-field', 'time'],
  ['a local time', { ...where, time: '2026-12-01T06:30:00', verdict: 'conforming' }, 'bad-time', 'time'],
  ['an id with a space', { ...where, station: 'a leak', verdict: 'conforming' }, 'bad-id', 'station'],
  ['a misspelt field', { ...where, verdikt: 'conforming' }, 'unknown-field', 'verdikt'],
  ['a reason without correction', { ...where, verdict: 'conforming', reason: 'why' }, 'bad-row', 'reason'],
  ['a correction without reason', { ...where, sequence: 2, verdict: 'conforming', corrects: 1 }, 'missing-field', 'reason'],
  ['an event of another kind', { time: at, event: 'constructor', line: 'A' }, 'unknown-kind', 'event'],
  ['an event with a verdict', { time: at, event: 'line-running', line: 'A', verdict: 'conforming' }, 'bad-row', 'verdict'],
  ['sequence zero', { ...where, sequence: 0, verdict: 'conforming' }, 'bad-sequence', 'sequence'],
];

describe('a row of a file or request', () => {
  it.each(good)('%s, typed and as text', (_, row, record) => {
    expect(recordOfRow(row, 1)).toStrictEqual({ ok: true, value: record });
    expect(recordOfNdjson(JSON.stringify(row), 1)).toStrictEqual({ ok: true, value: record });
    const columns = columnsOfHeader(Object.keys(row));
    if (!columns.ok) throw new Error(columns.fault.sentence);
    expect(recordOfCsv(columns.value, Object.values(row).map(String), 1)).toStrictEqual({ ok: true, value: record });
  });

  it.each(bad)('%s is refused, with line and field', (_, row, code, field) => {
    expect(recordOfRow(row, 17)).toMatchObject({ ok: false, fault: { code, field, line: 17 } });
  });

  it('empty and null cells say nothing', () => {
    const row = recordOfRow({ ...where, lot: null, sequence: '', verdict: 'conforming', value: '' }, 1);
    expect(row).toStrictEqual({ ok: true, value: { ...common, finding: { kind: 'verdict', nonconforming: false } } });
  });

  it('lines that are no rows', () => {
    expect(recordOfNdjson('{"time":', 3)).toMatchObject({ fault: { code: 'not-json', line: 3 } });
    expect(recordOfNdjson('[1]', 3)).toMatchObject({ fault: { code: 'wrong-type', line: 3 } });
    expect(recordOfNdjson('{"event":{"toString":1},"time":1}', 3)).toMatchObject({ fault: { code: 'unknown-kind' } });
    expect(recordOfCsv(['time', 'verdict'], ['1'], 4)).toMatchObject({ fault: { code: 'wrong-length', line: 4 } });
    expect(columnsOfHeader(['time', 'colour'])).toMatchObject({ fault: { code: 'unknown-field', field: 'column 2', line: 1 } });
    expect(columnsOfHeader(['time', 'time'])).toMatchObject({ fault: { code: 'unknown-field', field: 'column 2' } });
  });

  it('anything at all is a record or a refusal', () =>
    fc.assert(
      fc.property(fc.dictionary(fc.constantFrom('time', 'station', 'verdict', 'event', 'value', 'corrects', '__proto__', 'constructor', 'records'), fc.jsonValue()), (row) => {
        expect(typeof recordOfNdjson(JSON.stringify(row), 1).ok).toBe('boolean');
      }),
      { seed: 5, numRuns: 2000 },
    ));
});

describe('times as text', () => {
  // RFC 3339, section 5.8, gives the first three; the others follow from section 5.6 and 5.7.
  it.each([
    ['1985-04-12T23:20:50.52Z', Date.UTC(1985, 3, 12, 23, 20, 50, 520)],
    ['1996-12-19T16:39:57-08:00', Date.UTC(1996, 11, 20, 0, 39, 57)],
    ['1937-01-01T12:00:27.87+00:20', undefined],
    ['2026-12-01 06:30:00.2509+01:00', Date.UTC(2026, 11, 1, 5, 30, 0, 250)],
    ['2024-02-29T00:00:00Z', Date.UTC(2024, 1, 29)],
    ['2026-02-29T00:00:00Z', undefined],
    ['2026-12-01T24:00:00Z', undefined],
    ['2026-12-01T06:60:00Z', undefined],
    ['1990-12-31T23:59:60Z', undefined],
    ['2026-12-01T06:30:00+24:00', undefined],
    ['2026-12-01', undefined],
  ] as const)('%s', (text, moment) => {
    expect(parsedMoment(text)).toBe(moment);
  });
});

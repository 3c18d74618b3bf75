import { readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import { BinaryFrameReader } from '../../../core/protocol/binary-frame-reader.ts';
import { binaryOfFrame } from '../../../core/protocol/binary-frame-writer.ts';
import { JsonFrameReader } from '../../../core/protocol/json-frame-reader.ts';
import { partFields } from '../../../core/protocol/json-fields.ts';
import { sourceLimits } from '../../../core/protocol/limits.ts';
import { endsConnection, refusalTable, type RefusalCode } from '../../../core/protocol/refusals.ts';
import { gapMessage, refusedMessage } from '../../../core/protocol/source-messages.ts';
import { columnsOfHeader, recordOfCsv } from '../../../core/record/csv-row.ts';
import { frameOf } from '../../../core/record/frame-of.ts';
import type { Frame, Part } from '../../../core/record/part.ts';
import { rowFields } from '../../../core/record/row-fields.ts';
import { leak } from './frame-cases.ts';

const at = 1_764_547_200_000;
const head = { station: 'a-leak', product: 'hose-12', characteristic: 'leak', time: at };
const units = { kind: 'verdicts', ...head, units: 10, nonconforming: [] };
const tallies = { kind: 'tallies', ...head, inspected: [5], nonconforming: [1] };
const exposures = { kind: 'exposures', ...head, count: [1], exposure: [2] };
const correction = { kind: 'correction', ...head, corrects: 1, finding: { kind: 'verdict', nonconforming: false }, reason: 'looked again' };
const few = { ...sourceLimits, frameBytes: 2000, records: 20, parts: 3 };
const frame = (...parts: unknown[]): object => ({ type: 'records', first: 5, parts });

const refused: readonly (readonly [string, object, RefusalCode, string])[] = [
  ['another message', { ...frame(units), type: 'hello' }, 'not-a-frame', 'type'],
  ['no sequence', { type: 'records', parts: [units] }, 'missing-field', 'first'],
  ['sequence zero', { ...frame(units), first: 0 }, 'bad-sequence', 'first'],
  ['sequences past the last', { ...frame(units), first: Number.MAX_SAFE_INTEGER }, 'bad-sequence', 'first'],
  ['a field of no meaning', { ...frame(units), note: 'x' }, 'unknown-field', 'note'],
  ['no parts', frame(), 'empty-frame', 'parts'],
  ['too many parts', frame(units, units, units, units), 'too-many-parts', 'parts'],
  ['too many records in one part', frame({ ...units, units: 21 }), 'too-many-records', 'parts[0].units'],
  ['too many records in all parts', frame(units, units, tallies), 'too-many-records', 'parts[2].inspected'],
  ['a record beyond the limit', frame(units, units, { ...correction, reason: 'x' }), 'too-many-records', 'parts[2]'],
  ['a kind of no meaning', frame({ ...units, kind: 'toString' }), 'unknown-kind', 'parts[0].kind'],
  ['a part that is none', frame(null), 'wrong-type', 'parts[0]'],
  ['an id with a space', frame(units, { ...units, station: 'a leak' }), 'bad-id', 'parts[1].station'],
  ['an id too long', frame({ ...units, lot: 'x'.repeat(65) }), 'bad-id', 'parts[0].lot'],
  ['a misspelt optional field', frame({ ...units, lott: 'L-1' }), 'unknown-field', 'parts[0].lott'],
  ['no list of the nonconforming', frame({ ...units, nonconforming: undefined }), 'missing-field', 'parts[0].nonconforming'],
  ['a place behind the last unit', frame({ ...units, nonconforming: [3, 10] }), 'not-rising', 'parts[0].nonconforming[1]'],
  ['a place twice', frame({ ...units, nonconforming: [3, 3] }), 'not-rising', 'parts[0].nonconforming[1]'],
  ['a place that is no whole number', frame({ ...units, nonconforming: [0.5] }), 'out-of-range', 'parts[0].nonconforming[0]'],
  ['a place that cannot even become a number', frame({ ...units, nonconforming: [{ valueOf: 1, toString: 1 }] }), 'out-of-range', 'parts[0].nonconforming[0]'],
  ['no units', frame({ ...units, units: 0 }), 'out-of-range', 'parts[0].units'],
  ['a column as text', frame({ ...tallies, inspected: '5' }), 'wrong-type', 'parts[0].inspected'],
  ['columns of two lengths', frame({ ...tallies, nonconforming: [1, 2] }), 'wrong-length', 'parts[0].nonconforming'],
  ['more nonconforming than inspected', frame({ ...tallies, nonconforming: [6] }), 'out-of-range', 'parts[0].nonconforming[0]'],
  ['a tally of nothing', frame({ ...tallies, inspected: [0], nonconforming: [0] }), 'out-of-range', 'parts[0].inspected[0]'],
  ['no exposure', frame({ ...exposures, exposure: [0] }), 'out-of-range', 'parts[0].exposure[0]'],
  ['a value as text', frame({ kind: 'measurements', ...head, value: ['1'] }), 'wrong-type', 'parts[0].value[0]'],
  ['an empty part', frame({ kind: 'measurements', ...head, value: [] }), 'empty-frame', 'parts[0]'],
  ['a broken millisecond', frame({ ...tallies, time: [at + 0.5] }), 'bad-time', 'parts[0].time[0]'],
  ['a time before 1970', frame({ ...tallies, time: -1 }), 'bad-time', 'parts[0].time.start'],
  ['a pace that runs backwards', frame({ ...tallies, time: { start: at, step: -1 } }), 'bad-time', 'parts[0].time.step'],
  ['a pace that runs past the year 9999', frame({ ...units, time: { start: 253_402_300_799_000, step: 200 } }), 'bad-time', 'parts[0].time.step'],
  ['too few times', frame({ ...units, time: [at, at] }), 'wrong-length', 'parts[0].time'],
  ['a correction of itself', frame({ ...correction, corrects: 5 }), 'bad-correction', 'parts[0].corrects'],
  ['a correction without a reason', frame({ ...correction, reason: '' }), 'bad-text', 'parts[0].reason'],
  ['a reason with a control character', frame({ ...correction, reason: 'a\nb' }), 'bad-text', 'parts[0].reason'],
  ['a reason with half a character', frame({ ...correction, reason: 'a\ud800' }), 'bad-text', 'parts[0].reason'],
  ['a reason too long', frame({ ...correction, reason: 'x'.repeat(501) }), 'bad-text', 'parts[0].reason'],
  ['a finding of no meaning', frame({ ...correction, finding: { kind: 'guess' } }), 'unknown-kind', 'parts[0].finding.kind'],
  ['a finding out of range', frame({ ...correction, finding: { kind: 'tally', inspected: 1, nonconforming: 2 } }), 'out-of-range', 'parts[0].finding.nonconforming'],
  ['a lot of no size', frame({ kind: 'lot-start', line: 'A', product: 'hose-12', lot: 'L-1', size: 0, time: at }), 'out-of-range', 'parts[0].size'],
  ['a text too large', { ...frame(units), pad: 'x'.repeat(2000) }, 'frame-too-large', ''],
];

describe('a refusal names code, field, value and what was expected', () => {
  it.each(refused)('%s', (_, json, code, field) => {
    const read = new JsonFrameReader(few).read(JSON.stringify(json));
    expect(read).toMatchObject({ ok: false, fault: { code, field } });
    if (!read.ok) expect(read.fault.sentence).toMatch(/expected|Expected/);
  });

  it('a part that lies elsewhere in the same frame is read although another is refused before', () => {
    const reader = new JsonFrameReader(few);
    expect(reader.read(JSON.stringify(frame({ ...units, station: '?' }))).ok).toBe(false);
    expect(reader.read(JSON.stringify(frame(units))).ok).toBe(true);
  });

  it('a list of 65,536 records more than the limit costs no column', () => {
    const lost = { kind: 'lost', station: 'a-leak', records: 4_294_967_295, reason: 'overrun', time: at };
    expect(new JsonFrameReader(few).read(JSON.stringify(frame(units, units, lost))).ok).toBe(true);
  });
});

/** Frames no writer should be given: the rules hold for binary columns as they do for text. */
const wrong: readonly (readonly [string, Part, RefusalCode, string])[] = [
  ['a place behind the last unit', verdicts(3, [3]), 'not-rising', 'parts[0].nonconforming[0]'],
  ['a place twice', verdicts(300, [3, 3]), 'not-rising', 'parts[0].nonconforming[1]'],
  ['too many records', verdicts(21, []), 'too-many-records', 'parts[0]'],
  ['a part without records', verdicts(0, []), 'empty-frame', 'parts[0]'],
  ['a time that is no number', { ...verdicts(1, []), time: { kind: 'steady', start: NaN, step: 0 } } as Part, 'bad-time', 'parts[0].time.start'],
  ['a broken millisecond', { ...verdicts(2, []), time: { kind: 'each', times: Float64Array.of(0, at + 0.5) } } as Part, 'bad-time', 'parts[0].time[1]'],
  ['a time after the year 9999', { ...verdicts(2, []), time: { kind: 'each', times: Float64Array.of(253_402_300_799_999, 253_402_300_800_000) } } as Part, 'bad-time', 'parts[0].time[1]'],
  ['a value that is no number', { kind: 'measurements', origin: leak, records: 1, time: { kind: 'steady', start: at, step: 0 }, value: Float64Array.of(NaN) }, 'out-of-range', 'parts[0].value[0]'],
  ['an id with a space', { kind: 'line-running', records: 1, at, line: 'a b' }, 'bad-id', 'names[0]'],
  ['a correction of a later record', { kind: 'correction', records: 1, origin: leak, at, corrects: 9, finding: { kind: 'verdict', nonconforming: true }, reason: 'x' }, 'bad-correction', 'parts[0].corrects'],
];

function verdicts(records: number, places: readonly number[]): Part {
  return { kind: 'verdicts', origin: leak, records, time: { kind: 'steady', start: at, step: 0 }, nonconforming: Uint32Array.from(places) };
}

describe('the same rules hold in binary', () => {
  it.each(wrong)('%s', (_, part, code, field) => {
    const bytes = binaryOfFrame(frameOf(5, [part]) satisfies Frame);
    expect(new BinaryFrameReader({ ...few, records: field === 'parts[0]' ? 20 : 1000 }).read(bytes)).toMatchObject({ fault: { code, field } });
  });

  it('bytes of another kind, version or with reserved bytes used', () => {
    const good = binaryOfFrame(frameOf(1, [verdicts(1, [])]));
    const changed = (place: number, byte: number) => {
      const bytes = good.slice();
      bytes[place] = byte;
      return new BinaryFrameReader(few).read(bytes);
    };
    expect(changed(0, 0x7b)).toMatchObject({ fault: { code: 'not-a-frame' } });
    expect(changed(2, 2)).toMatchObject({ fault: { code: 'unknown-version' } });
    expect(changed(6, 1)).toMatchObject({ fault: { code: 'reserved-not-zero' } });
    expect(changed(good.length - 32 + 12, 1)).toMatchObject({ fault: { code: 'reserved-not-zero' } });
    expect(changed(good.length - 32 + 2, 1)).toMatchObject({ fault: { code: 'unknown-name', field: 'parts[0].origin' } });
  });
});

describe('what the server says of a refusal', () => {
  it('names the next expected sequence, and nothing that is empty', () => {
    const read = new JsonFrameReader(few).read('{');
    if (read.ok) throw new Error('read');
    expect(refusedMessage(read.fault, 42)).toMatchObject({ type: 'refused', code: 'not-json', next: 42 });
    expect(refusedMessage(read.fault, 42)).not.toHaveProperty('field');
    expect(gapMessage(50, 42)).toMatchObject({ code: 'sequence-gap', first: 50, value: '50', expected: '42', next: 42 });
  });

  it('only refusals of the connection end it', () => {
    expect(endsConnection('token-unknown')).toBe(true);
    expect(endsConnection('sequence-gap')).toBe(false);
    expect(endsConnection('unknown-product')).toBe(false);
  });
});

describe('the page for people who connect a source', () => {
  const page = readFileSync(new URL('../../../core/protocol/protocol.md', import.meta.url), 'utf8');

  it.each(Object.entries(refusalTable))('lists %s with its effect and sentence', (code, { effect, sentence }) => {
    const does = { frame: 'frame not taken', connection: '**connection ends**', 'set-aside': 'records set aside' }[effect];
    expect(page).toContain(`| \`${code}\` | ${does} | ${sentence} |`);
  });

  it('lists no code that is none', () => {
    const listed = [...page.matchAll(/^\| `([a-z-]+)` \| (?:frame not|\*\*conn|records set)/gm)].map(([, code]) => code);
    expect(listed.sort()).toEqual(Object.keys(refusalTable).sort());
  });

  it('names every kind of part with its fields, every field of a row and every limit', () => {
    for (const [kind, { fields }] of Object.entries(partFields)) {
      const row = page.split('\n').find((line) => line.startsWith(`| \`${kind}\` |`)) ?? '';
      for (const field of fields.filter((name) => name !== 'kind')) expect(`${kind}: ${row}`).toContain(`\`${field}\``);
    }
    for (const field of rowFields) expect(page).toContain(`\`${field}\``);
    for (const [name, value] of Object.entries<number>({ ...sourceLimits })) expect(page).toContain(`| \`${name}\` | ${value.toLocaleString('en')} |`);
  });

  it('shows text frames that are read as they stand', () => {
    const blocks = [...page.matchAll(/```json\n([\s\S]*?)```/g)].map(([, text]) => text ?? '').filter((text) => text.includes('"type": "records"'));
    expect(blocks.length).toBeGreaterThan(0);
    for (const text of blocks) expect(new JsonFrameReader(sourceLimits).read(text)).toMatchObject({ ok: true });
  });

  it('shows rows that are read as they stand', () => {
    const [header = '', ...lines] = (/```\n(sequence,[\s\S]*?)\n```/.exec(page)?.[1] ?? '').split('\n');
    const columns = columnsOfHeader(header.split(','));
    if (!columns.ok) throw new Error(columns.fault.sentence);
    expect(lines.length).toBe(3);
    lines.forEach((line, i) => expect(recordOfCsv(columns.value, line.split(','), i + 2)).toMatchObject({ ok: true, value: { sequence: 41 + i } }));
  });

  it('shows the bytes of a binary frame as they are written', () => {
    const shown = /```hex\n([\s\S]*?)```/.exec(page)?.[1] ?? '';
    const bytes = shown.split('\n').flatMap((line) => line.replace(/ {2}.*$/, '').split(' ').filter((pair) => pair !== '').map((pair) => Number.parseInt(pair, 16)));
    const example: Part = {
      kind: 'verdicts', origin: { station: 'a-leak', product: 'hose-12', characteristic: 'leak', lot: undefined },
      records: 1000, time: { kind: 'steady', start: at, step: 250 }, nonconforming: Uint32Array.of(17, 503),
    };
    expect([...binaryOfFrame(frameOf(41, [example]))]).toEqual(bytes);
  });
});

import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { sourceLimits } from '../../../core/protocol/limits.ts';
import { binaryOfFrame } from '../../../core/protocol/binary-frame-writer.ts';
import type { RowRecord } from '../../../core/record/row.ts';
import { frameBudget } from '../../../server/rows/frame-budget.ts';
import { framesOfRows, type RowsOutcome, type RowsSetting } from '../../../server/rows/frames-of-rows.ts';
import { rowsOfFrame } from '../../core/record/rows-of-frame.ts';

type Outcome = RowsOutcome[];

async function outcomeOf(pieces: readonly (string | Uint8Array)[], setting: Partial<RowsSetting> = {}): Promise<Outcome> {
  const text = (async function* () {
    for (const piece of pieces) yield Buffer.from(await Promise.resolve(piece));
  })();
  const made: Outcome = [];
  for await (const one of framesOfRows(text, { form: undefined, rowBytes: 400, records: 100, parts: 10, begin: () => 1, idleMs: 60_000, ...setting })) made.push(one);
  return made;
}

const rowsOf = (outcome: Outcome): RowRecord[] => outcome.flatMap((one) => (one.kind === 'frame' ? rowsOfFrame(one.frame) : []));
const refusalOf = (outcome: Outcome) => {
  const last = outcome.at(-1);
  return last?.kind === 'refused' ? last.refusal : undefined;
};

const csv = `sequence,time,station,product,characteristic,lot,verdict,event,line,reason
,1764547200000,A.leak-test,BH-4,tightness,,conforming,,,
,1764547200250,A.leak-test,BH-4,tightness,,nonconforming,,,
,1764547200500,,,,,,line-stopped,A,"die 3 worn, ""again"""

,1764547200750,A.leak-test,BH-4,tightness,,conforming,,,`;
const row = (time: number, more = ''): string => `{"time":${time},"station":"A.leak-test","product":"BH-4","characteristic":"tightness","verdict":"conforming"${more}}\n`;

describe('rows of a text', () => {
  it('mean the same however the text is cut into pieces', () =>
    fc.assert(
      fc.asyncProperty(fc.constantFrom(csv, csv.replaceAll('\n', '\r\n'), `\uFEFF${csv}`, row(1) + row(2) + '\n' + row(3, ',"lot":"L-é"').replace('é', 'e')), fc.array(fc.integer({ min: 0, max: 500 }), { maxLength: 12 }), async (text, cuts) => {
        const bytes = Buffer.from(text);
        const edges = [0, ...cuts.map((cut) => cut % bytes.length).sort((a, b) => a - b), bytes.length];
        const pieces = edges.slice(1).map((edge, i) => bytes.subarray(edges[i], edge));
        expect(rowsOf(await outcomeOf(pieces))).toEqual(rowsOf(await outcomeOf([text])));
      }),
      { seed: 11, numRuns: 200 },
    ));

  it('say what the CSV says, with quotes, commas and empty lines in it', async () => {
    const rows = rowsOf(await outcomeOf([csv]));
    expect(rows.map(({ sequence }) => sequence)).toEqual([1, 2, 3, 4]);
    expect(rows[2]).toMatchObject({ part: { kind: 'line-stopped', reason: 'die 3 worn, "again"' } });
  });

  it('stop at the first bad row, whose line is named, and keep those before it', async () => {
    const made = await outcomeOf([csv.replace('1764547200750,A.leak-test', '1764547200750,A leak')]);
    expect(rowsOf(made)).toHaveLength(3);
    expect(refusalOf(made)).toMatchObject({ code: 'bad-id', field: 'station', line: 6, value: '"A leak"' });
  });

  it.each([
    ['a line that is not UTF-8', [row(1), Uint8Array.of(0x7b, 0xff, 0x0a)], { code: 'bad-text', line: 2 }],
    ['a row that is too long', [row(1), `${row(2, `,"reason":"${'x'.repeat(400)}"`)}${row(3)}`], { code: 'frame-too-large', line: 2 }],
    ['a row that does not end', [row(1), '{"time":', 'x'.repeat(401)], { code: 'frame-too-large', line: 2 }],
    ['a quote that does not end', [csv.replace('"die', '"die"')], { code: 'bad-row', field: 'cell 10', line: 4 }],
    ['a column nobody knows', [csv.replace('verdict', 'verdikt')], { code: 'unknown-field', field: 'column 7', line: 1 }],
    ['half an object', [row(1), '{"time":1'], { code: 'not-json', line: 2 }],
  ])('%s is refused', async (_what, pieces, refusal) => {
    const made = await outcomeOf(pieces);
    expect(refusalOf(made)).toMatchObject(refusal);
  });

  it('ask for the first sequence once, with the first row, and name the line a frame begins on', async () => {
    const asked: (number | undefined)[] = [];
    const made = await outcomeOf([row(1) + row(2) + row(3)], { records: 2, begin: ({ sequence }) => (asked.push(sequence), 41) });
    expect(asked).toEqual([undefined]);
    expect(made.map((one) => (one.kind === 'frame' ? [one.line, one.frame.first, one.frame.records] : one))).toEqual([[1, 41, 2], [3, 43, 1]]);
  });

  it('do not wait for their frame to fill while nothing more comes', async () => {
    let more: (() => void) | undefined;
    const text = (async function* () {
      yield Buffer.from(row(1));
      await new Promise<void>((resolve) => (more = resolve));
      yield Buffer.from(row(2));
    })();
    const frames = framesOfRows(text, { form: 'ndjson', rowBytes: 400, records: 100, parts: 10, begin: () => 1, idleMs: 1 });
    expect((await frames.next()).value).toMatchObject({ frame: { first: 1, records: 1 } });
    more?.();
    expect((await frames.next()).value).toMatchObject({ frame: { first: 2, records: 1 }, line: 2 });
  });
});

describe('the budget of a frame', () => {
  it.each([[1_048_576, 5_000], [1_048_576, 1_000_000], [65_536, 5_000]])('of %i bytes holds for the largest rows there can be (%i wanted)', async (frameBytes, wanted) => {
    const { records, parts } = frameBudget({ ...sourceLimits, frameBytes }, wanted);
    const long = (i: number): string => `s${i}`.padEnd(64, 'x');
    const correction = (i: number): string =>
      JSON.stringify({ sequence: 100 + i, time: i, station: long(i), product: long(i), characteristic: long(i), lot: long(i), count: 1, exposure: 1, corrects: 1, reason: '€'.repeat(500) });
    const rest = Math.min(records - parts, 30_000);
    const text = [...Array.from({ length: parts - 1 }, (_, i) => correction(i)), ...Array.from({ length: rest }, (_, i) =>
      JSON.stringify({ time: (i * 7919) % 1000, station: long(0), product: long(0), characteristic: long(0), lot: long(0), count: 1, exposure: 1 }))].join('\n');
    const made = await outcomeOf([text], { rowBytes: 16_384, records, parts });
    for (const one of made) expect(one.kind === 'frame' ? binaryOfFrame(one.frame).length : one).toBeLessThanOrEqual(frameBytes);
  });
});

import { seededUniform } from '../../../core/run-length/seeded-uniform.ts';

type Row = Readonly<Record<string, string | number>>;

/** Rows in the making: a clock that goes on, a seeded chance, sequences that are stated. */
class Script {
  readonly rows: Row[] = [];
  readonly chance: () => number;
  at: number;
  sequence = 1;

  constructor(seed: number, start: number) {
    this.chance = seededUniform(seed);
    this.at = start;
  }

  add(row: Row, records = 1): number {
    const { sequence } = this;
    this.rows.push({ sequence, time: this.at, ...row });
    this.sequence += records;
    return sequence;
  }

  inspect(station: string, characteristic: string, says: Row, product = 'BH-4'): number {
    return this.add({ station, product, characteristic, ...says });
  }

  verdict(station: string, characteristic: string, rate: number, more: Row = {}): number {
    return this.inspect(station, characteristic, { verdict: this.chance() < rate ? 'nonconforming' : 'conforming', ...more });
  }
}

/** 08:00 on a Monday in the plant's zone. */
const monday = Date.UTC(2026, 5, 1, 6, 0, 0);

/** A leak tester that goes bad and is repaired, stops with its line, falls silent, and corrects what it said. */
function leakTest(): Script {
  const script = new Script(1, monday);
  script.add({ event: 'line-running', line: 'A' });
  const bad: number[] = [];
  for (let i = 0; i < 9_000; i += 1) {
    script.at += 1_000;
    const sequence = script.sequence;
    script.verdict('A.leak-test', 'tightness', i < 4_000 || i > 6_000 ? 0.001 : 0.03);
    if (script.rows.at(-1)?.['verdict'] === 'nonconforming') bad.push(sequence);
    if (i === 5_500) for (const corrects of bad.slice(-20)) script.inspect('A.leak-test', 'tightness', { verdict: 'conforming', corrects, reason: 'tested again warm: tight' });
    if (i === 5_600) script.inspect('A.leak-test', 'tightness', { verdict: 'conforming', corrects: 1, reason: 'no such verdict' });
    if (i === 3_000) script.at += 20 * 60_000;
    if (i === 7_000) {
      script.add({ event: 'line-stopped', line: 'A', reason: 'crimping tool changed, "again"' });
      script.at += 3 * 3_600_000;
      script.add({ event: 'line-running', line: 'A' });
    }
    if (i === 8_000) script.at += 5 * 3_600_000;
  }
  return script;
}

/** Records that were lost, some of which turn up after all, and records of a place that the plant does not have. */
function lostAndLate(): Script {
  const script = new Script(2, monday);
  const held: Row[] = [];
  for (let i = 0; i < 5_000; i += 1) {
    script.at += 2_000;
    if (i % 900 === 450) {
      script.add({ event: 'lost', station: 'A.leak-test', records: 30, reason: 'buffer overrun' }, 30);
      for (let k = 0; k < 12; k += 1) held.push({ sequence: script.sequence - 25 + k, time: script.at + k, station: 'A.leak-test', product: 'BH-4', characteristic: 'tightness', verdict: k === 3 ? 'nonconforming' : 'conforming' });
    }
    if (i % 1_500 === 1_200) script.rows.push(...held.splice(0));
    if (i % 700 === 69) script.inspect('A.nowhere', 'tightness', { verdict: 'conforming' });
    if (i % 1_100 === 70) script.inspect('A.leak-test', 'gloss', { verdict: 'conforming' });
    script.verdict('A.leak-test', 'tightness', i < 3_000 ? 0.002 : 0.02);
    // A whole minute late in time, though in sequence.
    if (i % 400 === 7) script.inspect('A.leak-test', 'tightness', { verdict: 'conforming', time: script.at - 60_000 });
  }
  return script;
}

/** Several stations whose records come mixed, with every quantity, lots, a changeover. */
function everything(): Script {
  const script = new Script(3, monday);
  script.add({ event: 'changeover', line: 'A', product: 'BH-4' });
  let corrected = 0;
  for (let i = 0; i < 2_500; i += 1) {
    script.at += 1_500;
    const ill = i > 1_200 && i < 1_700 ? 10 : 1;
    if (i % 500 === 0) script.add({ event: 'lot-start', line: 'A', product: 'BH-4', lot: `L-${i}`, size: 500 });
    script.inspect('A.cutting', 'surface', { count: script.chance() < 0.02 * ill ? 1 : 0, exposure: 1.5 });
    script.verdict('A.crimping', 'crimp', 0.004 * ill);
    if (i % 2 === 0) {
      const force = Math.round((460 + 20 * (script.chance() + script.chance() + script.chance() - 1.5) - (ill > 1 ? 45 : 0)) * 100) / 100;
      corrected = script.inspect('A.crimping', 'force', { value: force });
    }
    if (i % 300 === 299) script.inspect('A.crimping', 'force', { value: 470.5, corrects: corrected, reason: 'jaw had slipped' });
    script.verdict('A.leak-test', 'tightness', 0.003 * ill);
    const lot = `L-${i - (i % 500)}`;
    script.verdict('A.final', 'finish', 0.01 * ill);
    if (i % 5 === 0) script.inspect('A.final', 'outgoing', { verdict: script.chance() < 0.01 * ill ? 'nonconforming' : 'conforming', lot });
    if (i % 10 === 3) script.inspect('K.filling', 'fill', { value: Math.round((251 + script.chance() - 0.5 - (ill > 1 ? 1.5 : 0)) * 1000) / 1000 }, 'FK-250');
    if (i % 500 === 499) script.add({ event: 'lot-end', line: 'A', lot });
  }
  script.add({ event: 'changeover', line: 'A', product: 'BH-5' });
  for (let i = 0; i < 800; i += 1) {
    script.at += 1_500;
    script.inspect('A.leak-test', 'tightness', { inspected: 5, nonconforming: script.chance() < 0.01 ? 1 : 0 }, 'BH-5');
  }
  return script;
}

const ndjson = (rows: readonly Row[]): string => rows.map((row) => `${JSON.stringify(row)}\n`).join('');

function csv(rows: readonly Row[]): string {
  const columns = [...new Set(rows.flatMap((row) => Object.keys(row)))];
  const cell = (value: string | number | undefined): string => (typeof value === 'string' && /[",]/.test(value) ? `"${value.replaceAll('"', '""')}"` : String(value ?? ''));
  return `${columns.join(',')}\n${rows.map((row) => `${columns.map((column) => cell(row[column])).join(',')}\n`).join('')}`;
}

/** Files that make the monitor decide in every way there is. */
export const rowFiles: readonly { readonly name: string; readonly text: string; readonly kinds: readonly string[] }[] = [
  { name: 'leak-test.csv', text: csv(leakTest().rows), kinds: ['evidence', 'alarm', 'line', 'set-aside'] },
  { name: 'lost-and-late.ndjson', text: ndjson(lostAndLate().rows), kinds: ['evidence', 'alarm', 'set-aside'] },
  { name: 'everything.csv', text: csv(everything().rows), kinds: ['evidence', 'alarm', 'line', 'run'] },
];

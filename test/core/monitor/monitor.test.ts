import { describe, expect, it } from 'vitest';
import { Monitor } from '../../../core/monitor/monitor.ts';
import { monitorFrom, snapshotOf } from '../../../core/monitor/monitor-snapshot.ts';
import type { Happening } from '../../../core/monitor/happening.ts';
import type { EpochMs } from '../../../core/units.ts';
import { frame, leakTest, monday, plantWith, verdicts } from './example-plant.ts';

const sheet = `    at-most: 1 %
    confidence: 95 %
    window: { units: 1000 }
    alarms:
      crossing: { priority: medium, return: { distance: 0, units: 50 }, response: Call maintenance. }
      silence: { after: 5 min, priority: low }
      bad-data: { more-than: 3, within: 10 min, priority: low }
      deterioration: off`;

const at = (ms: number): EpochMs => (monday + ms) as EpochMs;
const kinds = (happenings: readonly Happening[]): string[] =>
  happenings.map((one) => (one.kind === 'evidence' ? `${one.from}>${one.to}` : one.kind === 'alarm' ? `${one.alarm.rule} ${one.change}` : one.kind));

function begun(): Monitor {
  return new Monitor(plantWith(sheet), 'v');
}

describe('a monitor', () => {
  it('[F1] counts a frame once, however often it is sent', () => {
    const monitor = begun();
    const sent = frame(1, verdicts(100, [3], monday));
    expect(monitor.takeFrame('tester', sent, at(0)).kind).toBe('taken');
    expect(monitor.takeFrame('tester', sent, at(1)).kind).toBe('repeated');
    expect(monitor.watches[0]!.evidence.figures()).toMatchObject({ inspected: 100, nonconforming: 1 });
  });

  it('[F2] refuses a gap and says what it expects', () => {
    const monitor = begun();
    expect(monitor.takeFrame('tester', frame(5, verdicts(10, [], monday)), at(0))).toEqual({ kind: 'gap', next: 1 });
    expect(monitor.watches[0]!.evidence.figures()).toMatchObject({ inspected: 0 });
  });

  it('[F3] counts only the new tail of a frame it knows in part', () => {
    const monitor = begun();
    monitor.takeFrame('tester', frame(1, verdicts(10, [2], monday)), at(0));
    const receipt = monitor.takeFrame('tester', frame(6, verdicts(10, [1, 7], monday)), at(0));
    expect(receipt).toMatchObject({ kind: 'taken', next: 16 });
    expect(monitor.watches[0]!.evidence.figures()).toMatchObject({ inspected: 15, nonconforming: 2 });
  });

  it('[F4] takes late records of a declared loss once, alone or among others, and knows the declaration when it is sent again', () => {
    const monitor = begun();
    monitor.takeFrame('tester', frame(1, verdicts(10, [], monday), { kind: 'lost', records: 10, at: monday, station: 'A.leak-test', reason: 'buffer overrun' }, verdicts(10, [], monday)), at(0));
    expect(monitor.watches[0]!.evidence.figures()).toMatchObject({ inspected: 20 });
    const sentAgain = frame(1, verdicts(10, [], monday), { kind: 'lost', records: 10, at: monday, station: 'A.leak-test', reason: 'buffer overrun' }, verdicts(10, [], monday));
    expect(monitor.takeFrame('tester', sentAgain, at(0))).toEqual({ kind: 'repeated', next: 31 });
    // Two known ones, three of the hole; then the whole hole among known and new ones.
    expect(monitor.takeFrame('tester', frame(9, verdicts(5, [4], monday)), at(0))).toMatchObject({ kind: 'taken', next: 31, frame: { first: 11, records: 3 } });
    expect(monitor.takeFrame('tester', frame(5, verdicts(31, [], monday)), at(0))).toMatchObject({ kind: 'taken', next: 36, frame: { first: 5, records: 31 } });
    expect(monitor.takeFrame('tester', frame(11, verdicts(10, [4], monday)), at(0)).kind).toBe('repeated');
    expect(monitor.watches[0]!.evidence.figures()).toMatchObject({ inspected: 35, nonconforming: 1 });
  });

  it('[F5] keeps but does not count records of an unknown station, product or an implausible time', () => {
    const monitor = begun();
    const receipt = monitor.takeFrame(
      'tester',
      frame(
        1,
        verdicts(3, [], monday, { ...leakTest, station: 'A.paint' }),
        verdicts(4, [], monday, { ...leakTest, product: 'BH-9' }),
        { ...verdicts(5, [0], monday), time: { kind: 'each', times: Float64Array.of(monday, monday + 1, monday + 3_600_000, monday + 2, monday + 3) } } as never,
      ),
      at(0),
    );
    expect(receipt).toMatchObject({
      kind: 'taken',
      notCounted: [
        { sequence: 1, records: 3, code: 'unknown-station' },
        { sequence: 4, records: 4, code: 'unknown-product' },
        { sequence: 10, records: 1, code: 'time-implausible' },
      ],
    });
    expect(monitor.watches[0]!.evidence.figures()).toMatchObject({ inspected: 4, nonconforming: 1 });
  });

  it('[E1] goes from gathering to demonstrated, crosses once, and returns only after the stated units in a row', () => {
    const monitor = begun();
    monitor.takeFrame('tester', frame(1, verdicts(1000, [], monday)), at(1_000_000));
    expect(kinds(monitor.decisions().happenings)).toEqual(['gathering>demonstrated']);
    // 1,000 units at a line of 1 %: up to 4 nonconforming ones are demonstrated at 95 %.
    monitor.takeFrame('tester', frame(1001, verdicts(500, [10, 20, 30, 40, 50, 60], monday)), at(1_000_000));
    const crossed = monitor.decisions().happenings;
    expect(kinds(crossed)).toEqual(['demonstrated>undecided', 'crossing raised']);
    expect(crossed[0]).toMatchObject({ sequence: 1051, at: monday + 50_000, figures: { inspected: 1000, nonconforming: 5 } });
    // The fifth and sixth leave the window 1,000 units after they came; demonstrated again, then 50 units in a row.
    monitor.takeFrame('tester', frame(1501, verdicts(1000, [], monday)), at(1_000_000));
    const back = monitor.decisions().happenings;
    expect(kinds(back)).toEqual(['undecided>demonstrated', 'crossing returned']);
    expect(back.map((one) => (one.kind === 'evidence' ? one.sequence : undefined))[0]).toBe(2021);
  });

  it('[A1] acknowledges, and an acknowledged alarm ends when its condition is gone', () => {
    const monitor = begun();
    monitor.takeFrame('tester', frame(1, verdicts(1000, [], monday)), at(1_000_000));
    monitor.takeFrame('tester', frame(1001, verdicts(100, [1, 2, 3, 4, 5, 6], monday)), at(1_000_000));
    expect(monitor.act({ kind: 'acknowledge', alarm: 1, by: 'Mette', note: 'on my way' }, at(1_005_000))).toBeUndefined();
    expect(monitor.act({ kind: 'acknowledge', alarm: 1, by: 'Mette', note: '' }, at(1_006_000))).toBe('already-acknowledged');
    expect(monitor.act({ kind: 'acknowledge', alarm: 7, by: 'Mette', note: '' }, at(1_006_000))).toBe('no-such-alarm');
    monitor.takeFrame('tester', frame(1101, verdicts(1200, [], monday)), at(1_207_000));
    const alarms = monitor.decisions().happenings.filter((one) => one.kind === 'alarm');
    expect(kinds(alarms)).toEqual(['crossing raised', 'crossing acknowledged', 'crossing ended']);
    expect(alarms.at(-1)).toMatchObject({ alarm: { state: { kind: 'ended', acknowledgement: { by: 'Mette', at: monday + 1_005_000 } } } });
    expect(monitor.desk.standing()).toEqual([]);
  });

  it('[E2] a restart of the evidence is no crossing, and what stood is gathered anew', () => {
    const monitor = begun();
    monitor.takeFrame('tester', frame(1, verdicts(1000, [], monday)), at(1_000_000));
    monitor.decisions();
    expect(monitor.act({ kind: 'restart', guarantee: 'leak-A', by: 'Jonas', reason: 'new seal' }, at(1_000_001))).toBeUndefined();
    monitor.takeFrame('tester', frame(1001, verdicts(50, [1], monday)), at(1_000_002));
    expect(kinds(monitor.decisions().happenings)).toEqual(['restart', 'demonstrated>gathering']);
  });

  it('[S1] says at its moment that a running line is silent, however late the clock is looked at, and lifts it with the next record', () => {
    const monitor = begun();
    monitor.takeFrame('tester', frame(1, verdicts(10, [], monday)), at(0));
    monitor.advance(at(3_600_000));
    const silent = monitor.decisions().happenings;
    expect(kinds(silent)).toEqual(['gathering>unknown', 'silence raised']);
    expect(silent.every((one) => one.at === monday + 300_000)).toBe(true);
    monitor.takeFrame('tester', frame(11, verdicts(1, [], monday + 3_600_000)), at(3_600_000));
    expect(kinds(monitor.decisions().happenings)).toEqual(['unknown>gathering', 'silence returned']);
  });

  it('[S2] a line that was said to stand is not silent', () => {
    const monitor = begun();
    monitor.takeFrame('tester', frame(1, verdicts(10, [], monday), { kind: 'line-stopped', records: 1, at: monday, line: 'A', reason: 'break' }), at(0));
    monitor.advance(at(3_600_000));
    expect(kinds(monitor.decisions().happenings)).toEqual(['line']);
    monitor.takeFrame('tester', frame(12, { kind: 'line-running', records: 1, at: monday + 3_600_000, line: 'A' }), at(3_600_000));
    monitor.advance(at(3_600_000 + 299_999));
    expect(kinds(monitor.decisions().happenings)).toEqual(['line']);
    monitor.advance(at(3_600_000 + 300_000));
    expect(kinds(monitor.decisions().happenings)).toEqual(['gathering>unknown', 'silence raised']);
  });

  it('[S3] too many bad records raise an alarm that returns when they are old', () => {
    const monitor = begun();
    monitor.takeFrame('tester', frame(1, verdicts(4, [], monday, { ...leakTest, product: 'BH-9' })), at(0));
    expect(kinds(monitor.decisions().happenings)).toEqual(['bad-data raised', 'set-aside']);
    monitor.advance(at(600_000));
    const returned = monitor.decisions().happenings;
    expect(kinds(returned)).toEqual(['bad-data returned']);
    expect(returned[0]!.at).toBe(monday + 600_000);
  });

  it('[E3] corrects a re-inspected unit, and its evidence with it', () => {
    const monitor = begun();
    monitor.takeFrame('tester', frame(1, verdicts(1000, [10, 20, 30, 40, 50], monday)), at(1_000_000));
    expect(monitor.watches[0]!.standing.state).toBe('undecided');
    monitor.takeFrame('tester', frame(1001, { kind: 'correction', records: 1, origin: leakTest, at: monday, corrects: 31, finding: { kind: 'verdict', nonconforming: false }, reason: 'dirty sensor' }), at(1_000_001));
    expect(monitor.watches[0]!.standing.state).toBe('demonstrated');
    expect(monitor.watches[0]!.evidence.figures()).toMatchObject({ inspected: 1000, nonconforming: 4 });
  });

  it('[R1] goes on from a snapshot exactly as if it had not been interrupted', () => {
    const whole = begun();
    const first = begun();
    const frames = Array.from({ length: 30 }, (_, k) => frame(1 + k * 100, verdicts(100, k % 3 === 0 ? [k, 50 + k] : [], monday + k * 100_000)));
    for (const [k, one] of frames.entries()) whole.takeFrame('tester', one, at(k * 100_000));
    for (const [k, one] of frames.slice(0, 17).entries()) first.takeFrame('tester', one, at(k * 100_000));
    const second = monitorFrom(first.plant, 'v', structuredClone(snapshotOf(first)));
    for (const [k, one] of frames.slice(17).entries()) second.takeFrame('tester', one, at((17 + k) * 100_000));
    expect([...first.decisions().happenings, ...second.decisions().happenings]).toEqual(whole.decisions().happenings);
    expect(snapshotOf(second)).toEqual(snapshotOf(whole));
  });

  it('[R2] another plant file carries evidence over where its settings are the same, and begins anew where not', () => {
    const monitor = begun();
    monitor.takeFrame('tester', frame(1, verdicts(1000, [], monday), verdicts(10, [0, 1, 2, 3, 4, 5], monday)), at(1_000_000));
    expect(monitor.desk.standing()).toHaveLength(1);
    const renamed = monitorFrom(plantWith(`${sheet}\n    name: Leak test A`), 'w', snapshotOf(monitor));
    expect(renamed.watches[0]!.evidence.figures()).toMatchObject({ inspected: 1000 });
    const stricter = monitorFrom(plantWith(sheet.replace('1 %', '0.9 %')), 'x', snapshotOf(monitor));
    expect(stricter.watches[0]!.evidence.figures()).toMatchObject({ inspected: 0 });
    expect(stricter.desk.standing()[0]).toMatchObject({ state: { kind: 'returned' } });
  });
});

import { describe, expect, it } from 'vitest';
import { Monitor } from '../../../core/monitor/monitor.ts';
import type { Happening } from '../../../core/monitor/happening.ts';
import { frameOf } from '../../../core/record/frame-of.ts';
import type { Part } from '../../../core/record/part.ts';
import { seededUniform } from '../../../core/run-length/seeded-uniform.ts';
import { admitRun, newDetector } from '../../../core/sequential/change-detector.ts';
import { fractionDetector } from '../../../core/sequential/detector-tuning.ts';
import type { EpochMs } from '../../../core/units.ts';
import { leakTest, monday, plantWith, verdicts } from '../monitor/example-plant.ts';

const sheet = `    at-most: 1 %
    window: { units: 1000 }
    alarms: { crossing: off, violation: off, silence: off, deterioration: { units-between-false-calls: 20000, priority: high } }`;

const changes = (happenings: readonly Happening[]): string[] => happenings.flatMap((one) => (one.kind === 'alarm' ? [one.change] : []));

function monitorOf(parts: readonly Part[]): Monitor {
  const monitor = new Monitor(plantWith(sheet), 'v');
  monitor.takeFrame('tester', frameOf(1, parts), undefined);
  return monitor;
}

describe('a deterioration alarm', () => {
  it('[J1] is raised at the unit at which the detector reaches its threshold', () => {
    const uniform = seededUniform(5);
    const bad: number[] = [];
    for (let unit = 0; unit < 6_000; unit += 1) if (uniform() < (unit < 3_000 ? 0.005 : 0.05)) bad.push(unit);
    const tuning = fractionDetector(0.01, 20_000);
    let state = newDetector(tuning);
    let last = -1;
    const expected = bad.find((unit) => {
      state = admitRun(state, unit - last - 1, tuning);
      last = unit;
      return state.alarms > 0;
    });
    expect(expected).toBeGreaterThan(3_000);
    const [raised] = monitorOf([verdicts(6_000, bad, monday)]).decisions().happenings.filter(({ kind }) => kind === 'alarm');
    expect(raised).toMatchObject({
      at: monday + (expected ?? 0) * 1_000,
      change: 'raised',
      alarm: { rule: 'deterioration', priority: 'high', grounds: { sequence: (expected ?? 0) + 1, lookRule: 'all looks', figures: { baseline: 0.01, betweenFalseCalls: 20_000 } } },
    });
  });

  it('[J2] returns when the line has been calm for three times the usual distance, at that very unit', () => {
    const burst = Array.from({ length: 9 }, (_, k) => 1_000 + k);
    const monitor = monitorOf([verdicts(2_000, burst, monday)]);
    const told = monitor.decisions().happenings.filter(({ kind }) => kind === 'alarm');
    expect(changes(told)).toEqual(['raised', 'returned']);
    const [raised, returned] = told as [Happening, Happening];
    expect((returned.at - raised.at) / 1_000).toBeGreaterThanOrEqual(300);
    expect((returned.at - raised.at) / 1_000).toBeLessThan(600);
  });

  it('[J2] says how many conforming units are still to come until then, and is right', () => {
    const burst = Array.from({ length: 9 }, (_, k) => 1_000 + k);
    const monitor = monitorOf([verdicts(1_050, burst, monday)]);
    const [watch] = monitor.watches;
    const left = watch!.change!.view(false).toReturn!;
    expect(left).toBeGreaterThan(0);
    monitor.takeFrame('tester', frameOf(1_051, [verdicts(left - 1, [], monday + 1_050_000)]), undefined);
    expect([watch!.change!.watch.alarmed, watch!.change!.view(false).toReturn]).toEqual([true, 1]);
    monitor.takeFrame('tester', frameOf(1_050 + left, [verdicts(1, [], monday + 1_050_000 + (left - 1) * 1_000)]), undefined);
    expect([watch!.change!.watch.alarmed, watch!.change!.view(false).toReturn]).toEqual([false, undefined]);
  });

  it('[J3] is not moved by late records or corrections, and a restart begins its detector anew', () => {
    const gauge = (monitor: Monitor): number => monitor.watches[0]!.change!.watch.gauge();
    const monitor = monitorOf([verdicts(100, [50, 60], monday), { kind: 'lost', records: 20, at: monday, station: 'A.leak-test', reason: 'overrun' }, verdicts(10, [], monday)]);
    const before = gauge(monitor);
    expect(before).toBeGreaterThan(0);
    monitor.takeFrame('tester', frameOf(101, [verdicts(20, [1, 2, 3, 4, 5, 6, 7, 8, 9], monday)]), undefined);
    monitor.takeFrame('tester', frameOf(131, [{ kind: 'correction', records: 1, origin: leakTest, at: monday, corrects: 51, finding: { kind: 'verdict', nonconforming: false }, reason: 'inspected again' }]), undefined);
    expect(gauge(monitor)).toBe(before);
    monitor.act({ kind: 'restart', guarantee: 'leak-A', by: 'Jonas', reason: 'new seal' }, monitor.now);
    expect(gauge(monitor)).toBe(0);
  });

  it('calls falsely no more often than its setting says on a line at its guarantee', () => {
    // 400,000 units at 1 %, threshold 20,000: at most 20 calls expected; more than 45 has a chance below 1e-6 (Poisson, as bound).
    const uniform = seededUniform(11);
    const monitor = new Monitor(plantWith(sheet), 'v');
    let raised = 0;
    for (let frame = 0; frame < 40; frame += 1) {
      const bad: number[] = [];
      for (let unit = 0; unit < 10_000; unit += 1) if (uniform() < 0.01) bad.push(unit);
      monitor.takeFrame('tester', frameOf(1 + frame * 10_000, [verdicts(10_000, bad, monday + frame * 10_000_000)]), (monday + (frame + 1) * 10_000_000) as EpochMs);
      raised += changes(monitor.decisions().happenings).filter((change) => change === 'raised' || change === 'again').length;
    }
    expect(raised).toBeGreaterThan(0);
    expect(raised).toBeLessThanOrEqual(45);
  });
});

import { describe, expect, it } from 'vitest';
import { clockMoment } from '../../../core/evidence/moment.ts';
import type { Happening } from '../../../core/monitor/happening.ts';
import { monitorFrom, snapshotOf } from '../../../core/monitor/monitor-snapshot.ts';
import { allLooksUpper } from '../../../core/sequential/nonconforming-all-looks.ts';
import { smallestUnitsDemonstrated } from '../../../core/sequential/nonconforming-critical.ts';
import { betaPriorAt } from '../../../core/sequential/nonconforming-evidence.ts';
import type { Tail } from '../../../core/units.ts';
import { runPathsOf, runViewOf } from '../../../core/view/run-view-of.ts';
import { viewOf } from '../../../core/view/view-of.ts';
import { bad, fills, good, lotStart, WatchOne } from '../evidence/watch-one.ts';
import { feed, monday, origins, plantOfText } from '../evidence/evidence-plant.ts';

const tail = 0.05 as Tail;
const quiet = 'silence: off, bad-data: off, deterioration: off';
const leak = (rest: string): string => `station: A.leak, characteristic: tightness, quantity: nonconforming-fraction, at-most: 1 %, ${rest}, alarms: { ${quiet} }`;
const all = leak('window: { units: 1000 }, looks: all');

describe('a run that decides', () => {
  it('[L2][E5] is demonstrated with the first unit at which the bound at all looks is on the safe side', () => {
    const one = new WatchOne(all);
    const enough = smallestUnitsDemonstrated(0, 0.01, tail, betaPriorAt(0.01));
    one.take(good(enough - 1));
    expect([one.state, allLooksUpper(0, enough - 1, tail, betaPriorAt(0.01)) > 0.01]).toEqual(['gathering', true]);
    one.take(good(1));
    expect([one.state, allLooksUpper(0, enough, tail, betaPriorAt(0.01)) <= 0.01]).toEqual(['demonstrated', true]);
    expect(viewOf(one.watch)).toMatchObject({ lookRule: 'all looks', oppositeLookRule: 'all looks', bound: allLooksUpper(0, enough, tail, betaPriorAt(0.01)) });
  });

  it('[L2] goes on beyond its window: what left that still counts in the run', () => {
    const one = new WatchOne(all);
    one.take(bad(40), good(1500));
    expect(one.watch.evidence.figures()).toMatchObject({ inspected: 1000, nonconforming: 0 });
    expect([one.state, viewOf(one.watch).figures['runNonconforming']]).toEqual(['violated', 40]);
  });

  it('[L2] beside a window calls the violation, and the window what is demonstrated', () => {
    const one = new WatchOne(leak('window: { units: 1000 }, looks: both'));
    one.take(good(1000));
    expect(one.state).toBe('demonstrated');
    expect(viewOf(one.watch)).toMatchObject({ lookRule: 'one look', oppositeLookRule: 'all looks' });
    const windowAlone = new WatchOne(leak('window: { units: 1000 }'));
    windowAlone.take(good(1000), bad(24));
    one.take(bad(24));
    expect([windowAlone.state, one.state]).toEqual(['violated', 'undecided']);
    one.take(bad(30));
    expect(one.state).toBe('violated');
  });

  it('is not offered where no bound at all looks is known', () => {
    expect(() => plantOfText('  - { id: c, stations: [A.cutting, A.leak], characteristics: [cut, tightness], quantity: chained-yield, at-least: 95 %, window: run, looks: all }')).toThrow('guarantees[0].looks');
    expect(() => plantOfText(`  - { id: e, ${leak('window: run, looks: both, clusters: { design-effect: 2, source: history }')} }`)).toThrow('guarantees[0].looks');
    expect(() => plantOfText(`  - { id: e, ${leak('window: run, looks: sometimes')} }`)).toThrow('one of one, all, both');
  });
});

describe('the beginning of a run', () => {
  const begun = (one: WatchOne): unknown => runViewOf(one.watch);

  it('[L1] is the first record, then each declared event, numbered and told', () => {
    const one = new WatchOne(all);
    expect(begun(one)).toMatchObject({ number: 1, cause: 'first', begunAt: undefined });
    one.take(good(5));
    expect(begun(one)).toMatchObject({ number: 1, cause: 'first', begunAt: monday });
    one.monitor.act({ kind: 'restart', guarantee: 'one', by: 'Jonas', reason: 'new seal' }, one.monitor.now);
    expect(one.monitor.decisions().happenings).toMatchObject([{ kind: 'restart', run: 2, by: 'Jonas', reason: 'new seal' }]);
    expect(begun(one)).toMatchObject({ number: 2, cause: 'restart', detail: 'new seal (Jonas)', figures: { runUnits: 0 } });
  });

  it('[L1] comes back with its product, and with a lot where the guarantee is about lots', () => {
    const one = new WatchOne(leak('product: BH-4, window: { units: 1000 }, looks: all'));
    const told: Happening[] = [];
    let next = 1;
    const take = (...parts: Parameters<typeof feed>[1]): void => {
      const run = feed(one.monitor, parts, 1, next);
      next = run.next;
      told.push(...run.happenings);
    };
    take({ ...good(20), time: { kind: 'steady', start: monday, step: 1 } } as never);
    take({ kind: 'changeover', records: 1, at: monday + 100, line: 'A', product: 'BH-9' } as never);
    take({ kind: 'changeover', records: 1, at: monday + 200, line: 'A', product: 'BH-4' } as never);
    expect(told.filter(({ kind }) => kind === 'run')).toMatchObject([{ run: 2, cause: 'changeover', detail: 'BH-4' }]);
    const lot = new WatchOne(`station: A.leak, characteristic: outgoing, quantity: lot-fraction, at-most: 4 %, looks: all, alarms: { ${quiet} }`);
    lot.take(lotStart('L-1', 300), good(150, 'outgoing'));
    expect(lot.state).toBe('demonstrated');
    lot.take(lotStart('L-2', 300));
    expect([lot.state, runViewOf(lot.watch)?.detail]).toEqual(['gathering', 'L-2']);
  });

  it('[L1] is never because of what the run shows: a violation stays said', () => {
    const one = new WatchOne(all);
    one.take(bad(30));
    const said = runViewOf(one.watch)?.brokenAt;
    expect([one.state, said !== undefined]).toEqual(['violated', true]);
    one.take(good(50_000));
    expect([one.state, runViewOf(one.watch)?.brokenAt, runViewOf(one.watch)?.number]).toEqual(['demonstrated', said, 1]);
  });
});

describe('late records and corrections', () => {
  it('[L4] count in a run of counts, and not in the evidence on a mean', () => {
    const counts = new WatchOne(all);
    counts.take(bad(2), good(100));
    const correction = { kind: 'correction', records: 1, origin: origins.leak, at: 0, corrects: 1, finding: { kind: 'verdict', nonconforming: false }, reason: 'inspected again' } as const;
    counts.take(correction);
    expect(runViewOf(counts.watch)?.figures).toMatchObject({ runUnits: 102, runNonconforming: 1 });
    const mean = new WatchOne(`station: A.filling, characteristic: fill, quantity: mean, at-least: 250 ml, target: 251 ml, window: { units: 100 }, looks: all, alarms: { ${quiet} }`);
    mean.take(fills([250.5, 251, 250.8, 251.2]));
    const before = runViewOf(mean.watch);
    mean.take({ ...correction, origin: origins.fill, finding: { kind: 'measurement', value: 240 } } as never);
    expect(mean.watch.evidence.bounds().estimate).toBeLessThan(249);
    expect(runViewOf(mean.watch)).toEqual(before);
  });

  it('[L4] fill a hole that belongs to the run, and none that lies before it', () => {
    const one = new WatchOne(all);
    const lost = { kind: 'lost', records: 10, at: 0, station: 'A.leak', reason: 'overrun' } as const;
    one.take(good(10), lost, good(10));
    feed(one.monitor, [{ ...bad(10), time: { kind: 'steady', start: monday, step: 1 } } as never], 1, 11);
    expect(runViewOf(one.watch)?.figures).toMatchObject({ runUnits: 30, runNonconforming: 10 });
    one.take(lost);
    one.monitor.act({ kind: 'restart', guarantee: 'one', by: 'Jonas', reason: 'new seal' }, one.monitor.now);
    feed(one.monitor, [{ ...bad(10), time: { kind: 'steady', start: monday, step: 1 } } as never], 1, 31);
    expect(runViewOf(one.watch)?.figures).toMatchObject({ runUnits: 0 });
  });
});

describe('what a screen shows of a run', () => {
  it('is its evidence on a logarithmic scale, marked from the beginning on', () => {
    const one = new WatchOne(all);
    one.take(good(900));
    for (let mark = 1; mark <= 400; mark += 1) {
      one.watch.run.mark(monday + mark * 300_000);
      one.take(good(1));
    }
    const { run } = runPathsOf(one.watch);
    expect(run.at.length).toBeGreaterThan(60);
    expect(run.at.length).toBeLessThanOrEqual(120);
    expect([run.at[0], run.kept.length, run.broken.length]).toEqual([monday + 300_000, run.at.length, run.at.length]);
    const view = runViewOf(one.watch);
    expect([view?.enoughKept, view?.decides]).toEqual([-Math.log10(0.05), 'state']);
    expect(view?.kept).toBeGreaterThan(run.kept[0]!);
  });

  it('[L3][R1] is the same after a restart of the server', () => {
    const one = new WatchOne(all);
    one.take(good(700), bad(3), good(500));
    one.watch.run.mark(monday);
    const resumed = monitorFrom(one.monitor.plant, 'v', structuredClone(snapshotOf(one.monitor)));
    expect(runViewOf(resumed.watches[0]!)).toEqual(runViewOf(one.watch));
    expect(runPathsOf(resumed.watches[0]!)).toEqual(runPathsOf(one.watch));
    resumed.watches[0]!.evidence.weigh(clockMoment(resumed.now));
    expect(resumed.watches[0]!.standing.state).toBe(one.state);
  });
});

import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import type { Happening } from '../../../core/monitor/happening.ts';
import { Monitor } from '../../../core/monitor/monitor.ts';
import { monitorFrom, snapshotOf } from '../../../core/monitor/monitor-snapshot.ts';
import { everyGuarantee, feed, partsOf, pieces, plantOfText, recipes } from './evidence-plant.ts';

const plant = plantOfText(everyGuarantee());
/**
 * What was decided, guarantee by guarantee: in which order two guarantees decide on the same minute of records, and so the
 * numbers of their alarms, is for the monitor to say.
 */
function decided(happenings: readonly Happening[]): Map<string, unknown[]> {
  const found = new Map<string, unknown[]>();
  for (const happening of happenings) {
    const guarantee = happening.kind === 'alarm' ? happening.alarm.guarantee : 'guarantee' in happening ? happening.guarantee : 'line';
    const plain = happening.kind === 'alarm' ? { ...happening, alarm: { ...happening.alarm, id: 0 } } : happening;
    found.set(guarantee, [...(found.get(guarantee) ?? []), plain]);
  }
  return new Map([...found].sort());
}

const snapshots = (monitor: Monitor): unknown => monitor.watches.map(({ guarantee, evidence, standing }) => [guarantee.id, evidence.snapshot(), standing.snapshot()]);

describe('evidence on every quantity in every window', () => {
  it('[L3] decides the same, to the last bit, however the records were cut into parts and frames', () => {
    fc.assert(
      fc.property(recipes, fc.integer({ min: 1, max: 60 }), fc.integer({ min: 1, max: 5 }), (list, most, partsAFrame) => {
        const parts = partsOf(list);
        const [whole, cut] = [new Monitor(plant, 'v'), new Monitor(plant, 'v')];
        const { happenings } = feed(whole, parts, parts.length);
        expect(decided(feed(cut, pieces(parts, most), partsAFrame).happenings)).toEqual(decided(happenings));
        expect(snapshots(cut)).toEqual(snapshots(whole));
      }),
      { seed: 4101, numRuns: 60 },
    );
  });

  it('goes on from a snapshot taken anywhere as if it had never stopped', () => {
    fc.assert(
      fc.property(recipes, fc.nat(), (list, cutAt) => {
        const parts = pieces(partsOf(list), 40);
        const stop = 1 + (cutAt % parts.length);
        const [whole, head] = [new Monitor(plant, 'v'), new Monitor(plant, 'v')];
        const all = feed(whole, parts, 1);
        const before = feed(head, parts.slice(0, stop), 1);
        const resumed = monitorFrom(plant, 'v', structuredClone(snapshotOf(head)));
        const after = feed(resumed, parts.slice(stop), 1, before.next);
        expect([...before.happenings, ...after.happenings]).toEqual(all.happenings);
        expect(snapshotOf(resumed)).toEqual(snapshotOf(whole));
      }),
      { seed: 4102, numRuns: 50 },
    );
  });

  it('reaches every state, so that the two tests above compare something', () => {
    const seen = new Map<string, Set<string>>();
    fc.assert(
      fc.property(recipes, (list) => {
        const monitor = new Monitor(plant, 'v');
        for (const happening of feed(monitor, partsOf(list), 1).happenings) {
          if (happening.kind !== 'evidence') continue;
          const quantity = happening.guarantee.split('-')[0] as string;
          seen.set(quantity, (seen.get(quantity) ?? new Set()).add(happening.to));
        }
      }),
      { seed: 4103, numRuns: 60 },
    );
    for (const quantity of ['leak', 'yield', 'flaws', 'fill', 'cap', 'range', 'beyond', 'model', 'chain']) {
      expect([quantity, ...(seen.get(quantity) ?? [])]).toEqual(expect.arrayContaining(['demonstrated', 'undecided', 'violated']));
    }
    expect([...(seen.get('model') ?? [])]).toContain('unknown');
    expect([...(seen.get('lot') ?? [])]).toEqual(expect.arrayContaining(['unknown', 'gathering', 'demonstrated', 'violated']));
  });
});

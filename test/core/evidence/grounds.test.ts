import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import type { Alarm } from '../../../core/alarm/alarm.ts';
import { chainLower, chainUpper } from '../../../core/bound/chained-yield.ts';
import { rateLower, rateUpper } from '../../../core/bound/rate.ts';
import { fractionLower, fractionUpper } from '../../../core/bound/nonconforming-fraction.ts';
import { Monitor } from '../../../core/monitor/monitor.ts';
import type { InspectionPart, Part } from '../../../core/record/part.ts';
import type { Tail } from '../../../core/units.ts';
import { everyGuarantee, feed, origins, partsOf, plantOfText, recipes } from './evidence-plant.ts';

const plant = plantOfText(everyGuarantee());

/** The stored records of an alarm's grounds, in order of acceptance: part and place of each. */
function storedRecords(parts: readonly Part[], { grounds }: Alarm, characteristic: string): { part: InspectionPart; place: number }[] {
  const found: { part: InspectionPart; place: number }[] = [];
  let sequence = 1;
  for (const part of parts) {
    for (let place = 0; place < part.records; place += 1, sequence += 1) {
      const inside = grounds.records.some(({ first, last }) => sequence >= first && sequence <= last);
      if (inside && 'time' in part && part.origin.characteristic === characteristic) found.push({ part, place });
    }
  }
  return found;
}

const nonconforming = ({ part, place }: { part: InspectionPart; place: number }): boolean =>
  part.kind === 'verdicts' ? part.nonconforming.includes(place) : part.kind === 'measurements' && (part.value[place] as number) < 248;

describe('an alarm', () => {
  it('[A5] can be recomputed from its grounds: the records of its window give its figures, and these its condition', () => {
    let recomputed = 0;
    fc.assert(
      fc.property(recipes, (recipe) => {
        const parts = partsOf(recipe.filter(({ what }) => what !== 'correction' && what !== 'tallies' && what !== 'lot'));
        const monitor = new Monitor(plant, 'v');
        for (const happening of feed(monitor, parts, 1).happenings) {
          if (happening.kind !== 'alarm' || happening.change !== 'raised') continue;
          const { alarm } = happening;
          const { figures } = alarm.grounds;
          const tail = figures['tail'] as Tail;
          const line = figures['line'] as number;
          const [quantity] = alarm.guarantee.split('-') as [string];
          if (quantity === 'leak' || quantity === 'beyond') {
            const records = storedRecords(parts, alarm, quantity === 'leak' ? origins.leak.characteristic : origins.fill.characteristic);
            const [x, n] = [records.filter(nonconforming).length, records.length];
            if (alarm.rule === 'deterioration') {
              expect([figures['found'], figures['seen']]).toEqual([x, n]);
              continue;
            }
            expect([figures['nonconforming'], figures['inspected']]).toEqual([x, n]);
            if (alarm.rule === 'crossing') expect(fractionUpper(x, n, tail)).toBeGreaterThan(line);
            else expect(fractionLower(x, n, 0.05 as Tail)).toBeGreaterThan(line);
            recomputed += 1;
          }
          if (alarm.rule === 'deterioration') continue;
          if (quantity === 'flaws') {
            const records = storedRecords(parts, alarm, origins.surface.characteristic);
            const column = (name: 'count' | 'exposure'): number => records.reduce((sum, { part, place }) => sum + (part.kind === 'exposures' ? (part[name][place] as number) : 0), 0);
            const [count, exposure] = [column('count'), column('exposure')];
            expect(figures['count']).toBe(count);
            expect(figures['exposure']).toBeCloseTo(exposure, 9);
            if (alarm.rule === 'crossing') expect(rateUpper(count, exposure, tail) * 100).toBeGreaterThan(line);
            else expect(rateLower(count, exposure, 0.05 as Tail) * 100).toBeGreaterThan(line);
            recomputed += 1;
          }
          if (quantity === 'fill' || quantity === 'model' || quantity === 'cap') {
            const values = storedRecords(parts, alarm, origins.fill.characteristic).map(({ part, place }) => (part.kind === 'measurements' ? (part.value[place] as number) : NaN));
            const mean = values.reduce((a, b) => a + b) / values.length;
            expect(figures['values']).toBe(values.length);
            expect(figures['mean']).toBeCloseTo(mean, 9);
            if (values.length > 1) expect(figures['sd']).toBeCloseTo(Math.sqrt(values.reduce((sum, value) => sum + (value - mean) ** 2, 0) / (values.length - 1)), 9);
            recomputed += 1;
          }
          if (quantity === 'chain') {
            const stations = ['A.cutting', 'A.leak'].map((station) => ({ station, inspected: figures[`inspected at ${station}`]!, nonconforming: figures[`nonconforming at ${station}`]! }));
            for (const [index, characteristic] of ['cut', 'tightness'].entries()) {
              const records = storedRecords(parts, alarm, characteristic);
              expect([stations[index]!.nonconforming, stations[index]!.inspected]).toEqual([records.filter(nonconforming).length, records.length]);
            }
            if (alarm.rule === 'crossing') expect(chainLower(stations, tail)).toBeLessThan(line);
            else expect(chainUpper(stations, 0.05 as Tail)).toBeLessThan(line);
            recomputed += 1;
          }
        }
      }),
      { seed: 4301, numRuns: 80 },
    );
    expect(recomputed).toBeGreaterThan(300);
  });
});

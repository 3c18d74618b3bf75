import { describe, expect, it } from 'vitest';
import { readPlant } from '../../../core/plant/read-plant.ts';
import { leak, smallPlant } from './small-plant.ts';

/** Two guarantees on verdicts; the first with `first`, the second with `second` in place of its settings. */
function betweenFalseCalls(budget: string, first: string, second: string): readonly (number | undefined)[] | string {
  const other = leak.replace('leak-A', 'leak-B').replace('A.leak', 'B.leak');
  const text = smallPlant(`${leak}\n${first}`).replace('time-zone: Europe/Copenhagen }', `time-zone: Europe/Copenhagen, ${budget} }`);
  const read = readPlant(`${text}  - ${`${other}\n${second}`.trim().split('\n').join('\n    ')}\n`, 'v');
  if (!read.ok) return read.fault.map(({ sentence }) => sentence).join('\n');
  return read.value.plant.guarantees.map(({ rules }) => rules.flatMap((rule) => (rule.kind === 'deterioration' ? [rule.unitsBetweenFalseCalls] : []))[0]);
}

const budget = 'false-calls-per-shift: 0.02';

describe("the plant's budget of false calls", () => {
  it.each([
    ['shared by size', 'units-per-shift: 9000', 'units-per-shift: 3000'],
    ['shared with weights', 'units-per-shift: 9000\nweight: 1', 'units-per-shift: 3000\nweight: 4'],
  ])('[L5] is kept when %s', (_how, first, second) => {
    const found = betweenFalseCalls(budget, first, second) as readonly number[];
    const calls = 9000 / found[0]! + 3000 / found[1]!;
    expect(calls).toBeLessThanOrEqual(0.02);
    expect(calls).toBeGreaterThan(0.0199);
  });

  it('[L5] gives a larger part to a larger weight', () => {
    const [, light] = betweenFalseCalls(budget, 'units-per-shift: 9000', 'units-per-shift: 3000') as readonly number[];
    const [, heavy] = betweenFalseCalls(budget, 'units-per-shift: 9000', 'units-per-shift: 3000\nweight: 4') as readonly number[];
    expect(heavy).toBeLessThan(light!);
  });

  it('leaves those out that set their own, or watch for no change', () => {
    const [own, other] = betweenFalseCalls(budget, 'alarms: { deterioration: { units-between-false-calls: 777777 } }', 'units-per-shift: 3000') as readonly number[];
    expect([own, other]).toEqual([777_777, 150_000]);
    expect(betweenFalseCalls(budget, 'alarms: { deterioration: off }', 'units-per-shift: 3000')).toEqual([undefined, 150_000]);
  });

  it('says what is missing, and what a budget cannot give', () => {
    expect(betweenFalseCalls(budget, '', 'units-per-shift: 3000')).toContain('guarantees[0].units-per-shift');
    expect(betweenFalseCalls('false-calls-per-shift: 100', 'units-per-shift: 9000', 'units-per-shift: 3000')).toContain('the alarm could not return');
    expect(betweenFalseCalls('false-calls-per-shift: 0', 'units-per-shift: 9000', 'units-per-shift: 3000')).toContain('above 0');
  });
});

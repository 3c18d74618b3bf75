import { describe, expect, it } from 'vitest';
import { viewOf } from '../../../core/view/view-of.ts';
import { joinMinute } from '../../../server/demo/demo-plant.ts';
import { Lived } from './lived.ts';

const twentyMinutes = joinMinute + 20 * 60;
/** The usual seed of the demo, its first twenty minutes. */
const first = new Lived(1).until(joinMinute);
const joined = first.monitor.watches.map(viewOf);
const standingAtJoin = first.monitor.desk.standing();
first.until(twentyMinutes);

/** Second in which the change `change` is seen first. */
const secondOf = (changes: readonly (readonly [string, number])[], change: string): number => changes.find(([name]) => name === change)?.[1] ?? NaN;
const at = (hours: number, minutes = 0): number => hours * 60 + minutes - joinMinute;

describe('the demo when people join it', () => {
  it('shows every lane demonstrated, with plausible and different allowances', () => {
    expect(joined.map(({ state }) => state)).toEqual(Array.from({ length: 11 }, () => 'demonstrated'));
    const used = joined.map(({ allowance }) => allowance.bound ?? NaN);
    for (const share of used) expect(share).toSatisfy((value: number) => value > 0.25 && value < 0.9);
    expect(used.filter((share) => share > 0.4 && share < 0.85).length).toBeGreaterThanOrEqual(8);
    expect(new Set(used.map((share) => share.toFixed(2))).size).toBeGreaterThanOrEqual(8);
  });

  it('has a past: full windows, an hour of marks on every lane, products and lots', () => {
    for (const view of joined) {
      expect(view.allowance.trail.length).toBe(12);
      expect(view.lot).toMatch(/^[ABK]-1-0500$/);
      expect(view.lineRunning).toBe(true);
    }
    expect(joined.map(({ product }) => product)).toEqual([...Array.from({ length: 8 }, () => 'BH-4'), 'FK-250', 'FK-250', 'BH-4']);
  });

  it('has no alarm that still calls', () => {
    expect(standingAtJoin.filter(({ state }) => state.kind !== 'returned')).toEqual([]);
  });
});

describe('the first day of the demo', () => {
  it('crosses a guarantee line within two minutes and is back some minutes after the repair', () => {
    const changes = first.alarm('leak-B', 'crossing');
    expect(changes.map(([change]) => change)).toEqual(['raised', 'returned']);
    const crossed = secondOf(changes, 'raised');
    expect(crossed).toBeGreaterThan(40);
    expect(crossed).toBeLessThan(110);
    const afterRepair = secondOf(changes, 'returned') - at(6, 44);
    expect(afterRepair).toBeGreaterThan(90);
    expect(afterRepair).toBeLessThan(240);
    expect(first.states('leak-B').map(([state]) => state)).toEqual(['undecided', 'demonstrated']);
    const calls = first.happenings.filter((one) => one.kind === 'alarm' && one.change === 'raised' && one.at > first.monitor.now - 20 * 3_600_000);
    expect(calls[0]).toMatchObject({ alarm: { guarantee: 'leak-B', rule: 'crossing', safetyRelevant: true } });
  });

  it('has a strong fault that is called violated, and its repair', () => {
    const states = first.states('final-yield-A');
    expect(states.map(([state]) => state)).toEqual(['undecided', 'violated', 'undecided', 'demonstrated']);
    expect(secondOf(states, 'violated')).toBeGreaterThan(at(8, 38));
    expect(secondOf(states, 'violated')).toBeLessThan(at(9));
    const returned = secondOf(first.alarm('final-yield-A', 'violation'), 'returned');
    expect(returned).toBeGreaterThan(at(9));
    expect(secondOf(first.alarm('final-yield-A', 'crossing'), 'returned')).toBeGreaterThan(returned);
  });

  it('has a deterioration that takes hours to cross, and hours to leave the window again', () => {
    const changes = first.alarm('pull-off-B', 'crossing');
    expect(secondOf(changes, 'raised')).toBeGreaterThan(at(9));
    expect(secondOf(changes, 'raised')).toBeLessThan(at(11, 30));
    expect(secondOf(changes, 'returned')).toBeGreaterThan(at(12, 30));
  });

  it('has a station that falls silent while its line runs: unknown, an alarm, and back when it is heard', () => {
    const states = first.states('leak-A');
    expect(states.map(([state]) => state)).toEqual(['unknown', 'demonstrated']);
    const changes = first.alarm('leak-A', 'silence');
    expect(changes.map(([change]) => change)).toEqual(['raised', 'returned']);
    expect(secondOf(changes, 'raised')).toBe(secondOf(states, 'unknown'));
    expect(secondOf(changes, 'raised') - at(10, 15)).toBe(8);
    expect(secondOf(changes, 'returned')).toBe(at(10, 41));
    // The chain through the leak test is as silent as its quietest station, once.
    expect(first.alarm('chain-A', 'silence').map(([change]) => change)).toEqual(['raised', 'returned']);
  });

  it('declares a loss, which counts as bad data, and sets nothing aside', () => {
    expect(first.alarm('fill-FK-250', 'bad-data').map(([change]) => change)).toEqual(['raised', 'returned']);
    expect(first.happenings.filter(({ kind }) => kind === 'set-aside')).toEqual([]);
    expect(first.happenings.filter((one) => one.kind === 'alarm' && one.alarm.rule === 'bad-data' && one.alarm.guarantee !== 'fill-FK-250')).toEqual([]);
  });

  it('changes line A over to the thicker hose and back, and stops for breaks and handovers', () => {
    const marks = (mark: string): string[] => first.happenings.flatMap((one) => (one.kind === 'line' && one.line === 'A' && one.mark === mark ? [one.detail] : []));
    expect(marks('changeover')).toEqual(['BH-4', 'BH-5', 'BH-4']);
    expect(new Set(marks('line-stopped'))).toEqual(new Set(['Break', 'Handover of the shift', 'Changeover to BH-5', 'Changeover to BH-4']));
  });
});

describe('the demo under any seed', () => {
  it('tells the same seed the same to the last record, another differently', () => {
    const again = new Lived(1).until(60);
    expect(again.happenings).toEqual(first.happenings.slice(0, again.happenings.length));
    expect(again.frames).toEqual(first.frames.slice(0, again.frames.length));
    const other = new Lived(2).until(60);
    expect(other.frames).not.toEqual(first.frames.slice(0, other.frames.length));
  });

  it.each([2, 3, 4, 5, 6])('crosses the guarantee line of leak test B in time: seed %i', (seed) => {
    const [crossed] = new Lived(seed).until(joinMinute + 110).alarm('leak-B', 'crossing').filter(([change]) => change !== 'returned');
    expect(crossed?.[1]).toBeGreaterThan(40);
  });
});

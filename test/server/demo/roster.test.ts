import { describe, expect, it } from 'vitest';
import { dayMinutes, plantDay } from '../../../server/demo/plant-day.ts';
import { Roster } from '../../../server/demo/roster.ts';
import { demoStations } from '../../../server/demo/stations.ts';

const lines = ['A', 'B', 'K'];
const week = Array.from({ length: 7 * dayMinutes }, (_, minute) => minute);
const clock = (hours: number, minutes = 0): number => hours * 60 + minutes;

describe('the roster of the demo', () => {
  const roster = new Roster(1);

  it('lets lines stand for handovers, breaks and changeovers, and never all at once', () => {
    expect(roster.stopAt('A', clock(6))).toMatchObject({ reason: 'Handover of the shift', from: clock(6), minutes: 4 });
    expect(roster.stopAt('A', clock(6, 4))).toBeUndefined();
    expect(roster.stopAt('A', clock(9, 11))).toMatchObject({ reason: 'Changeover to BH-5' });
    expect(roster.stopAt('B', clock(9, 38))).toMatchObject({ reason: 'Break' });
    for (const minute of week) expect(lines.filter((line) => roster.stopAt(line, minute) !== undefined).length).toBeLessThan(3);
  });

  it('names lots by line, day and hour, and says how long the line runs for each', () => {
    expect(roster.lotAt('A', clock(0, 59))).toBe('A-0-2300');
    expect(roster.lotAt('A', clock(1))).toBe('A-1-0100');
    expect(roster.lotAt('B', dayMinutes + clock(22, 59))).toBe('B-2-2100');
    expect(roster.lotRunningMinutes('A', clock(3))).toBe(120);
    // A changeover of 12 minutes and a break of 15.
    expect(roster.lotRunningMinutes('A', clock(10))).toBe(93);
  });

  it('makes the thicker hose between two changeovers', () => {
    expect([clock(8, 59), clock(9), clock(14, 59), clock(15)].map((minute) => roster.productAt('A', minute))).toEqual(['BH-4', 'BH-5', 'BH-5', 'BH-4']);
    expect(roster.productAt('K', clock(12))).toBe('FK-250');
  });

  it('lets no lot have two products', () => {
    for (const line of lines) {
      const products = new Map<string, string>();
      for (const minute of week) {
        const lot = roster.lotAt(line, minute);
        const product = roster.productAt(line, minute);
        expect(products.get(lot) ?? product).toBe(product);
        products.set(lot, product);
      }
    }
  });
});

describe('the days of the demo', () => {
  const days = Array.from({ length: 40 }, (_, day) => plantDay(7, day));

  it('speak only of stations and characteristics that are there', () => {
    const known = new Map(demoStations.map(({ id, streams }) => [id, streams.map(({ characteristic }) => characteristic)]));
    for (const { troubles, silences, losses } of days) {
      for (const { station, characteristic } of troubles) expect(known.get(station)).toContain(characteristic);
      for (const { station } of [...silences, ...losses]) expect(known.has(station)).toBe(true);
    }
  });

  it('are all different, with everything begun and repaired within the day', () => {
    expect(new Set(days.map((day) => JSON.stringify(day))).size).toBe(40);
    for (const { troubles, silences } of days) {
      expect(troubles.length).toBe(5);
      for (const { from, until } of [...troubles, ...silences]) {
        expect(from).toBeGreaterThanOrEqual(clock(6));
        expect(until).toBeGreaterThan(from);
        expect(until).toBeLessThan(clock(22));
      }
    }
  });
});

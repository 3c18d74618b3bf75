import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { needsPerson, toneOf } from '../../client/attention.ts';
import { allowanceScale } from '../../client/board/allowance-scale.ts';
import { laneHeights, laneSizeOf } from '../../client/board/lane-heights.ts';
import { groupedByLine, nextOrder, orderedLanes } from '../../client/board/lane-order.ts';
import { alarm, card, lane, view } from './made-up.ts';

const acknowledged = { kind: 'acknowledged', acknowledgement: { by: 'Ines', at: 1 as never, note: '' } } as const;

describe('allowance scale', () => {
  const scale = allowanceScale(600);

  it('is linear from target to line', () => {
    const at = (allowance: number): number => scale.placeOf(allowance).x;
    expect(at(0)).toBe(scale.targetX);
    expect(at(1)).toBe(scale.lineX);
    expect(at(0.5)).toBeCloseTo((scale.targetX + scale.lineX) / 2, 9);
    expect(at(0.75) - at(0.5)).toBeCloseTo(at(0.25) - at(0), 9);
  });

  it('draws each doubling beyond the line as an equal way', () => {
    const at = (allowance: number): number => scale.placeOf(allowance).x - scale.lineX;
    expect(at(4)).toBeCloseTo(2 * at(2), 9);
    expect(at(8)).toBeCloseTo(3 * at(2), 9);
  });

  it('rises with the allowance, stays inside, and owns up to what lies beyond its end', () => {
    fc.assert(fc.property(fc.double({ min: -1e6, max: 1e6, noNaN: true }), fc.double({ min: 1e-6, max: 5, noNaN: true }), (allowance, more) => {
      const low = scale.placeOf(allowance);
      const high = scale.placeOf(allowance + more);
      return high.x >= low.x && low.x >= 0 && low.x <= 600 && low.beyond === allowance > 8;
    }), { seed: 2 });
  });
});

describe('order of lanes', () => {
  const ids = (order: readonly string[]): string => order.join(' ');

  it('puts what is violated first, then undecided, unknown, demonstrated by allowance used, gathering last', () => {
    const lanes = [
      lane('calm', 0.4), lane('near', 0.9), lane('gather', 3, { state: 'gathering' }), lane('dumb', 0.2, { state: 'unknown' }),
      lane('lost', 1.1, { state: 'undecided' }), lane('bad', 1.05, { state: 'violated' }),
    ];
    expect(ids(nextOrder([], lanes))).toBe('bad lost dumb near calm gather');
  });

  it('keeps lanes where they are while they differ by less than two per cent', () => {
    const order = nextOrder([], [lane('a', 0.5), lane('b', 0.49)]);
    expect(nextOrder(order, [lane('a', 0.5), lane('b', 0.515)])).toBe(order);
    expect(ids(nextOrder(order, [lane('a', 0.5), lane('b', 0.53)]))).toBe('b a');
  });

  it('a change of state moves a lane at once, whatever its allowance', () => {
    const order = nextOrder([], [lane('a', 0.99), lane('b', 0.985)]);
    expect(ids(nextOrder(order, [lane('a', 0.99), lane('b', 0.985, { state: 'undecided' })]))).toBe('b a');
  });

  it('holds every lane once, whatever came and went', () => {
    const some = fc.uniqueArray(fc.tuple(fc.integer({ min: 0, max: 30 }), fc.double({ min: -1, max: 9, noNaN: true })), { selector: ([id]) => id });
    fc.assert(fc.property(some, some, (before, after) => {
      const of = (pairs: readonly (readonly [number, number])[]): ReturnType<typeof lane>[] => pairs.map(([id, bound]) => lane(String(id), bound));
      const order = nextOrder(nextOrder([], of(before)), of(after));
      expect([...order].sort()).toEqual(after.map(([id]) => String(id)).sort());
    }), { seed: 3 });
  });

  it('groups by line in the order of the worst lane', () => {
    const lanes = [lane('a', 0.5), { ...lane('b', 0.9), card: card({ id: 'b', lineName: 'Hose line B' }) }, lane('c', 0.95)];
    const groups = groupedByLine(orderedLanes(nextOrder([], lanes), lanes));
    expect(groups.map((group) => [group.line, ...group.lanes.map((one) => one.card.id)])).toEqual([['Hose line A', 'c', 'a'], ['Hose line B', 'b']]);
  });
});

describe('heights of lanes', () => {
  const limits = { loudLeast: 80, calmLeast: 28, loudMost: 120, calmMost: 70, louder: 1.6 };

  it('fills the room and gives more to what needs a person', () => {
    const { loud, calm, fits } = laneHeights(560, 2, 6, limits);
    expect(fits).toBe(true);
    expect(loud).toBeGreaterThan(calm);
    expect(560 - 2 * loud - 6 * calm).toBeLessThan(8);
  });

  it('when it gets tight the calm lanes give way first, and the board scrolls only at the least heights', () => {
    expect(laneHeights(900, 5, 17, limits)).toEqual({ loud: 80, calm: 29, fits: true });
    expect(laneHeights(560, 5, 45, limits)).toEqual({ loud: 80, calm: 28, fits: false });
  });

  it('says fits only when it does', () => {
    const count = fc.integer({ min: 0, max: 300 });
    fc.assert(fc.property(fc.integer({ min: 100, max: 3000 }), count, count, (room, loud, calm) => {
      const heights = laneHeights(room, loud, calm, limits);
      return heights.fits === loud * heights.loud + calm * heights.calm <= room && heights.loud >= 80 && heights.calm >= 28;
    }), { seed: 4 });
  });

  it('says as much as there is height for', () => {
    expect([30, 60, 90].map((height) => laneSizeOf(height, 19))).toEqual(['small', 'medium', 'large']);
  });
});

describe('attention', () => {
  it('colour is for what needs a person; unknown is neither well nor ill', () => {
    expect(toneOf(view(), [])).toBe('calm');
    expect(toneOf(view({ state: 'gathering' }), [])).toBe('calm');
    expect(toneOf(view({ state: 'undecided' }), [])).toBe('care');
    expect(toneOf(view({ state: 'violated' }), [])).toBe('harm');
    expect(toneOf(view({ state: 'unknown' }), [])).toBe('blank');
    expect(toneOf(view(), [alarm({ rule: 'violation' })])).toBe('harm');
    expect(toneOf(view(), [alarm({ rule: 'deterioration' })])).toBe('care');
  });

  it('a person is wanted for an alarm that is back to normal and was never acknowledged', () => {
    expect(needsPerson(view(), [alarm({ state: { kind: 'returned', returnedAt: 1 as never } })])).toBe(true);
    expect(needsPerson(view(), [])).toBe(false);
    expect(needsPerson(view({ state: 'unknown' }), [alarm({ state: acknowledged })])).toBe(true);
  });
});
